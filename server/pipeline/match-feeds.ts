import type { FeedRow } from '../models/feed'
import type { FileRow } from '../models/file'
import type { LayerTime } from '../grids/grid-source'
import { LayerRefused } from '../grids/layer-refused'
import { wavelengthInName } from '../grids/read/quantity'
import type { Seen, SeenVariable } from '../workers/inspect-file'
import { dateInName, fitsPattern } from './file-name-pattern'

/** One feed's share of a file: a variable and its steps, each with a time that is known. */
export interface FeedMatch {
  feed: FeedRow
  variable: SeenVariable
  steps: { step: number; time: LayerTime & { observedAt: number } }[]
}

/** What a feed would have needed of a file that fits none: a sentence that goes on from the feed's name. */
export interface Miss {
  feedId: number
  feed: string
  why: string
}

/** `missed` only where the file fits none of the feeds. */
export type Matching = { matches: FeedMatch[] } | { waitingFor: string; missed: Miss[] | null }

const mostMissed = 50

export const fitsNoFeed = 'It fits no feed yet. Confirm the proposal, or say which feed it belongs to.'

type Asked = Pick<FileRow, 'name' | 'feedId' | 'observedAt' | 'origin'>

/** Which feeds a file serves. A file said to belong to a feed serves that one, or is refused with the reason. */
export function matchFeeds(seen: Seen, feeds: readonly FeedRow[], file: Asked): Matching {
  const active = feeds.filter((feed) => !feed.retired && feed.derivedFrom === null)
  if (file.feedId !== null) return matchNamed(seen, active, file)
  const byPattern = active.filter((feed) => feed.fileNamePattern !== null && fitsPattern(feed.fileNamePattern, file.name))
  const candidates = byPattern.length > 0 ? byPattern : active.filter((feed) => feed.fileNamePattern === null)
  const fits = candidates.flatMap((feed) => fitOf(feed, seen, byPattern.length > 0) ?? [])
  const pairs = fits.filter((fit) => !fit.unitless)
  const unitless = fits.find((fit) => fit.unitless && !pairs.some((pair) => pair.variable === fit.variable))
  if (unitless || pairs.length === 0) {
    const missed = active.slice(0, mostMissed).map((feed) => missOf(feed, seen, file, byPattern))
    return { waitingFor: unitless ? saysNoUnit(unitless) : fitsNoFeed, missed }
  }
  const twice = pairs.find((pair) => pairs.some((other) => other !== pair && other.variable === pair.variable))
  if (twice) {
    const names = pairs.filter((pair) => pair.variable === twice.variable).map((pair) => pair.feed.name)
    return { waitingFor: `${twice.variable.name} fits more than one feed: ${names.join(', ')}. Say which one it belongs to.`, missed: null }
  }
  return timed(pairs, file)
}

function matchNamed(seen: Seen, feeds: readonly FeedRow[], file: Asked): Matching {
  const feed = feeds.find((one) => one.id === file.feedId)
  if (!feed) throw new LayerRefused('not-this-feed', 'The feed it was sent to is retired, derived or gone.', { feedId: file.feedId })
  const fit = fitOf(feed, seen, true)
  if (!fit) {
    const found = seen.variables.map((one) => `${one.name}${one.unit ? ` (${one.unit})` : ''}`)
    throw new LayerRefused(
      'not-this-feed',
      `It holds nothing that the feed ${feed.name} reads: ${feed.variable}${feed.unit ? ` in ${feed.unit}` : ''}. It holds ${found.join(', ')}.`,
      { feedId: feed.id, variables: found },
    )
  }
  return fit.unitless ? { waitingFor: saysNoUnit(fit), missed: null } : timed([fit], file)
}

function missOf(feed: FeedRow, seen: Seen, file: Asked, byPattern: readonly FeedRow[]): Miss {
  return { feedId: feed.id, feed: feed.name, why: whyMissed(feed, seen, file, byPattern) }
}

function whyMissed(feed: FeedRow, seen: Seen, file: Asked, byPattern: readonly FeedRow[]): string {
  const { fileNamePattern, unit, variable } = feed
  const named = fileNamePattern !== null && !byPattern.includes(feed)
  const found = seen.variables.find((one) => one.name === variable)
  const fit = fitOf(feed, seen, named || byPattern.length > 0)
  const held = found ? inUnit(found.name, found.unit) : heldWords(feed, seen)
  const advice = fit?.unitless ? ' Say the unit of the file’s numbers on the feed.' : ''
  const reads = fit && !fit.unitless ? null : `reads ${inUnit(variable, unit)}; this file has ${held}.${advice}`
  if (named) return `takes files named ${fileNamePattern}, and ${file.name} is not.${reads === null ? '' : ` It ${reads}`}`
  return reads ?? `reads ${inUnit(variable, unit)}, but the name of this file fits the pattern of another feed.`
}

