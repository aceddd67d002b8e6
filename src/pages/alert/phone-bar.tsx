import type { Alert } from '../../../shared/schemas/alerts'
import { useCan } from '../../api/auth'
import { Button } from '../../components/ui/button'
import { Dialog } from '../../components/ui/dialog'
import type { Acting } from './use-acts'

/** At the thumb: one large Acknowledge, and the rest under "More". Takes the place of the rooms. */
export function PhoneBar({ alert, acts }: { alert: Alert; acts: Acting }) {
  if (!useCan('alert:act')) return null
  return (
    <div data-phone-bar className="fixed inset-x-0 bottom-0 z-[1000] border-t border-ink bg-paper px-4 pt-3 pb-[calc(0.75rem+env(safe-area-inset-bottom))]">
      {acts.error && (
        <p role="alert" className="pb-2 text-small font-strong">
          Not done. See the message at the top.
        </p>
      )}
      <div className="flex gap-3">
        {alert.state === 'open' && (
          <Button kind="filled" size="tall" className="flex-1" disabled={acts.busy} onClick={acts.acknowledge}>
            Acknowledge
          </Button>
        )}
        {alert.state === 'acknowledged' && (
          <Button kind="outline" size="tall" className="flex-1" onClick={() => acts.show('close')}>
            Close
          </Button>
        )}
        {alert.state === 'closed' ? (
          <Button size="tall" className="flex-1" onClick={() => acts.show('reopen')}>
            Reopen
          </Button>
        ) : (
          <Button size="tall" onClick={() => acts.show('more')}>
            More
          </Button>
        )}
      </div>
      <Dialog open={acts.dialog === 'more'} onOpenChange={(open) => acts.show(open ? 'more' : undefined)} title="More">
        <div className="grid gap-3">
          <Button onClick={() => acts.show('assign')}>Assign</Button>
          <Button onClick={() => acts.show('hold')}>Hold until</Button>
          <Button onClick={() => acts.show('close')}>Close</Button>
        </div>
      </Dialog>
    </div>
  )
}
