import { wholeWaterCells } from '../../shared/science/whole-water'
import type { Context } from '../context'
import type { RegionCellWeights } from '../workers/tasks'

export type GridSize = Pick<RegionCellWeights, 'rows' | 'columns'>

interface Kept {
  cellIndex: Buffer
  share: Buffer
  areaKm2: Buffer
  outlineWater: Buffer
  outsideWaterKm2: number
}

/** The weights of a region's cells on a grid, water as the land outline has it: made once, then kept. */
export async function cellWeights(context: Context, geometryId: number, gridId: number, { rows, columns }: GridSize): Promise<RegionCellWeights> {
  const kept = await context.db.first<Kept>(
    `SELECT cell_index AS cellIndex, share, area_km2 AS areaKm2, outline_water AS outlineWater, outside_water_km2 AS outsideWaterKm2 FROM cell_weights
     WHERE geometry_id = $geometryId AND grid_id = $gridId`,
    { geometryId, gridId },
  )
  if (kept) {
    return {
      rows,
      columns,
      index: new Uint32Array(copyOf(kept.cellIndex)),
      share: new Float64Array(copyOf(kept.share)),
      areaKm2: new Float64Array(copyOf(kept.areaKm2)),
      water: new Uint8Array(copyOf(kept.outlineWater)),
      outsideWaterKm2: kept.outsideWaterKm2,
    }
  }
  return makeWeights(context, geometryId, gridId, { rows, columns })
}

async function makeWeights(context: Context, geometryId: number, gridId: number, size: GridSize): Promise<RegionCellWeights> {
  const geometry = await context.models.geometries.findByPk(geometryId, { rejectOnEmpty: true })
  const grid = await context.db.first<{ definition: string }>('SELECT definition FROM grids WHERE id = $gridId', { gridId })
  const weights = await context.workers.heavy('weighCells', { geometry: geometry.geometry, shoreBufferKm: geometry.shoreBufferKm, grid: grid!.definition })
  const { index, share, areaKm2, water, outsideWaterKm2 } = weights
  await context.db.write((tx) =>
    context.db.run(
      `INSERT INTO cell_weights (geometry_id, grid_id, cells, cell_index, share, area_km2, outline_water, outside_water_km2, whole_water)
       VALUES ($geometryId, $gridId, $cells, $index, $share, $areaKm2, $water, $outsideWaterKm2, $wholeWater) ON CONFLICT DO NOTHING`,
      {
        geometryId,
        gridId,
        cells: index.length,
        index: bytesOf(index),
        share: bytesOf(share),
        areaKm2: bytesOf(areaKm2),
        water: bytesOf(water),
        outsideWaterKm2,
        wholeWater: wholeWaterCells(weights),
      },
      tx,
    ),
  )
  return { ...size, ...weights }
}

function bytesOf(array: Uint32Array | Float64Array | Uint8Array): Buffer {
  return Buffer.from(array.buffer, array.byteOffset, array.byteLength)
}

/** Buffers from the database may start anywhere in memory; typed arrays need their own. */
function copyOf(buffer: Buffer): ArrayBuffer {
  return new Uint8Array(buffer).buffer
}
