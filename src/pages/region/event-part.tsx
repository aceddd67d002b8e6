import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { BloomEventItem } from '../../../shared/schemas/series'
import { eventsQuery } from '../../api/series'
import { Button } from '../../components/ui/button'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { SeverityWord } from '../../components/ui/mark'
import { SectionHead } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { Waiting } from '../../components/ui/waiting'
import { daysBetween, dayWithYear, shortDay } from '../../lib/dates'
import { timesUsual } from '../../lib/format'

const atFirst = 8

/** Events newest first, with the days between which each began. */
export function EventPart({ regionId, feedId }: { regionId: number; feedId: number | null }) {
  const events = useQuery(eventsQuery({ regionId, feedId: feedId ?? undefined }))
  const [all, setAll] = useState(false)
  const items = [...(events.data?.items ?? [])].sort((a, b) => b.firstFlagged.localeCompare(a.firstFlagged))
  const shown = all ? items : items.slice(0, atFirst)
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-2">
      <SectionHead count={events.data && items.length} aside="newest first" ruled={items.length === 0}>
        Events
      </SectionHead>
      {events.isPending && <Waiting />}
      {events.error && <Failure error={events.error} onRetry={() => void events.refetch()} />}
      {events.isSuccess && items.length === 0 && <Empty title="No event yet.">A run of usable views that meets the rule makes one.</Empty>}
      {items.length > 0 && (
        <Table label="Events">
          <thead>
            <tr>
              <Th>First flagged</Th>
              <Th className="hidden tab:table-cell">Began</Th>
              <Th figures>Length</Th>
              <Th figures>Peak, times usual</Th>
              <Th>Severity</Th>
              <Th className="hidden tab:table-cell">Phase</Th>
              <Th>Alert</Th>
            </tr>
          </thead>
          <tbody>
            {shown.map((event) => (
              <EventRow key={event.id} event={event} />
            ))}
          </tbody>
        </Table>
      )}
      {items.length > atFirst && !all && (
        <div>
          <Button kind="text" size="small" onClick={() => setAll(true)}>
            Show all {items.length}
          </Button>
        </div>
      )}
    </section>
  )
}

function EventRow({ event }: { event: BloomEventItem }) {
  const days = daysBetween(event.firstFlagged, event.lastFlagged) + 1
  return (
    <Tr>
      <Td>
        <span className="fig whitespace-nowrap">{dayWithYear(event.firstFlagged)}</span>
        {event.endedBecause !== null && <span className="block text-fine text-ink2">over version {event.geometryVersion}; ended as {event.endedBecause}</span>}
      </Td>
      <Td className="hidden whitespace-nowrap tab:table-cell">
        {event.lastUnflaggedBefore && (
          <>
            after <span className="fig">{shortDay(event.lastUnflaggedBefore)}</span>
          </>
        )}
      </Td>
      <Td figures>{days} d</Td>
      <Td figures>{event.peakTimesUsual !== null && timesUsual(event.peakTimesUsual)}</Td>
      <Td>
        <SeverityWord severity={event.severity} />
      </Td>
      <Td className="hidden tab:table-cell">{event.phase === 'lost' ? 'lost from view' : event.phase}</Td>
      <Td>
        {event.alertId !== null && (
          <Link className="link fig font-strong" to={paths.alert.to({ id: event.alertId })}>
            {event.alertId}
          </Link>
        )}
      </Td>
    </Tr>
  )
}
