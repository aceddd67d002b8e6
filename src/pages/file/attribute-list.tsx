import type { FoundAttributes } from '../../../shared/schemas/found'
import { countWords, grouped } from '../../lib/format'

/** Attributes as the file has them, folded away; what was cut says how long it is. */
export function AttributeList({ title, attributes }: { title: string; attributes: FoundAttributes | undefined }) {
  const { items, leftOut } = attributes ?? { items: [], leftOut: 0 }
  const count = items.length + leftOut
  if (count === 0) return <p className="text-small text-ink2">{title}: none.</p>
  return (
    <details>
      <summary className="link inline-flex min-h-11 items-center font-strong tab:min-h-0">
        {title} ({grouped(count)})
      </summary>
      <dl className="mt-2 grid grid-cols-[minmax(0,1fr)] text-small tab:grid-cols-[minmax(8rem,auto)_minmax(0,1fr)]">
        {items.map(({ name, value, length }) => (
          <div key={name} className="contents">
            <dt className="fig pt-2 break-all text-ink2 tab:border-b tab:border-rule tab:pr-6 tab:pb-2">{name}</dt>
            <dd className="fig border-b border-rule pb-2 break-words whitespace-pre-wrap tab:pt-2">
              {value}
              {length !== null && <span className="font-words text-ink3"> … cut: {grouped(length)} characters in all</span>}
            </dd>
          </div>
        ))}
      </dl>
      {leftOut > 0 && <p className="mt-2 text-small text-ink2">{countWords(leftOut, 'more attribute')} not shown.</p>}
    </details>
  )
}
