import type { FeedPull, PullRun } from '../../../shared/schemas/pulls'
import { countWords } from '../../lib/format'

/** What a run came to: "2 files fetched, 1 not there yet, 5 as before." */
export function runWords(run: PullRun): string {
  const parts = [
    run.fetched > 0 && `${countWords(run.fetched, 'file')} fetched`,
    run.notThere > 0 && `${run.notThere} not there yet`,
    run.unchanged > 0 && `${run.unchanged} as before`,
    run.failed > 0 && `${run.failed} failed`,
  ].filter((part) => part !== false)
  const counted = parts.length > 0 ? `${parts.join(', ')}.` : ''
  return [counted, run.sentence].filter(Boolean).join(' ') || 'Nothing to ask.'
}

export function everyWords({ everyHours, atMinute }: { everyHours: number; atMinute: number }): string {
  const minute = String(atMinute).padStart(2, '0')
  if (everyHours === 1) return `every hour at minute ${minute}`
  return everyHours === 24 ? `every day at 00:${minute} UTC` : `every ${everyHours} hours at minute ${minute}`
}

export function lookBackWords(days: number): string {
  return days === 0 ? 'today only' : `today and ${countWords(days, 'day')} back`
}

export const credentialWords: Record<NonNullable<FeedPull['settings']>['credentials'], string> = {
  none: 'none',
  basic: 'name and password',
  bearer: 'token',
}

export function stepWords(minutes: number): string {
  if (minutes === 1440) return 'a day'
  if (minutes === 60) return 'an hour'
  return minutes > 60 ? `${minutes / 60} hours` : `${minutes} minutes`
}
