import type { OffingFile } from '../../../shared/schemas/files'
import { Fact, Facts } from '../../components/ui/facts'
import { Message } from '../../components/ui/message'
import { whatToDo } from './what-to-do'

/** Why, what was kept, what to do, and the facts it was seen by. */
export function RefusedPart({ refusal }: { refusal: NonNullable<OffingFile['refusal']> }) {
  const facts = Object.entries(refusal.details).filter(([, value]) => value !== null && value !== undefined)
  return (
    <section className="grid gap-3">
      <Message fault title={refusal.message}>
        The file as it was sent is kept; no layer was made of it. {whatToDo(refusal.code)}
      </Message>
      {facts.length > 0 && (
        <details>
          <summary className="link inline-flex min-h-11 items-center font-strong tab:min-h-0">What was found</summary>
          <Facts className="mt-2 max-w-3xl">
            {[['code', refusal.code] as const, ...facts].map(([name, value]) => (
              <Fact key={name} name={inWords(name)} className="fig break-words">
                {typeof value === 'object' ? JSON.stringify(value) : String(value)}
              </Fact>
            ))}
          </Facts>
        </details>
      )}
    </section>
  )
}

function inWords(name: string): string {
  return name.replace(/([a-z])([A-Z])/g, '$1 $2').toLowerCase()
}
