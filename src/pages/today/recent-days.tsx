import type { AlertItem } from '../../../shared/schemas/alerts'
import { joinedRuns } from '../../components/charts/joined-runs'

type Recent = AlertItem['recent']

const width = 200
const height = 52

/** Thirty days in a glance: the usual band, usable views joined where they are near, flagged ones in ember. */
export function RecentDays({ days }: { days: Recent }) {
  const figures = days.flatMap((day) => [day.value, day.p10, day.p90]).filter((value): value is number => value !== null && value > 0)
  if (figures.length === 0) return <div />
  const low = Math.log(Math.min(...figures) * 0.85)
  const high = Math.log(Math.max(...figures) * 1.18)
  const x = (index: number) => ((index + 0.5) / days.length) * width
  const y = (value: number) => height - 9 - ((Math.log(value) - low) / (high - low)) * (height - 12)
  const band = days.flatMap((day, index) => (day.p10 !== null && day.p90 !== null && day.p10 > 0 ? [{ index, p10: day.p10, p90: day.p90 }] : []))
  const points = days.flatMap((day, index) => (day.value !== null && day.value > 0 ? [{ index, value: day.value, flagged: day.flagged }] : []))
  const seen = points.length
  return (
    <svg role="img" aria-label={`The last ${days.length} days: seen on ${seen}, flagged on ${points.filter((p) => p.flagged).length}`} viewBox={`0 0 ${width} ${height}`} className="w-full max-w-72 overflow-visible">
      {band.length > 1 && (
        <path
          fill="var(--band)"
          d={`M${band.map((b) => `${x(b.index)} ${y(b.p90)}`).join('L')}L${band
            .toReversed()
            .map((b) => `${x(b.index)} ${y(b.p10)}`)
            .join('L')}Z`}
        />
      )}
      {joinedRuns(days.map((day) => day.value)).map((run) => (
        <polyline key={run[0]} fill="none" stroke="var(--ink)" strokeWidth="1.4" points={run.map((index) => `${x(index)},${y(days[index]?.value ?? NaN)}`).join(' ')} />
      ))}
      {points.map((p) => (
        <circle key={p.index} cx={x(p.index)} cy={y(p.value)} r={p.flagged ? 3.2 : 1.4} fill={p.flagged ? 'var(--ember)' : 'var(--ink)'} />
      ))}
      <rect x="0.5" y={height - 5.5} width={width - 1} height="5" fill="var(--paper)" stroke="var(--segment)" />
      {points.map((p) => (
        <rect key={p.index} x={(p.index / days.length) * width} y={height - 5} width={width / days.length} height="4" fill="var(--ink3)" />
      ))}
    </svg>
  )
}
