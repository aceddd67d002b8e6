import type { feedChange } from '../../shared/schemas/feeds'
import type { z } from 'zod'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import { unitFactor } from '../grids/unit-factor'
import type { FeedRecord, FeedRow } from '../models/feed'
import type { FeedMatch } from './match-feeds'

type Change = Omit<z.infer<typeof feedChange>, 'version'>

/** Settings that make other figures of the same files. */
const readingSettings = ['hiddenFlags', 'storedLog10', 'fileUnit', 'validMin', 'validMax'] as const

export function changesReading(feed: FeedRow, change: Change): boolean {
  return readingSettings.some((name) => change[name] !== undefined && JSON.stringify(change[name]) !== JSON.stringify(feed[name]))
}

/** Settings by which files find their feed: what waits may fit now. */
const matchingSettings = ['fileNamePattern', 'fileUnit', 'storedLog10', 'retired'] as const

export function changesMatching(before: FeedRow, after: FeedRow): boolean {
  return matchingSettings.some((name) => before[name] !== after[name])
}

/** Refuses a unit of the file that Offing cannot bring to the feed's, and a valid range turned round. */
export function checkReading({ fileUnit, unit, validMin, validMax }: Pick<FeedRow, 'fileUnit' | 'unit' | 'validMin' | 'validMax'>): void {
  if (fileUnit !== null && unitFactor(fileUnit, unit) === null) {
    const message = `Offing knows no conversion from "${fileUnit}" to ${unit ?? 'no unit'}.`
    throw new ApiError('not-valid', message, { fields: { fileUnit: message } })
  }
  if (validMin !== null && validMax !== null && validMin > validMax) {
    const message = 'The valid range ends before it begins.'
    throw new ApiError('not-valid', message, { fields: { validMin: message } })
  }
}

/**
 * What a file says of quality is kept with the feeds it served: flag meanings not met before, for people to choose from;
 * and that cells are filled in without saying which, which no feed may overlook.
 */
export async function noteQuality(context: Context, tx: Transaction, matches: readonly FeedMatch[]): Promise<void> {
  for (const { feed, variable } of matches) {
    const record: FeedRecord = await context.models.feeds.findByPk(feed.id, { transaction: tx, rejectOnEmpty: true })
    const flagMeanings = [...new Set([...record.flagMeanings, ...variable.flagMeanings])].slice(0, 200)
    const gapFilled = record.gapFilled || variable.gapFilled === 'unmarked'
    if (flagMeanings.length === record.flagMeanings.length && gapFilled === record.gapFilled) continue
    await record.update({ flagMeanings, gapFilled }, { transaction: tx })
  }
}
