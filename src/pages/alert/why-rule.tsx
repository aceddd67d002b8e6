import type { Evidence } from '../../../shared/schemas/alerts'
import { threeDigits } from '../../lib/format'
import { decadeSegments, whyRange } from './why-scale'

/** One log scale: the usual band, the usual median, the threshold, the value; the excess is the ember line. */
export function WhyRule({ evidence }: { evidence: Evidence }) {
  const { value, usual, p10, p90, threshold } = evidence
  const range = whyRange([value, usual, p10, p90, threshold])
  if (!range) return null
  const place = (at: number) => (Math.log(Math.min(range.to, Math.max(range.from, at)) / range.from) / Math.log(range.to / range.from)) * 100
  const positive = (at: number | null): at is number => at !== null && at > 0
  const segments = decadeSegments(range.from, range.to)
  return (
    <div role="img" aria-label={spoken(evidence)} className="relative h-25 overflow-x-clip">
      {positive(p10) && positive(p90) && (
        <div className="absolute top-[46px] h-[22px] bg-band" style={{ left: `${place(p10)}%`, width: `${place(p90) - place(p10)}%` }} />
      )}
      {positive(usual) && (
        <>
          <Tick at={place(usual)} className="top-[38px] h-[30px] border-l border-ink" />
          <Word at={place(usual)} className="top-[18px] text-ink2" before>
            usual {threeDigits(usual)}
          </Word>
        </>
      )}
      {positive(threshold) && (
        <>
          <Tick at={place(threshold)} className="top-[16px] h-[52px] border-l border-dashed border-ember" />
          <Word at={place(threshold)} className="top-[-2px] text-ember">
            threshold {threeDigits(threshold)}
          </Word>
        </>
      )}
      {positive(value) && (
        <>
          {positive(usual) && value > usual && (
            <div className="absolute top-[56px] h-0.5 bg-ember" style={{ left: `${place(usual)}%`, width: `${place(value) - place(usual)}%` }} />
          )}
          <div className="absolute top-[49px] size-4 -translate-x-1/2 rounded-round bg-ember" style={{ left: `${place(value)}%` }} />
          <div
            className={`fig absolute top-[42px] px-4 text-lead text-ember ${place(value) > 82 ? '-translate-x-full' : ''}`}
            style={{ left: `${place(value)}%` }}
          >
            {threeDigits(value)}
          </div>
        </>
      )}
      <div className="absolute inset-x-0 top-[68px] h-[7px] border border-(--segment) bg-paper">
        {segments
          .filter((segment) => segment.inked)
          .map((segment) => (
            <div key={segment.from} className="absolute inset-y-0 bg-(--segment)" style={{ left: `${place(segment.from)}%`, width: `${place(segment.to) - place(segment.from)}%` }} />
          ))}
      </div>
      <div className="fig text-small text-ink2">
        {range.labels.map((at, index) => (
          <span
            key={at}
            className={`absolute top-[80px] ${index === 0 ? '' : index === range.labels.length - 1 && place(at) > 99 ? '-translate-x-full' : '-translate-x-1/2'}`}
            style={{ left: `${place(at)}%` }}
          >
            {threeDigits(at)}
          </span>
        ))}
      </div>
    </div>
  )
}

function Tick({ at, className }: { at: number; className: string }) {
  return <div className={`absolute w-0 ${className}`} style={{ left: `${at}%` }} />
}

function Word({ at, className, before = false, children }: { at: number; className: string; before?: boolean; children: React.ReactNode }) {
  const left = before ? at > 14 : at > 78
  return (
    <div className={`absolute px-1.5 text-small whitespace-nowrap ${left ? '-translate-x-full' : ''} ${className}`} style={{ left: `${at}%` }}>
      {children}
    </div>
  )
}

function spoken({ value, usual, p10, p90, threshold }: Evidence): string {
  const words = [`value ${threeDigits(value)}`]
  if (usual !== null) words.push(`usual ${threeDigits(usual)}`)
  if (p10 !== null && p90 !== null) words.push(`usual band ${threeDigits(p10)} to ${threeDigits(p90)}`)
  if (threshold !== null) words.push(`threshold ${threeDigits(threshold)}`)
  return words.join(', ')
}
