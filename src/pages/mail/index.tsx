import { useQuery } from '@tanstack/react-query'
import { useSearchParams } from 'react-router-dom'
import { ApiError } from '../../api/api-error'
import { caughtMailQuery } from '../../api/mail'
import { DemoTag } from '../../components/frame/demo-tag'
import { Wordmark } from '../../components/frame/wordmark'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { GraduatedRule } from '../../components/ui/graduated-rule'
import { Message } from '../../components/ui/message'
import { Page, Statement } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { countAtHead } from '../../lib/format'
import { LetterList } from './letter-list'
import { OpenLetter } from './open-letter'

/** What the local mail catcher caught: letters as their readers would see them, in demo and development only. */
export function Component() {
  const [search, setSearch] = useSearchParams()
  const { data, error, refetch } = useQuery(caughtMailQuery)
  const open = search.get('letter') ?? undefined
  const letters = data?.items
  return (
    <>
      <header className="mx-auto w-full max-w-[1440px] px-4 pt-2 tab:px-8">
        <div className="flex items-center justify-between gap-4 pb-1">
          <Wordmark />
          <DemoTag />
        </div>
        <GraduatedRule />
      </header>
      <Page title="Caught letters">
        <Statement detail="The local mail catcher keeps what would have been sent. Nothing here left this machine.">
          {letters ? countSentence(letters.length) : 'Caught letters'}
        </Statement>
        {error && !letters && <MailFault error={error} onRetry={() => void refetch()} />}
        {!letters && !error && <Waiting />}
        {letters?.length === 0 && <Empty title="No letter yet.">When an alert is raised or somebody is invited, the letter appears here by itself.</Empty>}
        {letters && letters.length > 0 && (
          <div className="grid items-start gap-x-9 gap-y-6 desk:grid-cols-[minmax(0,1fr)_minmax(0,1.7fr)]">
            <div className={open ? 'max-desk:hidden' : ''}>
              <LetterList letters={letters} open={open} />
            </div>
            {open ? (
              <OpenLetter id={open} onClose={() => setSearch({})} />
            ) : (
              <p className="hidden border-t border-ink pt-4 text-ink2 desk:block">Choose a letter to read it as its reader would.</p>
            )}
          </div>
        )}
      </Page>
    </>
  )
}

function countSentence(count: number): string {
  return count < 2 ? `${countAtHead(count)} letter was caught.` : `${countAtHead(count)} letters were caught.`
}

function MailFault({ error, onRetry }: { error: Error; onRetry: () => void }) {
  if (error instanceof ApiError && error.status === 404) {
    return (
      <Message fault title="There is no mail page here.">
        Letters are sent for real on this server; look in your own mailbox.
      </Message>
    )
  }
  return <Failure error={error} onRetry={onRetry} />
}
