import type { MaskMaking, WaterMaskShown } from '../../../shared/schemas/masks'
import { dayWithYear } from '../../lib/dates'
import { countWords, percent } from '../../lib/format'

/** "Valid share, version 2", as an alert names it. */
export function maskName({ kind, version }: Pick<WaterMaskShown, 'kind' | 'version'>): string {
  return `${kind[0]!.toUpperCase()}${kind.slice(1)}, version ${version}`
}

/** What makes a cell water by this mask. */
export function maskMeaning({ kind, minShare }: Pick<WaterMaskShown, 'kind' | 'minShare'>): string {
  if (kind === 'land outline') return 'cells whose centre is water in the 1:50 million land outline that comes with Offing'
  return kind === 'own' ? 'cells the files themselves do not mark as land' : `cells valid in at least ${percent(minShare ?? 0)} of the layers`
}

export function periodWords({ from, to }: { from: string | null; to: string | null }): string {
  return from === null || to === null ? '' : `${dayWithYear(from)} to ${dayWithYear(to)}`
}

/** What came of the last mask that was asked for; undefined while it is on its way, or made and standing in the list. */
export function outcomeWords({ outcome, version, job, layers, from, to }: MaskMaking): { fault: boolean; words: string } | undefined {
  if (outcome === 'same') return { fault: false, words: `Made again from ${countWords(layers, 'layer')} of ${periodWords({ from, to })}: the same as version ${version}, so there is no new version.` }
  if (outcome === 'made') return undefined
  if (job?.state === 'failed') return { fault: true, words: `The last mask was not made: ${job.lastError ?? 'its job failed'} Nothing changed.` }
  if (job === null || job.state === 'cancelled' || job.state === 'done') return { fault: false, words: 'The last mask asked for was not made: its job was cancelled. Nothing changed.' }
  return undefined
}
