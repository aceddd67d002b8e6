import { useInfiniteQuery } from '@tanstack/react-query'
import { auditQuery } from '../../api/audit'
import { useMe } from '../../api/auth'
import { Button } from '../../components/ui/button'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { Page, Statement } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { Waiting } from '../../components/ui/waiting'
import { clockTime, dayWithYear, localDay } from '../../lib/dates'
import { detailWords } from './detail-words'

export function Component() {
  const audit = useInfiniteQuery(auditQuery())
  const zone = useMe()?.timeZone ?? 'UTC'
  const items = audit.data?.pages.flatMap((page) => page.items) ?? []
  return (
    <Page title="Audit">
      <Statement detail="Newest first. Entries are only ever added.">Who did what.</Statement>
      {audit.isPending && <Waiting lines={6} />}
      {audit.error && <Failure error={audit.error} onRetry={() => void audit.refetch()} />}
      {audit.isSuccess && items.length === 0 && <Empty title="Nothing yet." />}
      {items.length > 0 && (
        <Table label="Audit">
          <thead>
            <tr>
              <Th>When</Th>
              <Th>Who</Th>
              <Th>Did</Th>
              <Th>To</Th>
              <Th className="hidden tab:table-cell">With</Th>
            </tr>
          </thead>
          <tbody>
            {items.map((entry) => (
              <Tr key={entry.id}>
                <Td className="fig whitespace-nowrap">
                  {dayWithYear(localDay(entry.at, zone))} {clockTime(entry.at, zone)}
                </Td>
                <Td>{entry.who ?? <span className="text-ink2">Offing itself</span>}</Td>
                <Td className="fig">{entry.action}</Td>
                <Td>{entry.subject}</Td>
                <Td className="hidden max-w-md break-words text-ink2 tab:table-cell">{detailWords(entry.details)}</Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      )}
      {audit.hasNextPage && (
        <div>
          <Button kind="text" disabled={audit.isFetchingNextPage} onClick={() => void audit.fetchNextPage()}>
            Older entries
          </Button>
        </div>
      )}
    </Page>
  )
}
