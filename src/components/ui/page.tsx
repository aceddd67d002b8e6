import type { ReactNode } from 'react'
import { usePageTitle } from '../../hooks/use-page-title'

interface Props {
  /** For the tab of the browser; without "Offing". */
  title: string
  children: ReactNode
}

/** The paper below the masthead. */
export function Page({ title, children }: Props) {
  usePageTitle(title)
  return (
    <main id="content" tabIndex={-1} className="mx-auto grid w-full max-w-[1440px] grid-cols-[minmax(0,1fr)] gap-6 px-4 pt-5 pb-24 outline-none tab:px-8 tab:pb-12">
      {children}
    </main>
  )
}

interface StatementProps {
  /** In ember, only when water is unusual. */
  worry?: ReactNode
  children: ReactNode
  /** Above it, small: where this page hangs. */
  above?: ReactNode
  /** Below it, in second ink. */
  detail?: ReactNode
  /** At the right: the one filled button and what goes with it. */
  actions?: ReactNode
}

/** The one sentence that answers the page's question. */
export function Statement({ worry, children, above, detail, actions }: StatementProps) {
  return (
    <header className="flex flex-wrap items-end self-start justify-between gap-x-9 gap-y-4">
      <div className="min-w-0 max-w-[52rem] flex-1 basis-80">
        {above && <div className="mb-1 text-small text-ink2">{above}</div>}
        <h1 className="text-title tab:text-statement">
          {worry && <span className="block text-ember">{worry}</span>}
          {children}
        </h1>
        {detail && <p className="mt-2 text-body text-ink2">{detail}</p>}
      </div>
      {actions && <div className="flex flex-wrap items-center gap-3" data-no-print>{actions}</div>}
    </header>
  )
}

/** Head of a part of a page: its name, what counts in it, and what can be done with it. */
export function SectionHead({ children, count, aside, ruled = true }: { children: ReactNode; count?: ReactNode; aside?: ReactNode; ruled?: boolean }) {
  return (
    <div className={`flex flex-wrap items-end justify-between gap-x-4 gap-y-1 pb-2 ${ruled ? 'border-b border-ink' : ''}`}>
      <h2 className="text-lead">
        {children}
        {count !== undefined && <span className="fig ml-2 text-body font-text text-ink2">{count}</span>}
      </h2>
      {aside && <div className="text-small text-ink2">{aside}</div>}
    </div>
  )
}
