import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Region } from '../../../shared/schemas/regions'
import { useCan } from '../../api/auth'
import { ButtonLink } from '../../components/ui/button'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { Mark, stateMark } from '../../components/ui/mark'
import { SectionHead } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { ageWords } from '../../lib/age'
import { AxisHead, AxisRow } from './times-axis'
import { SeenBars } from './seen-bars'

const columns = 
  'grid grid-cols-[9.25rem_minmax(0,1fr)_2.6rem] tab:grid-cols-[minmax(9.5rem,1fr)_minmax(0,1.35fr)_5.5rem_3rem] items-center gap-x-2 tab:gap-x-4'

interface Props {
  regions: readonly Region[] | undefined
  error: Error | null
  /** The day of the day rule, marked in the bars. */
  day: string | undefined
}

/** All regions on one axis of times usual, in order of worry: the list is the chart. */
export function RegionChart({ regions, error, day }: Props) {
  const mayDraw = useCan('region:edit')
  if (error && !regions) return <Failure error={error} />
  if (!regions) return <Waiting lines={6} label="Waiting for regions" />
  const watched = regions.filter((region) => !region.retired)
  return (
    <section aria-label="Regions">
      <SectionHead count={watched.length} ruled={false} aside="by worry">
        Regions
      </SectionHead>
      {watched.length === 0 ? (
        <Empty
          title="No region yet."
          action={
            mayDraw && (
              <ButtonLink kind="filled" to={paths.newRegion.to()}>
                Draw a region
              </ButtonLink>
            )
          }
        >
          {mayDraw ? 'Draw the water you answer for; its history is read at once.' : 'An analyst draws the water you answer for; it appears here.'}
        </Empty>
      ) : (
        <>
          <div className={`${columns} border-b border-ink pb-1.5 text-fine text-ink3`}>
            <span className="self-end">State</span>
            <AxisHead />
            <span className="hidden self-end tab:block">14 days seen</span>
            <span className="self-end text-right">Age</span>
          </div>
          <ul>
            {watched.map((region) => (
              <Row key={region.id} region={region} day={day} />
            ))}
          </ul>
          <p className="pt-3 text-fine text-ink2">
            Axis: times usual. Band: tenth to ninetieth percentile at this time of year. Ring: last usable view.
          </p>
        </>
      )}
    </section>
  )
}

function Row({ region, day }: { region: Region; day: string | undefined }) {
  const { standing } = region
  const unusual = standing.state === 'unusual'
  return (
    <li className={`${columns} relative min-h-13 border-b border-rule hover:bg-sunk tab:min-h-12`} title={standing.because}>
      <Link to={paths.region.to({ id: region.id })} className="flex items-center gap-2.5 py-1 after:absolute after:inset-0">
        <Mark name={stateMark(standing.state)} size={20} className={unusual ? 'text-ember' : ''} />
        <span className="min-w-0 leading-tight">
          <span className="block font-strong">{region.name}</span>
          <span className={`block text-small ${unusual ? 'font-heading text-ember' : 'text-ink2'}`}>{standing.state}</span>
        </span>
      </Link>
      <AxisRow standing={standing} />
      <span className="hidden tab:block">
        <SeenBars seen={standing.seen} floor={standing.coverageFloor} day={day} />
      </span>
      <span className="fig text-right text-small whitespace-nowrap">{standing.view ? ageWords(standing.view.ageHours) : ''}</span>
    </li>
  )
}
