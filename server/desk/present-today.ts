import { ageText } from '../../shared/figure-text'
import { dateOf } from '../../shared/science/local-day'
import type { Today } from '../../shared/schemas/today'
import type { RegionStanding } from '../../shared/schemas/regions'
import type { Context } from '../context'
import { standings } from './standing'

const dayMs = 86_400_000
const shownDays = 32

/** The first page: is anything unusual, and how fresh is what is known. */
export async function presentToday(context: Context): Promise<Today> {
  const now = context.clock.now()
  const standing = [...(await standings(context)).values()]
  const feedId = mostWatched(standing)
  const ages = standing.flatMap((one) => (one.view && one.feedId === feedId ? [one.view.ageHours] : []))
  return {
    now: new Date(now).toISOString(),
    demo: context.env.mode === 'demo',
    statement: todayStatement(standing),
    newestUsableViewHours: ages.length > 0 ? Math.min(...ages) : null,
    coverageFloor: standing[0]?.coverageFloor ?? 0.25,
    feedId,
    days: feedId === null ? [] : await daysOf(context, feedId, now),
  }
}

function mostWatched(standing: readonly RegionStanding[]): number | null {
  const counts = new Map<number, number>()
  for (const { feedId } of standing) if (feedId !== null) counts.set(feedId, (counts.get(feedId) ?? 0) + 1)
  return [...counts].sort((a, b) => b[1] - a[1] || a[0] - b[0])[0]?.[0] ?? null
}

interface SeenRow {
  day: number
  seenKm2: number
  waterKm2: number
  layerId: number
}

async function daysOf(context: Context, feedId: number, now: number): Promise<Today['days']> {
  const today = Math.floor(now / dayMs)
  const fromDay = today - shownDays + 1
  const rows = await context.db.all<SeenRow>(
    `SELECT s.day, sum(s.coverage * g.area_km2) AS seenKm2, sum(g.area_km2) AS waterKm2, max(s.layer_id) AS layerId
     FROM summaries s JOIN regions r ON r.geometry_id = s.geometry_id AND r.retired_at IS NULL JOIN geometries g ON g.id = s.geometry_id
     WHERE s.feed_id = $feedId AND s.day >= $fromDay AND s.coverage IS NOT NULL GROUP BY s.day`,
    { feedId, fromDay },
  )
  const alerts = await context.db.all<{ id: number; severity: Today['days'][number]['alerts'][number]['severity']; raisedAt: number }>(
    'SELECT id, severity, raised_at AS raisedAt FROM alerts WHERE raised_at >= $from ORDER BY id',
    { from: fromDay * dayMs },
  )
  const byDay = new Map(rows.map((row) => [row.day, row]))
  return Array.from({ length: shownDays }, (_, i) => {
    const day = fromDay + i
    const row = byDay.get(day)
    return {
      day: dateOf(day),
      seen: row ? row.seenKm2 / row.waterKm2 : null,
      layerId: row?.layerId ?? null,
      due: day === today && !row,
      alerts: alerts.filter((alert) => Math.floor(alert.raisedAt / dayMs) === day).map(({ id, severity }) => ({ id, severity })),
    }
  })
}

/** The page's sentence, from a closed set of patterns. */
export function todayStatement(standing: readonly RegionStanding[]): Today['statement'] {
  const count = (state: RegionStanding['state']) => standing.filter((one) => one.state === state).length
  const total = standing.length
  if (total === 0) return { worry: null, rest: 'No region yet.', detail: 'Draw the water you answer for; its history is read at once.' }
  const unusual = count('unusual')
  const unseen = standing.filter((one) => one.state === 'not seen' || one.state === 'stale')
  const ages = standing.flatMap((one) => (one.view ? [one.view.ageHours] : []))
  const newest = ages.length > 0 ? `newest usable view ${ageText(Math.min(...ages))} old` : 'no usable view yet'
  const worry = unusual === 0 ? null : `${words(unusual, true)} of ${words(total)} region${total === 1 ? '' : 's'} ${unusual === 1 ? 'is' : 'are'} unusual.`
  const usual = count('usual')
  const rest =
    usual === total
      ? `${total === 1 ? 'The region is' : `All ${words(total)} regions are`} usual; ${newest}.`
      : unseen.length > 0
        ? unseenSentence(unseen, unusual > 0)
        : worry === null
          ? `${words(usual, true)} of ${words(total)} regions ${usual === 1 ? 'is' : 'are'} usual; ${newest}.`
          : ''
  return { worry, rest, detail: detailOf(count, newest) }
}

function unseenSentence(unseen: readonly RegionStanding[], more: boolean): string {
  const ages = unseen.flatMap((one) => (one.view ? [one.view.ageHours / 24] : []))
  const n = `${words(unseen.length, true)}${more ? ' more' : ''} ${unseen.length === 1 ? 'was' : 'were'}`
  if (ages.length === 0) return `${n} never seen well enough.`
  const [low, high] = [Math.round(Math.min(...ages)), Math.round(Math.max(...ages))]
  const days = low === high ? `${words(low)} day${low === 1 ? '' : 's'}` : `${words(low)} to ${words(high)} days`
  return `${n} last seen ${days} ago.`
}

function detailOf(count: (state: RegionStanding['state']) => number, newest: string): string {
  const parts = (['not ready', 'not comparable', 'usual'] as const).flatMap((state) => {
    const n = count(state)
    return n === 0 ? [] : [`${words(n)} ${n === 1 ? 'is' : 'are'} ${state}`]
  })
  const sentence = parts.join(', ')
  return `${newest[0]!.toUpperCase()}${newest.slice(1)}.${sentence ? ` ${sentence[0]!.toUpperCase()}${sentence.slice(1)}.` : ''}`
}

const numerals = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten', 'eleven', 'twelve']

function words(n: number, capital = false): string {
  const word = numerals[n] ?? String(n)
  return capital ? word[0]!.toUpperCase() + word.slice(1) : word
}
