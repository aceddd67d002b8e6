import { useQuery } from '@tanstack/react-query'
import { unitWords } from '../../../shared/figure-text'
import { fewestWholeCells } from '../../../shared/science/whole-water'
import { singleCellsQuery } from '../../api/regions'
import { SectionHead } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { dayWithYear } from '../../lib/dates'
import { countWords, degrees, figure, percent } from '../../lib/format'

/** A region of few whole cells, cell by cell: no percentiles can be said of it. */
export function SingleCellsPart({ regionId, feedId }: { regionId: number; feedId: number }) {
  const { data } = useQuery(singleCellsQuery(regionId, feedId))
  if (!data?.few || data.wholeCells === null) return null
  const unit = unitWords(data.unit)
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-2">
      <SectionHead ruled={data.cells.length === 0} aside={data.day && <span className="fig">{dayWithYear(data.day)}</span>}>
        Single cells of the newest view
      </SectionHead>
      <p className="text-small text-ink2">
        It holds {countWords(data.wholeCells, 'whole water cell')} of this feed; below {fewestWholeCells} Offing shows the cells themselves, no percentiles, and raises nothing by itself.
      </p>
      {data.cells.length > 0 && (
        <Table label="Single cells of the newest view">
          <thead>
            <tr>
              <Th>Cell</Th>
              <Th figures>Inside</Th>
              <Th figures>Value{unit && `, ${unit}`}</Th>
            </tr>
          </thead>
          <tbody>
            {data.cells.map((cell) => (
              <Tr key={`${cell.latitude} ${cell.longitude}`}>
                <Td>
                  <span className="fig">
                    {degrees(cell.latitude, 'latitude')} {degrees(cell.longitude, 'longitude')}
                  </span>
                  {!cell.water && <span className="ml-2 text-fine text-ink2">its centre is on land</span>}
                </Td>
                <Td figures>{cell.whole ? 'whole' : percent(cell.share)}</Td>
                <Td figures>{figure(cell.value) ?? <span className="text-ink2">not seen</span>}</Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      )}
    </section>
  )
}
