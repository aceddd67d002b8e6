import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Region } from '../../../shared/schemas/regions'
import { Age } from '../../components/ui/age'
import { StateWord } from '../../components/ui/mark'
import { Progress } from '../../components/ui/progress'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { unitWords } from '../../../shared/figure-text'
import { grouped, percent, threeDigits, timesUsual } from '../../lib/format'

/** The regions by worry, each with the newest usable view it rests on. */
export function RegionTable({ regions }: { regions: readonly Region[] }) {
  return (
    <Table label="Regions by worry">
      <thead>
        <tr>
          <Th>Region</Th>
          <Th>State</Th>
          <Th figures>Times usual</Th>
          <Th figures className="hidden tab:table-cell">
            Value
          </Th>
          <Th figures className="hidden tab:table-cell">
            Usual
          </Th>
          <Th figures className="hidden tab:table-cell">
            Seen
          </Th>
          <Th figures className="hidden desk:table-cell">
            Area
          </Th>
          <Th figures>Age</Th>
        </tr>
      </thead>
      <tbody>
        {regions.map((region) => (
          <RegionRow key={region.id} region={region} />
        ))}
      </tbody>
    </Table>
  )
}

function RegionRow({ region }: { region: Region }) {
  const { view, state, unit, progress } = region.standing
  const unusual = state === 'unusual'
  return (
    <Tr>
      <Td>
        <Link className="link text-body font-strong" to={paths.region.to({ id: region.id })}>
          {region.name}
        </Link>
      </Td>
      <Td>
        <StateWord state={state} />
        {progress && <Progress done={progress.done} total={progress.total} label="History" />}
      </Td>
      <Td figures className={unusual ? 'font-heading text-ember' : ''}>
        {view?.timesUsual != null && timesUsual(view.timesUsual)}
      </Td>
      <Td figures className="hidden tab:table-cell">
        {view?.value != null && (
          <>
            {threeDigits(view.value)} <span className="font-text text-ink2">{unitWords(unit)}</span>
          </>
        )}
      </Td>
      <Td figures className="hidden tab:table-cell">
        {view?.usual != null && threeDigits(view.usual)}
      </Td>
      <Td figures className="hidden tab:table-cell">
        {view && percent(view.coverage)}
      </Td>
      <Td figures className="hidden desk:table-cell">
        {grouped(Math.round(region.areaKm2))} km²
      </Td>
      <Td figures>{view && <Age at={view.observedAt} />}</Td>
    </Tr>
  )
}
