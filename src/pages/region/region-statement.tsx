import type { ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { RegionStateName } from '../../../shared/schemas/common'
import type { Region } from '../../../shared/schemas/regions'
import { Age } from '../../components/ui/age'
import { Mark, stateMark } from '../../components/ui/mark'
import { Statement } from '../../components/ui/page'
import { longDay } from '../../lib/dates'
import { timesUsual } from '../../lib/format'

const stateClause: Record<RegionStateName, string> = {
  unusual: 'is unusual.',
  'not seen': 'was not seen lately.',
  stale: 'is stale: no new layer came.',
  'not ready': 'is not ready to be judged.',
  'not comparable': 'is not comparable with what is usual.',
  usual: 'is usual.',
}

/** Name, state with its mark, and the age of the view the state rests on. */
export function RegionStatement({ region, actions }: { region: Region; actions: ReactNode }) {
  const { state, because, view } = region.standing
  const unusual = state === 'unusual'
  const times = view?.timesUsual
  const clause = unusual && times != null ? `is at ${timesUsual(times)} times usual.` : stateClause[state]
  const sentence = (
    <span className="flex items-start gap-3">
      <Mark name={stateMark(state)} size={28} className="mt-0.5 tab:mt-1.5" />
      <span>
        {region.name} {clause}
      </span>
    </span>
  )
  return (
    <Statement
      above={
        <Link className="link font-strong" to={paths.regions.to()}>
          Regions
        </Link>
      }
      worry={unusual ? sentence : undefined}
      actions={actions}
      detail={
        <>
          {because}{' '}
          {view && (
            <>
              View of {longDay(view.day)}, <Age at={view.observedAt} old />.
            </>
          )}
        </>
      }
    >
      {unusual ? null : sentence}
    </Statement>
  )
}
