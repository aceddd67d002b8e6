import type { CaughtLetter } from '../../../shared/schemas/duty'

export function LetterHeaders({ letter }: { letter: CaughtLetter }) {
  const headers: [string, string][] = [
    ['From', letter.from],
    ['To', letter.to.join(', ')],
    ['Subject', letter.subject],
    ['Date', letter.date],
    ['Message-ID', letter.messageId],
  ]
  return (
    <dl className="border-t border-rule text-small">
      {headers.map(([name, value]) => (
        <div key={name} className="grid gap-x-4 border-b border-rule py-2 tab:grid-cols-[7rem_minmax(0,1fr)]">
          <dt className="text-ink2">{name}</dt>
          <dd className="fig [overflow-wrap:anywhere]">{value}</dd>
        </div>
      ))}
    </dl>
  )
}
