import { colouringOf, colouringOfSpread, colouringVersion, type Colouring, type ColouredFeed } from '../../shared/colouring'
import type { ReportVariable } from '../../shared/schemas/files'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { FileRecord } from '../models/file'
import type { Tile } from './layer-pictures'
import { storedPath } from './stored-files'

/** One variable of a file that waits, with everything its picture hangs on. */
export interface FilePicture {
  file: FileRecord
  variable: ReportVariable & { gridId: number }
  hiddenFlags: string[]
  colouring: Colouring
}

export async function filePicture(context: Context, fileId: number, asked: { variable: string; hidden: string }): Promise<FilePicture> {
  const file = await context.models.files.findByPk(fileId)
  if (!file) throw new ApiError('not-found', 'There is no such file.')
  const variable = file.report?.variables.find((one) => one.name === asked.variable)
  const gridId = variable?.gridId
  if (!variable || gridId === undefined || file.status !== 'waiting') throw new ApiError('not-found', `The file ${file.name} has no picture of ${asked.variable}: only files that wait have, before their layers are read.`)
  return { file, variable: { ...variable, gridId }, hiddenFlags: asked.hidden.split(' ').filter(Boolean), colouring: colouringOfVariable(file, variable) }
}

/** Colours as the layers will have them, by the proposal; of a variable that none is proposed for, by what it holds. */
export function colouringOfVariable({ proposal, report }: Pick<FileRecord, 'proposal' | 'report'>, { name, quantity, unit, histogram }: ReportVariable): Colouring {
  const proposed = [...(proposal ? [proposal] : []), ...(report?.others ?? [])].find((one) => one.variable === name)
  const feed: ColouredFeed = proposed ?? { quantity: quantity === 'chlorophyll' || quantity === 'reflectance' ? quantity : 'other', variable: name, unit, scale: 'linear', validMin: null, validMax: null }
  return colouringOf(feed) ?? colouringOfSpread(feed, histogram ? { p2: histogram.p2, p98: histogram.p98 } : null)
}

/** Changes whenever the tile would. */
export function fileTileKey({ file, variable, hiddenFlags, colouring }: FilePicture, { z, x, y, theme }: Tile): string {
  return JSON.stringify([colouringVersion, file.checksum, variable.name, hiddenFlags, colouring, z, x, y, theme])
}

/** A map tile of the first step, as PNG; null where there is nothing to show. */
export async function fileTile(context: Context, { file, variable, hiddenFlags, colouring }: FilePicture, tile: Tile): Promise<Uint8Array | null> {
  const grid = await context.db.first<{ definition: string }>('SELECT definition FROM grids WHERE id = $id', { id: variable.gridId })
  if (!grid) return null
  const layer = {
    path: storedPath(context.env, file.checksum), fileName: file.name, variable: variable.name, step: 0, processingVersion: '', observedAt: 0, endsAt: null, producedAt: null,
    rows: variable.grid.rows, columns: variable.grid.columns, pack: null,
    reading: { hiddenFlags, storedLog10: false, fileUnit: null, unit: variable.unit },
  }
  return context.workers.light('drawTile', { layer, range: { validMin: null, validMax: null }, colouring, grid: grid.definition, ...tile })
}
