import { useInfiniteQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { letterStates, type Letter } from '../../../shared/schemas/duty'
import { sentenceOf } from '../../api/api-error'
import { useMe } from '../../api/auth'
import { lettersQuery, useRetryLetter } from '../../api/letters'
import { Age } from '../../components/ui/age'
import { Button } from '../../components/ui/button'
import { Choice } from '../../components/ui/choice'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { FaultMark } from '../../components/ui/fault-mark'
import { Page, Statement } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { Waiting } from '../../components/ui/waiting'
import { clockTime } from '../../lib/dates'
import { countAtHead } from '../../lib/format'

type Shown = Letter['state'] | 'all'
const options = (['all', ...letterStates] as const).map((value) => ({ value, label: value }))

export function Component() {
  const [shown, setShown] = useState<Shown>('all')
  const me = useMe()
  const letters = useInfiniteQuery(lettersQuery(shown === 'all' ? undefined : shown))
  const failed = useInfiniteQuery(lettersQuery('failed')).data?.pages[0]?.items.length ?? 0
  const items = letters.data?.pages.flatMap((page) => page.items) ?? []
  return (
    <Page title="Letters">
      <Statement
        detail={
          me?.mailPage && (
            <>
              Here letters go to the local{' '}
              <Link className="link font-strong" to={paths.mail.to()}>
                mail page
              </Link>
              , not out into the world.
            </>
          )
        }
      >
        {failed > 0 ? `${countAtHead(failed)} ${failed === 1 ? 'letter' : 'letters'} could not be delivered.` : 'No letter has failed.'}
      </Statement>
      <Choice label="State" options={options} value={shown} onChange={setShown} />
      {letters.isPending && <Waiting lines={5} />}
      {letters.error && <Failure error={letters.error} onRetry={() => void letters.refetch()} />}
      {letters.isSuccess && items.length === 0 && (
        <Empty title={shown === 'all' ? 'No letter yet.' : `No letter is ${shown}.`}>
          {shown === 'all' && 'Letters go out when an alert is raised, by the subscriptions.'}
        </Empty>
      )}
      {items.length > 0 && (
        <Table label="Letters">
          <thead>
            <tr>
              <Th>Letter</Th>
              <Th>State</Th>
              <Th figures className="hidden tab:table-cell">
                Attempts
              </Th>
              <Th figures>Written</Th>
              <Th>
                <span className="heard">Acts</span>
              </Th>
            </tr>
          </thead>
          <tbody>
            {items.map((letter) => (
              <LetterRow key={letter.id} letter={letter} zone={me?.timeZone ?? 'UTC'} />
            ))}
          </tbody>
        </Table>
      )}
      {letters.hasNextPage && (
        <div>
          <Button kind="text" disabled={letters.isFetchingNextPage} onClick={() => void letters.fetchNextPage()}>
            Older letters
          </Button>
        </div>
      )}
    </Page>
  )
}

function LetterRow({ letter, zone }: { letter: Letter; zone: string }) {
  const retry = useRetryLetter(letter.id)
  return (
    <Tr>
      <Td>
        {letter.alertId !== null ? (
          <Link className="link" to={paths.alert.to({ id: letter.alertId })}>
            {letter.subject}
          </Link>
        ) : (
          letter.subject
        )}
        <span className="block text-fine text-ink2">
          {letter.kind}, to <span className="fig break-all">{letter.to}</span>
        </span>
        {letter.lastError && <span className="block text-fine text-ink2">last error: {letter.lastError}</span>}
        {retry.error && (
          <span role="alert" className="block text-fine">
            {sentenceOf(retry.error)}
          </span>
        )}
      </Td>
      <Td>
        <span className="inline-flex items-center gap-2 align-middle">
          {letter.state === 'failed' && <FaultMark />}
          {letter.state}
        </span>
        {letter.state === 'waiting' && letter.nextAttemptAt && (
          <span className="block text-fine text-ink2">
            next try <span className="fig">{clockTime(letter.nextAttemptAt, zone)}</span>
          </span>
        )}
      </Td>
      <Td figures className="hidden tab:table-cell">
        {letter.attempts}
      </Td>
      <Td figures>
        <Age at={letter.createdAt} />
      </Td>
      <Td className="text-right">
        {letter.state !== 'delivered' && (
          <Button kind="text" size="small" disabled={retry.isPending} onClick={() => retry.mutate()}>
            Send again
          </Button>
        )}
      </Td>
    </Tr>
  )
}
