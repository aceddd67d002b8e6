import type { RegionStanding } from '../../../shared/schemas/regions'
import { percent, timesUsual } from '../../lib/format'

const least = 0.25
const most = 8
/** Right of the axis there is room for the figure of a disc at its end. */
const axisEnd = 86
const marks = [0.25, 0.5, 1, 2, 4, 8]

function place(times: number): number {
  const share = Math.log(times / least) / Math.log(most / least)
  return Math.min(1, Math.max(0, share)) * axisEnd
}

export function AxisHead() {
  return (
    <span aria-hidden className="fig relative block h-9 text-small text-ink2">
      <span className="absolute top-0 -translate-x-1/2 font-words text-fine whitespace-nowrap text-ink3" style={{ left: `${place(1)}%` }}>
        times usual
      </span>
      {marks.slice(1).map((at) => (
        <span key={at} className="absolute bottom-0 -translate-x-1/2" style={{ left: `${place(at)}%` }}>
          {at < 1 ? `1/${1 / at}` : at}
        </span>
      ))}
    </span>
  )
}

/** Band, usual tick, and where the region stands; a ring where the newest usable view is not today's. */
export function AxisRow({ standing }: { standing: RegionStanding }) {
  const { view, state, progress } = standing
  const usual = view?.usual ?? null
  const relative = (value: number | null | undefined) => (value != null && usual !== null && usual > 0 ? value / usual : null)
  const [p10, p90] = [relative(view?.p10), relative(view?.p90)]
  const times = view?.timesUsual ?? null
  return (
    <span className="relative block h-12 self-stretch" role="img" aria-label={axisWords(standing)}>
      {marks.map((at) => (
        <span key={at} aria-hidden className={`absolute inset-y-0 w-px ${at === 1 ? 'bg-rule2' : 'bg-rule'}`} style={{ left: `${place(at)}%` }} />
      ))}
      {state === 'not ready' && progress ? (
        <Reading done={progress.done} total={progress.total} />
      ) : (
        <>
          {p10 !== null && p90 !== null && (
            <span className="absolute top-1/2 h-4 -translate-y-1/2 bg-band" style={{ left: `${place(p10)}%`, width: `${place(p90) - place(p10)}%` }} />
          )}
          {p10 !== null && <span className="absolute top-1/2 h-4 w-px -translate-y-1/2 bg-ink2" style={{ left: `${place(1)}%` }} />}
          {times !== null && state !== 'not comparable' && <Disc times={times} excessFrom={state === 'unusual' ? (p90 ?? 1) : undefined} ring={state !== 'unusual' && state !== 'usual'} />}
          {state === 'not comparable' && <span className="absolute top-1/2 right-0 -translate-y-1/2 bg-paper pl-1 text-fine text-ink2">new version</span>}
        </>
      )}
    </span>
  )
}

function Disc({ times, excessFrom, ring }: { times: number; excessFrom: number | undefined; ring: boolean }) {
  const at = place(times)
  const unusual = excessFrom !== undefined
  return (
    <>
      {unusual && times > excessFrom && (
        <span className="absolute top-1/2 h-0.5 -translate-y-1/2 bg-ember" style={{ left: `${place(excessFrom)}%`, width: `${at - place(excessFrom)}%` }} />
      )}
      <span
        className={`absolute top-1/2 -translate-1/2 rounded-round ${ring ? 'size-2.5 border-[1.5px] border-ink bg-paper' : unusual ? 'size-3.5 bg-ember' : 'size-2.5 bg-ink'}`}
        style={{ left: `${at}%` }}
      />
      {!ring && (
        <span
          className={`fig absolute top-1/2 -translate-y-1/2 px-1 ${unusual ? 'text-body font-heading text-ember' : 'text-small text-ink2'}`}
          style={{ left: `calc(${at}% + 8px)` }}
        >
          {timesUsual(times)}
        </span>
      )}
    </>
  )
}

function Reading({ done, total }: { done: number; total: number }) {
  const share = total > 0 ? done / total : 0
  return (
    <span className="absolute inset-y-0 right-0 left-[20%] flex items-center gap-2 bg-paper">
      <span className="h-2 w-24 min-w-0 border border-ink bg-paper">
        <span className="block h-full bg-ink" style={{ width: `${share * 100}%` }} />
      </span>
      <span className="fig text-small whitespace-nowrap text-ink2">{percent(share)}</span>
    </span>
  )
}

function axisWords({ state, view, progress, because }: RegionStanding): string {
  if (state === 'not ready' && progress) return `history read to ${percent(progress.total > 0 ? progress.done / progress.total : 0)}`
  return view?.timesUsual != null ? `${timesUsual(view.timesUsual)} times usual` : because
}
