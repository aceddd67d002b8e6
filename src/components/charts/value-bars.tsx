export interface ValueBar {
  /** Where it begins and ends along the axis, 0..1. */
  from: number
  to: number
  /** What it stands for; the tallest fills the height. */
  amount: number
  fill: string
}

export interface ValueTick {
  /** Where it stands along the axis, 0..1. */
  share: number
  /** Empty for a tick without a number. */
  text: string
}

interface Props {
  /** What it shows, for those who do not see it. */
  label: string
  bars: ValueBar[]
  ticks: ValueTick[]
  mark: { share: number; text: string }
}

/** Bars over an axis of values, with one value marked: an instrument, not a chart to be steered. */
export function ValueBars({ label, bars, ticks, mark }: Props) {
  const most = Math.max(...bars.map((bar) => bar.amount))
  const left = `${mark.share * 100}%`
  return (
    <div className="relative mx-[7px] pt-5">
      <div aria-hidden className="fig absolute top-0 h-5 text-fine whitespace-nowrap text-ink" style={{ left, transform: `translateX(${mark.share < 0.15 ? 0 : mark.share > 0.85 ? -100 : -50}%)` }}>
        {mark.text}
      </div>
      <div className="relative h-26">
        <svg role="img" aria-label={label} className="block size-full" viewBox="0 0 1000 100" preserveAspectRatio="none" shapeRendering="crispEdges">
          {bars.map(({ from, to, amount, fill }) => {
            const height = amount === 0 ? 0 : Math.max(1.5, (amount / most) * 98)
            return <rect key={from} x={from * 1000 + 0.5} y={100 - height} width={Math.max(0.5, (to - from) * 1000 - 1)} height={height} fill={fill} />
          })}
        </svg>
        <span aria-hidden className="absolute top-0 bottom-0 w-[3px] -translate-x-1/2 border-x border-paper bg-ink" style={{ left }} />
      </div>
      <div aria-hidden className="relative h-2 border-t border-ink">
        {ticks.map(({ share, text }) => (
          <span key={share} className={`absolute top-0 w-px bg-ink2 ${text ? 'h-2' : 'h-1'}`} style={{ left: `${share * 100}%` }} />
        ))}
      </div>
      <div aria-hidden className="fig relative h-5 text-small text-ink2">
        {ticks
          .filter(({ text }) => text)
          .map(({ share, text }) => (
            <span key={share} className={`absolute whitespace-nowrap ${share < 0.03 ? '' : share > 0.97 ? '-translate-x-full' : '-translate-x-1/2'}`} style={{ left: `${share * 100}%` }}>
              {text}
            </span>
          ))}
      </div>
    </div>
  )
}
