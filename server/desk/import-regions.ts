import { newRegion } from '../../shared/schemas/regions'
import type { ImportReply } from '../../shared/schemas/outlines'
import type { Person } from '../accounts/person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { LayerRefused } from '../grids/layer-refused'
import { drawRegion } from './draw-region'
import { presentOutline, presentRefusal } from './present-outline'

/** What a file of areas holds, each as it would be kept or why not; with `save` each that can be is drawn at once. */
export async function importRegions(context: Context, person: Person, file: { name: string; bytes: Buffer }, { save, inland }: { save: boolean; inland: boolean }): Promise<ImportReply> {
  const read = await context.workers.light('readAreas', { bytes: file.bytes, fileName: file.name, inland }).catch((error: unknown) => {
    if (error instanceof LayerRefused) return { refusedFile: error.message }
    throw error
  })
  if ('refusedFile' in read) throw new ApiError('not-valid', read.refusedFile, { fields: { file: read.refusedFile } })
  const items: ImportReply['items'] = []
  for (const { name, outcome } of read.areas) {
    if ('outline' in outcome) {
      const { geometry } = outcome.outline
      const region = save ? await drawRegion(context, person, newRegion.parse({ name, geometry, inland })) : null
      items.push({ name, found: presentOutline(outcome.outline), refusal: null, regionId: region?.id ?? null })
      continue
    }
    items.push({ name, found: null, refusal: presentRefusal(outcome.refused), regionId: null })
  }
  return { format: read.format, fileName: file.name, notes: read.notes, items }
}
