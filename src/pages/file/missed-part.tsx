import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { FileReport } from '../../../shared/schemas/files'
import { SectionHead } from '../../components/ui/page'

const unfolded = 6

/** Why each feed did not take the file, so that nobody has to guess. */
export function MissedPart({ missed }: { missed: NonNullable<FileReport['missed']> }) {
  if (missed.length === 0) return null
  return (
    <section>
      <SectionHead ruled={false}>Why no feed takes it</SectionHead>
      <Sentences missed={missed.slice(0, unfolded)} />
      {missed.length > unfolded && (
        <details>
          <summary className="link inline-flex min-h-11 items-center font-strong tab:min-h-9">{missed.length - unfolded} more</summary>
          <Sentences missed={missed.slice(unfolded)} />
        </details>
      )}
    </section>
  )
}

function Sentences({ missed }: { missed: NonNullable<FileReport['missed']> }) {
  return (
    <ul className="text-small">
      {missed.map(({ feedId, feed, why }) => (
        <li key={feedId} className="border-b border-rule py-2 break-words">
          <Link className="link" to={paths.feed.to({ id: feedId })}>
            {feed}
          </Link>{' '}
          {why}
        </li>
      ))}
    </ul>
  )
}
