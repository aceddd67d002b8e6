import { Button } from '../../components/ui/button'
import { Dialog } from '../../components/ui/dialog'
import { dayWithYear } from '../../lib/dates'
import type { RunningEvent } from './is-event-running'

interface Props {
  open: boolean
  running: RunningEvent | null
  nextVersion: number
  onKeep: () => void
  onRedraw: () => void
}

/** Asked before a running event loses the outline it runs over. */
export function AskRedraw({ open, running, nextVersion, onKeep, onRedraw }: Props) {
  const alert = running?.alertIds[0]
  return (
    <Dialog
      open={open}
      onOpenChange={(next) => !next && onKeep()}
      title="An event is running over this outline."
      about={running && `${running.severity}, first flagged ${dayWithYear(running.since)}.`}
    >
      <ul className="grid list-disc gap-2 pl-5">
        <li>Redrawing ends the event with the reason "the outline was redrawn as version {nextVersion}". It keeps the outline and figures it began with.</li>
        {alert !== undefined && (
          <li>
            Alert {alert} stays open and says so. If the rule finds an event over the new outline on the same days, the alert goes on with that one; no second alert is raised for it.
          </li>
        )}
        <li>The new outline is judged once its history has been read, which begins at once.</li>
      </ul>
      <div className="mt-5 flex flex-wrap justify-end gap-3">
        <Button onClick={onKeep}>Keep the outline</Button>
        <Button kind="filled" onClick={onRedraw}>
          Redraw as version {nextVersion}
        </Button>
      </div>
    </Dialog>
  )
}
