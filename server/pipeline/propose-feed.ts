import type { FeedProposal } from '../../shared/schemas/feeds'
import { proposeHiddenFlags } from './propose-flags'
import type { Seen, SeenVariable } from '../workers/inspect-file'

const dayMs = 86_400_000

/** What a feed for this kind of file would be; null when the file holds nothing that a feed could be sure of. */
export function proposeFeed(seen: Seen, fileName: string, takenNames: readonly string[]): FeedProposal | null {
  const variable = mainVariable(seen)
  if (!variable) return null
  const cadence = cadenceOf(variable)
  const label = variable.quantity === 'chlorophyll' ? 'Chlorophyll' : (variable.longName ?? variable.name)
  return {
    name: unusedName(`${label}, ${cadence}`.slice(0, 90), takenNames),
    quantity: variable.quantity,
    variable: variable.name,
    unit: variable.unit ?? (variable.quantity === 'chlorophyll' ? 'mg m-3' : null),
    scale: variable.quantity === 'chlorophyll' ? 'log10' : 'linear',
    cadence,
    stage: 'near-real-time',
    processingVersion: seen.processingVersion ?? '1',
    validMin: null,
    validMax: null,
    fileNamePattern: variable.times.some((time) => time.observedAt === null) ? patternOf(fileName) : null,
    freshnessLimitHours: 72,
    hiddenFlags: proposeHiddenFlags(variable.flagMeanings),
    flagMeanings: variable.flagMeanings,
    gapFilled: variable.gapFilled === 'unmarked',
    storedLog10: false,
    fileUnit: null,
    silentAfterHours: cadence === 'daily' ? 72 : cadence === '8-day' ? 24 * 20 : 24 * 70,
  }
}

function mainVariable(seen: Seen): SeenVariable | null {
  const chlorophyll = seen.variables.filter((variable) => variable.quantity === 'chlorophyll')
  const reflectance = seen.variables.filter((variable) => variable.quantity === 'reflectance')
  return chlorophyll[0] ?? reflectance[0] ?? (seen.variables.length === 1 ? seen.variables[0]! : null)
}

function cadenceOf(variable: SeenVariable): FeedProposal['cadence'] {
  const first = variable.times[0]
  const second = variable.times[1]
  const period =
    first?.observedAt != null && first.endsAt !== null
      ? first.endsAt - first.observedAt
      : first?.observedAt != null && second?.observedAt != null
        ? second.observedAt - first.observedAt
        : dayMs
  if (period > 20 * dayMs) return 'monthly'
  return period > 4 * dayMs ? '8-day' : 'daily'
}

/** A name with its date made a pattern: chl_20260611.tif becomes chl_{yyyy}{MM}{dd}.tif. */
function patternOf(fileName: string): string | null {
  const pattern = fileName
    .replace(/((?:19|20)\d\d)([-_]?)(0[1-9]|1[0-2])\2(0[1-9]|[12]\d|3[01])/, '{yyyy}$2{MM}$2{dd}')
    .replace(/((?:19|20)\d\d)([0-3]\d\d)(?!\d)/, '{yyyy}{DDD}')
  return pattern.includes('{yyyy}') ? pattern : null
}

function unusedName(name: string, taken: readonly string[]): string {
  const known = new Set(taken.map((one) => one.toLowerCase()))
  for (let n = 1; ; n++) {
    const candidate = n === 1 ? name : `${name} (${n})`
    if (!known.has(candidate.toLowerCase())) return candidate
  }
}
