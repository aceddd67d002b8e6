import type { ReactNode } from 'react'
import { chlorophyllRamp, departureRamp } from '../../../shared/ramps'
import { useTheme } from '../../hooks/use-theme'
import { unitWords } from '../../../shared/figure-text'
import { HatchTile } from '../ui/hatch-pattern'

interface Props {
  /** "Chlorophyll" */
  quantity: string
  unit: string | null
  ramp?: 'chlorophyll' | 'departure'
  /** Where missing comes from, or that it is simply missing. */
  missing?: ReactNode
  children?: ReactNode
}

/** As wide as the map: the ramp, its scale, its unit, and what the hatch stands for. */
export function Legend({ quantity, unit, ramp = 'chlorophyll', missing = 'not seen', children }: Props) {
  const theme = useTheme()
  const stops = (ramp === 'chlorophyll' ? chlorophyllRamp : departureRamp)[theme]
  const from = stops[0]?.at ?? 1
  const to = stops.at(-1)?.at ?? 10
  const place = (value: number) => `${(Math.log(value / from) / Math.log(to / from)) * 100}%`
  const ticks = ramp === 'chlorophyll' ? decadeTicks(from, to) : [0.125, 0.25, 0.5, 1, 2, 4, 8].map((at) => ({ at, major: true }))
  return (
    <div className="pl-11 tab:pl-13">
      <div className="mx-[7px]">
        <div aria-hidden className="h-2.5" style={{ background: `linear-gradient(90deg in oklab, ${stops.map((stop) => stop.colour).join(', ')})` }} />
        <div aria-hidden className="relative h-2 text-ink2">
          {ticks.map(({ at, major }) => (
            <span key={at} className={`absolute top-0 w-px bg-ink2 ${major ? 'h-2' : 'h-1'}`} style={{ left: place(at) }} />
          ))}
        </div>
        <div className="fig relative h-5 text-small text-ink2">
          {ticks
            .filter((tick) => tick.major)
            .map(({ at }, index, all) => (
              <span
                key={at}
                className={`absolute ${index === 0 ? '' : index === all.length - 1 ? '-translate-x-full' : '-translate-x-1/2'}`}
                style={{ left: place(at) }}
              >
                {ramp === 'departure' && at < 1 ? `1/${1 / at}` : at}
              </span>
            ))}
        </div>
        <p className="mt-1 flex flex-wrap justify-between gap-x-6 gap-y-1 text-small text-ink2">
          <span>
            <b className="font-heading text-ink">{quantity}</b>, {unit ? `${unitWords(unit)}, ` : ''}logarithmic. {children}
          </span>
          <span>
            <HatchTile />
            missing: {missing}
          </span>
        </p>
      </div>
    </div>
  )
}

/** Ticks at 1 to 9 of each decade; 1 and 3 are the ones with figures. */
function decadeTicks(from: number, to: number): { at: number; major: boolean }[] {
  const ticks: { at: number; major: boolean }[] = []
  for (let power = Math.floor(Math.log10(from)); power <= Math.ceil(Math.log10(to)); power++) {
    for (let digit = 1; digit <= 9; digit++) {
      const at = Number(`${digit}e${power}`)
      if (at >= from * 0.999 && at <= to * 1.001) ticks.push({ at, major: digit === 1 || digit === 3 })
    }
  }
  return ticks
}
