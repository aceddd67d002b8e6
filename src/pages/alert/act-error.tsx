import { isConflict, sentenceOf } from '../../api/api-error'
import { Button } from '../../components/ui/button'
import { Message } from '../../components/ui/message'
import type { Acting } from './use-acts'

/** Somebody else may have been faster: said plainly, with nothing of theirs overwritten and nothing of ours lost. */
export function ActError({ acts }: { acts: Acting }) {
  if (!acts.error) return null
  const conflict = isConflict(acts.error)
  return (
    <Message
      fault
      title={conflict ? 'Nothing was overwritten.' : 'This was not done.'}
      action={
        <Button kind="text" onClick={acts.dismiss}>
          Understood
        </Button>
      }
    >
      {sentenceOf(acts.error)} {conflict && 'The page shows the alert as it stands now; what you typed is kept.'}
    </Message>
  )
}