/** The variables that measure the same, else all that are no error or flags of another. */
function heldWords(feed: FeedRow, { variables }: Seen): string {
  const own = variables.filter((one) => !one.tellsOfAnother)
  const alike = own.filter((one) => one.quantity === feed.quantity)
  const named = alike.length > 0 ? alike : own.length > 0 ? own : variables
  const words = named.slice(0, 5).map((one) => inUnit(one.name, one.unit))
  return named.length > 5 ? `${words.join(', ')} and ${named.length - 5} more` : words.join(', ')
}

const inUnit = (name: string, unit: string | null): string => (unit === null ? `${name} without a unit` : `${name} in ${unit}`)

interface Fit {
  feed: FeedRow
  variable: SeenVariable
  /** Neither the file nor the feed says the unit of its numbers: they may not be taken for the feed's. */
  unitless: boolean
}

const saysNoUnit = ({ feed, variable }: Fit): string =>
  `${variable.name} may be meant for the feed ${feed.name}, but its numbers have no unit; say the unit of the file’s numbers on the feed.`

/** The variable of a feed; where the name says nothing (a band of a picture) a lone variable of a fitting unit serves. */
function fitOf(feed: FeedRow, seen: Seen, lone: boolean): Fit | null {
  const may = seen.variables.filter((variable) => mayServe(feed, variable))
  const named = may.find((variable) => variable.name === feed.variable)
  const alone = (variable: SeenVariable) => seen.variables.length === 1 || (variable.quantity !== 'other' && variable.quantity === feed.quantity)
  const fitting = named ? [named] : lone ? may.filter((variable) => alone(variable) && sameNumbers(feed, variable)) : []
  const [variable] = fitting
  if (!variable || fitting.length > 1) return null
  return { feed, variable, unitless: variable.unit === null && feed.unit !== null && feed.fileUnit === null }
}

/** What tells of another variable serves only a feed made of that very variable; what is known to be something else, none. */
function mayServe(feed: FeedRow, { name, unit, quantity, wavelengthNm, tellsOfAnother }: SeenVariable): boolean {
  if (unit !== null && unit !== feed.unit) return false
  if (tellsOfAnother && (feed.quantity !== 'other' || name !== feed.variable)) return false
  if (quantity !== 'other' && quantity !== feed.quantity) return false
  const wanted = quantity === 'reflectance' ? wavelengthInName(feed.variable) : null
  return wanted === null || wavelengthNm === null || wanted === wavelengthNm
}

/** That numbers are logarithms was said of the feed's own variable: under another name, a unit that is plain says otherwise. */
function sameNumbers({ storedLog10 }: FeedRow, { unit, isLog10 }: SeenVariable): boolean {
  return !storedLog10 || isLog10 || unit === null
}

function timed(pairs: { feed: FeedRow; variable: SeenVariable }[], file: Asked): Matching {
  const matches: FeedMatch[] = []
  for (const { feed, variable } of pairs) {
    const steps = variable.times.map((time, step) => ({ step, time: withTime(time, feed, file, variable.times.length) }))
    const known = steps.flatMap(({ step, time }) => (time === null ? [] : [{ step, time }]))
    if (known.length < steps.length) return { waitingFor: 'It says nowhere when it was observed. Send it again with the time (observedAt), or give its feed a file-name pattern.', missed: null }
    matches.push({ feed, variable, steps: known })
  }
  return { matches }
}

function withTime(time: LayerTime, feed: FeedRow, file: Asked, count: number): (LayerTime & { observedAt: number }) | null {
  if (time.observedAt !== null) return { ...time, observedAt: time.observedAt }
  if (count > 1) return null
  if (file.observedAt !== null) return { ...time, observedAt: file.observedAt, hasClock: file.observedAt % 86_400_000 !== 0, from: file.origin === 'pull' ? 'the address' : 'the form' }
  const named = feed.fileNamePattern === null ? null : dateInName(feed.fileNamePattern, file.name)
  return named && { ...time, observedAt: named.instant, hasClock: named.hasClock, from: 'the file name' }
}
