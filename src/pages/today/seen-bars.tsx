import type { RegionStanding } from '../../../shared/schemas/regions'
import { percent } from '../../lib/format'

const height = 22
const step = 6

interface Props {
  seen: RegionStanding['seen']
  floor: number
  day: string | undefined
}

/** Share of the region seen on each of the last days; outlined below the floor, nothing where no layer came. */
export function SeenBars({ seen, floor, day }: Props) {
  const usable = seen.filter((d) => d.coverage !== null && d.coverage >= floor).length
  return (
    <svg role="img" aria-label={`usable on ${usable} of ${seen.length} days, floor ${percent(floor)}`} width={seen.length * step} height={height + 2}>
      <line x1="0" x2={seen.length * step} y1={height * (1 - floor)} y2={height * (1 - floor)} stroke="var(--ink2)" strokeDasharray="1 2" />
      <line x1="0" x2={seen.length * step} y1={height + 0.5} y2={height + 0.5} stroke="var(--ink2)" />
      {seen.map(({ day: date, coverage }, index) => {
        if (coverage === null) return null
        const tall = Math.max(1, coverage * height)
        const low = coverage < floor
        return (
          <rect
            key={date}
            x={index * step + (low ? 1 : 0.5)}
            y={height - tall + (low ? 0.5 : 0)}
            width={low ? 4 : 4.5}
            height={tall}
            fill={low ? 'var(--paper)' : date === day ? 'var(--ink)' : 'var(--ink3)'}
            stroke={low ? 'var(--ink2)' : 'none'}
          />
        )
      })}
    </svg>
  )
}
