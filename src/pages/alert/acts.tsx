import type { Alert } from '../../../shared/schemas/alerts'
import { useCan } from '../../api/auth'
import { Button } from '../../components/ui/button'
import type { Acting } from './use-acts'

/** The next thing to do, filled; the others outlined below it. */
export function Acts({ alert, acts }: { alert: Alert; acts: Acting }) {
  const mayAct = useCan('alert:act')
  if (!mayAct) return <p className="self-start text-small text-ink2 desk:text-right">An officer acknowledges alerts; you can add a note below.</p>
  if (alert.state === 'closed') {
    return (
      <div className="self-start desk:justify-self-end">
        <Button onClick={() => acts.show('reopen')}>Reopen</Button>
      </div>
    )
  }
  return (
    <div className="grid content-start gap-2" data-no-print>
      {alert.state === 'open' && (
        <Button kind="filled" className="min-h-13!" disabled={acts.busy} onClick={acts.acknowledge}>
          Acknowledge
        </Button>
      )}
      <div className="grid grid-cols-3 gap-2">
        <Button onClick={() => acts.show('assign')}>Assign</Button>
        <Button onClick={() => acts.show('hold')}>Hold until</Button>
        <Button onClick={() => acts.show('close')}>Close</Button>
      </div>
    </div>
  )
}
