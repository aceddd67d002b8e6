import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { OffingFile } from '../../../shared/schemas/files'
import { feedsQuery } from '../../api/feeds'
import { Button } from '../../components/ui/button'
import { SectionHead } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { dayWithYear } from '../../lib/dates'
import { figure, percent } from '../../lib/format'

const atFirst = 20

/** The figures this file gave, region by region; a region it did not see has hatch. */
export function FiguresPart({ file }: { file: OffingFile }) {
  const [all, setAll] = useState(false)
  const feeds = useQuery(feedsQuery()).data?.items
  const several = new Set(file.summaries.map((row) => row.feedId)).size > 1
  if (file.summaries.length === 0) return null
  const shown = all ? file.summaries : file.summaries.slice(0, atFirst)
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-2">
      <SectionHead count={file.summaries.length} ruled={false} aside={file.summaries.length >= 200 ? 'the newest 200' : 'newest first'}>
        Figures
      </SectionHead>
      <Table label="Figures by region">
        <thead>
          <tr>
            <Th>Region</Th>
            {several && <Th>Feed</Th>}
            <Th>Day</Th>
            <Th figures>Median</Th>
            <Th figures>Geometric mean</Th>
            <Th figures>Coverage</Th>
          </tr>
        </thead>
        <tbody>
          {shown.map((row) => (
            <Tr key={`${row.regionId} ${row.feedId} ${row.day}`}>
              <Td>
                <Link className="link" to={paths.region.to({ id: row.regionId })}>
                  {row.regionName}
                </Link>
              </Td>
              {several && <Td>{feeds?.find((feed) => feed.id === row.feedId)?.name ?? `feed ${row.feedId}`}</Td>}
              <Td className="fig whitespace-nowrap">{dayWithYear(row.day)}</Td>
              {row.median === null && row.geometricMean === null ? (
                <Td colSpan={2}>
                  <span className="heard">not seen</span>
                  <span aria-hidden className="hatch-fine ml-auto block h-3 max-w-60" />
                </Td>
              ) : (
                <>
                  <Td figures>{figure(row.median)}</Td>
                  <Td figures>{figure(row.geometricMean)}</Td>
                </>
              )}
              <Td figures>{row.coverage !== null && percent(row.coverage)}</Td>
            </Tr>
          ))}
        </tbody>
      </Table>
      {shown.length < file.summaries.length && (
        <div>
          <Button kind="text" size="small" onClick={() => setAll(true)}>
            Show all {file.summaries.length}
          </Button>
        </div>
      )}
    </section>
  )
}
