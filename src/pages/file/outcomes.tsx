import type { Outcome } from './what-happens'

/** What happens after confirming, side by side: a figure or word, and the sentence it begins. */
export function Outcomes({ outcomes }: { outcomes: readonly Outcome[] }) {
  return (
    <dl className="grid gap-x-9 gap-y-4 tab:grid-cols-2 desk:grid-cols-4">
      {outcomes.map(({ head, says }) => (
        <div key={head}>
          <dt className="text-title tabular-nums">{head}</dt>
          <dd className="mt-1 text-small text-ink2">{says}</dd>
        </div>
      ))}
    </dl>
  )
}
