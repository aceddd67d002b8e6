import type { ReactNode } from 'react'
import { usePageTitle } from '../../hooks/use-page-title'
import { GraduatedRule } from '../ui/graduated-rule'
import { Wordmark } from './wordmark'

/** The sheet before the door: pages for people who are not signed in. */
export function Door({ title, about, children }: { title: string; about?: ReactNode; children: ReactNode }) {
  usePageTitle(title)
  return (
    <main className="mx-auto grid min-h-dvh w-full max-w-[26rem] content-start gap-8 px-4 pt-6 pb-16 tab:content-center tab:pt-0">
      <header>
        <Wordmark />
        <GraduatedRule className="mt-1" />
      </header>
      <div>
        <h1 className="text-title tab:text-statement">{title}</h1>
        {about && <p className="mt-2 text-ink2">{about}</p>}
      </div>
      {children}
    </main>
  )
}
