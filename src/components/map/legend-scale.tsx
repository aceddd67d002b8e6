import { ticksOf, type Colouring, type Tick } from '../../../shared/colouring'
import { figureText } from '../../../shared/figure-text'
import type { Rgb } from '../../../shared/ok-lab'
import { rampColour, ramps, screenShares, type Theme } from '../../../shared/ramps'
import type { LayerLegend } from '../../../shared/schemas/layer-legend'
import { useTheme } from '../../hooks/use-theme'
import { useWide } from '../../hooks/use-wide'
import { percent } from '../../lib/format'

interface Props {
  colouring: Colouring
  legend: LayerLegend | undefined
}

export function LegendScale({ colouring, legend }: Props) {
  const theme = useTheme()
  const wide = useWide()
  if (colouring.scale === 'screen') return <ScreenScale theme={theme} legend={legend} />
  const ticks = ticksOf(colouring)
  const labelled = withRoom(ticks.filter((tick) => tick.labelled), wide ? 520 : 300)
  return (
    <>
      <Values legend={legend} />
      <div aria-hidden className="h-2.5" style={{ background: `linear-gradient(90deg in oklab, ${ramps[colouring.ramp][theme].join(', ')})` }} />
      <div aria-hidden className="relative h-2 text-ink2">
        {ticks.map(({ at, share, labelled: major }) => (
          <span key={at} className={`absolute top-0 w-px bg-ink2 ${major ? 'h-2' : 'h-1'}`} style={{ left: `${share * 100}%` }} />
        ))}
      </div>
      <div className="fig relative h-5 text-small text-ink2">
        {labelled.map(({ at, share }) => (
          <span
            key={at}
            className={`absolute whitespace-nowrap ${share < 0.03 ? '' : share > 0.97 ? '-translate-x-full' : '-translate-x-1/2'}`}
            style={{ left: `${share * 100}%` }}
          >
            {tickText(at)}
          </span>
        ))}
      </div>
    </>
  )
}

/** Where the layer's values lie on the scale. What is beyond its ends stands in the end's own column. */
function Values({ legend }: { legend: LayerLegend | undefined }) {
  if (!legend || legend.valid === 0) return <div className="h-6" />
  const counts = legend.bins.map((count, i) => count + (i === 0 ? legend.below : 0) + (i === legend.bins.length - 1 ? legend.above : 0))
  const most = Math.max(...counts)
  const beyond = [
    ...(legend.below > 0 ? [`${percent(legend.below / legend.valid)} below the scale`] : []),
    ...(legend.above > 0 ? [`${percent(legend.above / legend.valid)} above it`] : []),
  ]
  return (
    <svg role="img" aria-label={`How often each value comes${beyond.length ? `; ${beyond.join(', ')}` : ''}`} className="block h-6 w-full" viewBox={`0 0 ${counts.length} 24`} preserveAspectRatio="none">
      <title>{`How often each value comes in this layer${beyond.length ? `; ${beyond.join(', ')}` : ''}`}</title>
      {counts.map((count, i) => {
        const height = count === 0 ? 0 : Math.max(1, (count / most) * 22)
        return <rect key={i} x={i} y={24 - height} width={1} height={height} fill="var(--ink3)" />
      })}
    </svg>
  )
}

function ScreenScale({ theme, legend }: { theme: Theme; legend: LayerLegend | undefined }) {
  const [no = 0, yes = 0] = legend?.bins ?? []
  const share = (count: number) => (legend && legend.valid > 0 ? `, ${percent(count / legend.valid)} of the cells seen` : '')
  const ramp = ramps.sea[theme]
  return (
    <ul className="flex flex-wrap gap-x-8 gap-y-1 py-2 text-small text-ink">
      {([['1, yes', yes, screenShares.yes], ['0, no', no, screenShares.no]] as const).map(([word, count, place]) => (
        <li key={word} className="flex items-center gap-2">
          <span aria-hidden className="inline-block h-4 w-8 border border-ink2" style={{ background: css(rampColour(ramp, place)) }} />
          <span className="fig">
            {word}
            {share(count)}
          </span>
        </li>
      ))}
    </ul>
  )
}

const css = ([red, green, blue]: Rgb): string => `rgb(${red} ${green} ${blue})`

const digitPx = 8

/** The figures that fit beside each other; first and last stand inside the ends, and the last is worth more than its neighbour. */
export function withRoom(ticks: readonly Tick[], widthPx: number): Tick[] {
  const spans = ticks.map((tick) => {
    const width = (tickText(tick.at).length + 1) * digitPx
    const from = tick.share < 0.03 ? tick.share * widthPx : tick.share > 0.97 ? tick.share * widthPx - width : tick.share * widthPx - width / 2
    return { tick, from, to: from + width }
  })
  const last = spans.at(-1)
  let end = -Infinity
  return spans
    .filter((span) => {
      const fits = span.from >= end && (span === last || !last || span.to <= last.from)
      if (fits) end = span.to
      return fits
    })
    .map((span) => span.tick)
}

function tickText(at: number): string {
  return Math.abs(at) >= 1e6 ? at.toExponential(0) : figureText(at).replace('-', '−')
}
