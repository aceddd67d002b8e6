import type { HistoryAct, HistoryState, Region } from '../../../shared/schemas/regions'
import { useCan } from '../../api/auth'
import { useSteerHistory } from '../../api/regions'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { Progress } from '../../components/ui/progress'

const label: Record<HistoryState, string> = {
  waiting: 'History waits to be read',
  running: 'Reading history',
  paused: 'Reading of history paused',
  cancelled: 'Reading of history stopped',
  failed: 'Reading of history failed',
}

const words: Record<HistoryAct, string> = { pause: 'Pause', 'go-on': 'Go on reading', stop: 'Stop' }

const acts: Record<HistoryState, HistoryAct[]> = {
  waiting: ['pause', 'stop'],
  running: ['pause', 'stop'],
  paused: ['go-on', 'stop'],
  cancelled: ['go-on'],
  failed: ['go-on'],
}

/** How far the reading of a region's history has come, and what whoever may edit it can do about it. */
export function HistoryPart({ region: { id, standing } }: { region: Region }) {
  const mayEdit = useCan('region:edit')
  const steer = useSteerHistory(id)
  const { progress } = standing
  if (!progress) return null
  return (
    <div className="grid gap-3">
      <Progress done={progress.done} total={progress.total} label={label[progress.state]} unit="views, newest first" />
      {mayEdit && (
        <div className="flex flex-wrap gap-3">
          {acts[progress.state].map((act) => (
            <Button key={act} disabled={steer.isPending} onClick={() => steer.mutate(act)}>
              {words[act]}
            </Button>
          ))}
        </div>
      )}
      {steer.error && <Failure error={steer.error} />}
    </div>
  )
}
