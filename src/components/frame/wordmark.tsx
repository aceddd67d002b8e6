import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'

/** The sun on the offing, and its broken light on the water. */
export function Wordmark() {
  return (
    <Link to={paths.today.to()} className="inline-flex min-h-11 items-center gap-2 text-[1.375rem] font-heading tracking-[-0.015em]">
      <svg aria-hidden width="28" height="28" viewBox="0 0 32 32">
        <path d="M8 14a8 8 0 0 1 16 0z" fill="currentColor" />
        <path d="M2 18h28" stroke="currentColor" strokeWidth="2.8" />
        <path d="M6 23h4M14 23h4M22 23h4M10 28h4M18 28h4" stroke="currentColor" strokeWidth="2.4" />
      </svg>
      Offing
    </Link>
  )
}
