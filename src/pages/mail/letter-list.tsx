import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { CaughtLetter } from '../../../shared/schemas/duty'
import { dayAndTime } from '../../lib/dates'

export function LetterList({ letters, open }: { letters: readonly CaughtLetter[]; open: string | undefined }) {
  const newestFirst = [...letters].sort((a, b) => Date.parse(b.date) - Date.parse(a.date))
  return (
    <ul aria-label="Letters" className="border-t border-ink">
      {newestFirst.map((letter) => (
        <li key={letter.id} className={`border-b border-rule hover:bg-sunk ${letter.id === open ? 'shadow-[inset_4px_0_0_var(--ink)]' : ''}`}>
          <Link
            to={`${paths.mail.to()}?${new URLSearchParams({ letter: letter.id })}`}
            aria-current={letter.id === open ? 'true' : undefined}
            className="grid gap-0.5 py-3 pr-2 pl-4"
          >
            <span className="flex items-baseline justify-between gap-3">
              <span className="truncate text-small text-ink2">{letter.to.join(', ')}</span>
              <time dateTime={letter.date} className="fig text-fine whitespace-nowrap text-ink2">
                {dayAndTime(letter.date, 'UTC')} UTC
              </time>
            </span>
            <span className="font-strong">{letter.subject}</span>
          </Link>
        </li>
      ))}
    </ul>
  )
}
