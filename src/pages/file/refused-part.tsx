import type { OffingFile } from '../../../shared/schemas/files'
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
          <dl className="mt-2 grid max-w-3xl grid-cols-[auto_minmax(0,1fr)] text-small">
            <dt className="border-b border-rule py-2 pr-6 text-ink2">code</dt>
            <dd className="fig border-b border-rule py-2">{refusal.code}</dd>
            {facts.map(([name, value]) => (
              <Fact key={name} name={name} value={value} />
            ))}
          </dl>
        </details>
      )}
    </section>
  )
}

function Fact({ name, value }: { name: string; value: unknown }) {
  return (
    <>
      <dt className="border-b border-rule py-2 pr-6 text-ink2">{inWords(name)}</dt>
      <dd className="fig border-b border-rule py-2 break-words">{typeof value === 'object' ? JSON.stringify(value) : String(value)}</dd>
    </>
  )
}

function inWords(name: string): string {
  return name.replace(/([a-z])([A-Z])/g, '$1 $2').toLowerCase()
}
