import { unitWords } from '../../../shared/figure-text'
import { awayText } from '../../../shared/patch-text'
import type { RegionView } from '../../../shared/schemas/patches'
import { degrees, figure, percent, threeDigits } from '../../lib/format'
import { Figure } from '../ui/figure'
import { Table, Td, Th, Tr } from '../ui/table'
import { AreaByValue } from './area-by-value'
import { squareKm } from './patch-words'

/** What is kept of one view: where its greatest value is, how much water has which value, and why some was not seen. */
export function ViewFigures({ shown }: { shown: RegionView }) {
  const { view, unit } = shown
  if (!view) return null
  const { max, coverage } = view
  const away = max?.away ? `, ${awayText(max.away)}` : ''
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-5">
      {max && (
        <div className="grid grid-cols-2 gap-x-6 gap-y-4">
          <Figure
            label="Greatest value"
            value={figure(max.value)}
            unit={unit && unit !== '1' ? unitWords(unit) : undefined}
            note={`${degrees(max.latitude, 'latitude')} ${degrees(max.longitude, 'longitude')}${away}`}
          />
          <Figure label="Median" value={figure(view.median)} unit={unit && unit !== '1' ? unitWords(unit) : undefined} note={view.p10 !== null && view.p90 !== null && `${threeDigits(view.p10)} to ${threeDigits(view.p90)}, p10 to p90`} />
        </div>
      )}
      <AreaByValue shown={shown} />
      <Unseen view={view} coverage={coverage} />
    </div>
  )
}

function Unseen({ view, coverage }: { view: NonNullable<RegionView['view']>; coverage: number | null }) {
  const { masked, waterAreaKm2 } = view
  if (coverage === null) return null
  const unseenKm2 = waterAreaKm2 * (1 - coverage)
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-1">
      <h3 className="text-body font-heading">Water that was not seen</h3>
      <Table label="Water that was not seen, by reason">
        <thead>
          <tr>
            <Th>Reason</Th>
            <Th figures>Area, km²</Th>
            <Th figures>Of the water</Th>
          </tr>
        </thead>
        <tbody>
          {masked.map(({ reason, areaKm2, share }) => (
            <Tr key={reason}>
              <Td className="h-8! py-1! [overflow-wrap:anywhere]">{reason}</Td>
              <Td figures className="h-8! py-1!">{threeDigits(areaKm2)}</Td>
              <Td figures className="h-8! py-1!">{percent(share)}</Td>
            </Tr>
          ))}
          <Tr>
            <Td className="h-8! py-1! font-strong">Not seen in all</Td>
            <Td figures className="h-8! py-1!">{threeDigits(unseenKm2)}</Td>
            <Td figures className="h-8! py-1!">{percent(1 - coverage)}</Td>
          </Tr>
        </tbody>
      </Table>
      <p className="text-small text-ink2">
        {masked.length === 0 && unseenKm2 > 0 && 'The file says no reason. '}
        {masked.length > 1 && 'A cell may have several reasons. '}
        The region holds {squareKm(waterAreaKm2)} of water.
      </p>
    </section>
  )
}
