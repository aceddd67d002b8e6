import type { Alert } from '../../../shared/schemas/alerts'
import { AssignDialog } from './assign-dialog'
import { CloseDialog } from './close-dialog'
import { HoldDialog } from './hold-dialog'
import { ReopenDialog } from './reopen-dialog'
import type { Acting } from './use-acts'

/** Each is made anew when it opens, so that nothing of an earlier try stands in it. */
export function ActDialogs({ alert, acts }: { alert: Alert; acts: Acting }) {
  switch (acts.dialog) {
    case 'assign':
      return <AssignDialog alert={alert} acts={acts} />
    case 'hold':
      return <HoldDialog alert={alert} acts={acts} />
    case 'close':
      return <CloseDialog alert={alert} acts={acts} />
    case 'reopen':
      return <ReopenDialog alert={alert} acts={acts} />
    default:
      return null
  }
}
