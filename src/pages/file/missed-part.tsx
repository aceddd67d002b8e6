import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { FileReport } from '../../../shared/schemas/files'
import { countWords } from '../../lib/format'

const unfolded = 3

/** Why each feed did not take the file, so that nobody has to guess. */
export function MissedPart({ missed }: { missed: NonNullable<FileReport['missed']> }) {
  if (missed.length === 0) return null
  return (
    <details open={missed.length <= unfolded}>
      <summary className="link inline-flex min-h-11 items-center font-strong tab:min-h-0">
        Why {missed.length === 1 ? 'the only feed does not take it' : `none of ${countWords(missed.length, 'feed')} takes it`}
      </summary>
      <ul className="mt-2 text-small">
        {missed.map(({ feedId, feed, why }) => (
          <li key={feedId} className="border-b border-rule py-2 break-words">
            <Link className="link" to={paths.feed.to({ id: feedId })}>
              {feed}
            </Link>{' '}
            {why}
          </li>
        ))}
      </ul>
    </details>
  )
}
