import { usualSilence, type FeedProposal } from '../../shared/schemas/feeds'
import { proposeHiddenFlags } from './propose-flags'
import type { Seen, SeenVariable } from '../workers/inspect-file'

const dayMs = 86_400_000
const mostOthers = 59

/** A feed to confirm, and further ones that the same file could serve. */
export interface Proposed {
  proposal: FeedProposal
  others: FeedProposal[]
}

/**
 * What feeds for this kind of file would be: chlorophyll first, else the bands of reflectance together, else the only
 * quantity there is. Null when the file holds nothing that a feed could be sure of; the error, bias, uncertainty, count or
 * flags of another variable never are.
 */
export function proposeFeeds(seen: Seen, fileName: string, takenNames: readonly string[]): Proposed | null {
  const [main, ...others] = proposable(seen.variables)
  if (!main) return null
  const taken = [...takenNames]
  const propose = (variable: SeenVariable) => {
    const proposal = proposalOf(variable, labelOf(variable, main), seen, fileName, taken)
    taken.push(proposal.name)
    return proposal
  }
  return { proposal: propose(main), others: others.slice(0, mostOthers).map(propose) }
}

function proposable(all: readonly SeenVariable[]): SeenVariable[] {
  const variables = all.filter((variable) => !variable.tellsOfAnother)
  const of = (quantity: SeenVariable['quantity']) => variables.filter((variable) => quantityOf(variable) === quantity)
  const known = [...of('chlorophyll'), ...of('reflectance')]
  return known.length > 0 || variables.length > 1 ? known : variables
}

/** What is named as chlorophyll and has no unit is proposed as such, its unit with it: the person who confirms says it. */
const quantityOf = ({ quantity, lacksUnit, unit }: SeenVariable): SeenVariable['quantity'] => (lacksUnit && unit === null ? 'chlorophyll' : quantity)

function proposalOf(variable: SeenVariable, label: string, seen: Seen, fileName: string, takenNames: readonly string[]): FeedProposal {
  const cadence = cadenceOf(variable)
  const quantity = quantityOf(variable)
  return {
    name: unusedName(`${label}, ${cadence}`.slice(0, 90), takenNames),
    quantity,
    variable: variable.name,
    unit: variable.unit ?? (quantity === 'chlorophyll' ? 'mg m-3' : null),
    scale: quantity === 'chlorophyll' ? 'log10' : 'linear',
    cadence,
    stage: seen.stage ?? 'near-real-time',
    processingVersion: seen.processingVersion ?? '1',
    validMin: null,
    validMax: null,
    fileNamePattern: variable.times.some((time) => time.observedAt === null) ? patternOf(fileName) : null,
    freshnessLimitHours: 72,
    hiddenFlags: proposeHiddenFlags(variable.flagMeanings),
    flagMeanings: variable.flagMeanings,
    gapFilled: variable.gapFilled === 'unmarked',
    storedLog10: variable.isLog10,
    fileUnit: variable.unit === null && quantity === 'chlorophyll' ? 'mg m-3' : null,
    silentAfterHours: usualSilence[cadence],
  }
}

function labelOf(variable: SeenVariable, main: SeenVariable): string {
  const { wavelengthNm, longName, name } = variable
  const quantity = quantityOf(variable)
  if (quantity === 'chlorophyll') return variable === main ? 'Chlorophyll' : `Chlorophyll ${name}`
  return quantity === 'reflectance' && wavelengthNm !== null ? `Reflectance ${wavelengthNm} nm` : (longName ?? name)
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
