import type { ReportVariable } from '../../shared/schemas/files'
import type { Context } from '../context'

type BandsOf<T> = (variables: readonly ReportVariable[]) => T[]

/** Reports hold what was understood of a file; files that are being read for the first time have it too. */
export async function bandsOfFiles<T>(context: Context, fileIds: readonly number[], bandsOf: BandsOf<T>): Promise<Map<number, T[]>> {
  const rows = await context.db.all<{ id: number; variables: string | null }>(
    `SELECT id, report ->> '$.variables' AS variables FROM files WHERE id IN (SELECT value FROM json_each($ids))`,
    { ids: JSON.stringify([...new Set(fileIds)]) },
  )
  return new Map(rows.map(({ id, variables }) => [id, variables === null ? [] : bandsOf(JSON.parse(variables) as ReportVariable[])]))
}

export interface NeighbourLayer {
  fileId: number
  variable: string
  step: number
  wavelengthNm: number
}

/** For each layer, trusted layers of other feeds on its grid, at its time, in its processing version; the newest first. */
export async function neighbourLayers(
  context: Context,
  layerIds: readonly number[],
  feedIds: readonly number[],
  bandsOf: BandsOf<{ variable: string; wavelengthNm: number }>,
): Promise<Map<number, NeighbourLayer[]>> {
  if (feedIds.length === 0) return new Map()
  const rows = await context.db.all<{ layerId: number; fileId: number; variable: string; step: number }>(
    `SELECT l.id AS layerId, n.file_id AS fileId, n.variable, n.step FROM json_each($layerIds) w JOIN layers l ON l.id = w.value
     JOIN json_each($feedIds) f JOIN layers n ON n.feed_id = f.value AND n.observed_at = l.observed_at AND n.ends_at IS l.ends_at
       AND n.grid_id = l.grid_id AND n.processing_version = l.processing_version AND n.suspect_at IS NULL AND n.replaced_by IS NULL
     ORDER BY n.produced_at DESC NULLS LAST, n.id DESC`,
    { layerIds: JSON.stringify(layerIds), feedIds: JSON.stringify(feedIds) },
  )
  const bands = await bandsOfFiles(context, rows.map((row) => row.fileId), bandsOf)
  const found = new Map<number, NeighbourLayer[]>()
  for (const { layerId, fileId, variable, step } of rows) {
    const band = bands.get(fileId)?.find((one) => one.variable === variable)
    if (band) found.set(layerId, [...(found.get(layerId) ?? []), { fileId, variable, step, wavelengthNm: band.wavelengthNm }])
  }
  return found
}
