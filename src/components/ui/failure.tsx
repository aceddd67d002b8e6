import { sentenceOf } from '../../api/api-error'
import { Button } from './button'
import { Message } from './message'

/** A query that failed, with a way to try again. */
export function Failure({ error, onRetry }: { error: unknown; onRetry?: () => void }) {
  return (
    <Message
      fault
      action={
        onRetry && (
          <Button size="small" onClick={onRetry}>
            Try again
          </Button>
        )
      }
    >
      {sentenceOf(error)}
    </Message>
  )
}
