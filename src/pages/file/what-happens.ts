import type { FeedProposal } from '../../../shared/schemas/feeds'
import type { OffingFile, ReportVariable } from '../../../shared/schemas/files'
import { unitWords } from '../../../shared/figure-text'
import { dayWithYear } from '../../lib/dates'
import { countWords } from '../../lib/format'

export interface Outcome {
  /** A figure where there is one, else a word. */
  head: string
  says: string
}

/** Fewest earlier years that a year is judged by. */
const yearsNeeded = 2

/** What confirming these feeds does, in plain sentences, counted before anyone confirms. */
export function whatHappens(file: OffingFile, feeds: readonly FeedProposal[]): Outcome[] {
  const variables = feeds.flatMap((feed) => file.report?.variables.find((variable) => variable.name === feed.variable) ?? [])
  const layers = variables.reduce((sum, variable) => sum + variable.times.count, 0)
  return [
    { head: countWords(layers, 'layer'), says: `${layers === 1 ? 'is' : 'are'} read: ${daysWords(variables[0], file.observedAt, feeds[0]?.fileNamePattern ?? null)}${feeds.length > 1 ? `, for ${feeds.length} feeds` : ''}.` },
    regionsOutcome(file),
    { head: 'Later files', says: laterWords(feeds) },
    { head: 'Alerts', says: alertWords(feeds, variables[0]) },
  ]
}

function daysWords(variable: ReportVariable | undefined, observedAt: string | null, pattern: string | null): string {
  const { first = null, last = null, count = 0 } = variable?.times ?? {}
  if (!first && observedAt) return `${dayWithYear(observedAt)}, as said when it was sent`
  if (!first && pattern && /\{(dd|DDD)\}/.test(pattern)) return 'its day is taken from the file name by the pattern above'
  if (!first) return 'once its time is known. The file names none: give a pattern with the date of its name, or send it again with its time'
  const [from, to] = [dayWithYear(first), dayWithYear(last ?? first)]
  return from === to ? from : `${countWords(count, 'step')} from ${from} to ${to}`
}

function regionsOutcome({ wouldGive }: OffingFile): Outcome {
  if (!wouldGive || wouldGive.ofRegions === 0) return { head: 'No regions', says: 'are drawn yet; figures are made once there are.' }
  const { regions, ofRegions } = wouldGive
  const names = regions.slice(0, 3).map((region) => region.name)
  const which = regions.length === 0 ? 'The layers can be looked at all the same.' : regions.length === ofRegions ? '' : `${names.join(', ')}${regions.length > 3 ? ` and ${regions.length - 3} more` : ''}.`
  return { head: `${regions.length} of ${ofRegions} regions`, says: `meet${regions.length === 1 ? 's' : ''} the grid and get${regions.length === 1 ? 's' : ''} figures. ${which}`.trim() }
}

function laterWords(feeds: readonly FeedProposal[]): string {
  const [one] = feeds
  if (!one) return 'are matched with nothing while no feed is chosen.'
  const names = feeds.length > 3 ? `any of these ${feeds.length} variables` : feeds.map((feed) => feed.variable).join(' or ')
  const unit = one.unit ? ` in ${unitWords(one.unit)}` : ''
  const named = one.fileNamePattern ? `that are named like ${one.fileNamePattern} and hold ${names}${unit}` : `that hold ${names}${unit}, whatever their name,`
  return `${named} are read by themselves.`
}

function alertWords(feeds: readonly FeedProposal[], variable: ReportVariable | undefined): string {
  if (feeds.length > 0 && feeds.every((feed) => feed.gapFilled)) {
    return 'cannot be raised: cells of this file were filled in and it does not say which, so nobody can tell what was seen.'
  }
  const rule = feeds.some((feed) => feed.quantity === 'chlorophyll')
    ? 'Regions that have a rule keep it; for this feed add one on the region’s page. A region without any gets Offing’s first rule.'
    : 'Rules on it are written on a region’s page.'
  const years = yearsOf(variable)
  const history =
    years.length > yearsNeeded
      ? `This file holds ${years.length} years: its last can be judged by those before.`
      : `A year is judged by at least ${yearsNeeded} earlier ones of the same version; this file holds ${years.length > 0 ? countWords(years.length, 'year') : 'a single layer'}, so until more is read its views are “not ready” and raise none.`
  return `${history} ${rule}`
}

function yearsOf(variable: ReportVariable | undefined): number[] {
  const { first = null, last = null } = variable?.times ?? {}
  if (!first) return []
  const [from, to] = [Number(first.slice(0, 4)), Number((last ?? first).slice(0, 4))]
  return Array.from({ length: to - from + 1 }, (_, i) => from + i)
}
