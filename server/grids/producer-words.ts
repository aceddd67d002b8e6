import type { FeedProposal } from '../../shared/schemas/feeds'
import type { GridSource } from './grid-source'

export type Stage = FeedProposal['stage']

/** Attributes that name a version of the processing, the plainest first; some conventions call it that of the product. */
const versionNames = ['processing_version', 'product_version', 'version', 'source_version']
const stageNames = ['processing_level', 'title', 'product_type', 'product_name', 'id']
const nearRealTime = /(^|[^a-z])nrt([^a-z]|$)|near[-_ ]?real[-_ ]?time/i
const reprocessed = /re-?process(ed|ing)|re-?analysis|(^|[^a-z])rep([^a-z]|$)/i

/** What the producer says in global attributes of the version and the stage of a file. */
export function producerWords(attributes: GridSource['globalAttributes']): { processingVersion: string | null; stage: Stage | null } {
  const version = versionNames.map((name) => wordsOf(attributes[name])).find((words) => words !== '')
  const said = stageNames.map((name) => wordsOf(attributes[name]))
  const stages: [RegExp, Stage][] = [[nearRealTime, 'near-real-time'], [reprocessed, 'reprocessed']]
  const [stage, second] = stages.filter(([words]) => said.some((text) => words.test(text)))
  // Said to be both, it is for a person to tell.
  return { processingVersion: version?.slice(0, 50) ?? null, stage: stage && !second ? stage[1] : null }
}

function wordsOf(value: GridSource['globalAttributes'][string] | undefined): string {
  if (typeof value === 'number') return Number.isFinite(value) ? String(value) : ''
  return typeof value === 'string' ? value.trim() : ''
}
