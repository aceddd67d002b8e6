import type { Position } from 'geojson'
import type { Grid } from '../../shared/science/grid'
import type { AreaFile } from '../geography/import/area-file'
import type { CheckedOutline } from '../geography/outline/check-outline'

/** What a worker does with outlines as people send them. A refusal is an answer, not a fault. */
export interface OutlineTasks {
  checkOutline: { input: { sent: unknown; inland: boolean }; output: OutlineOutcome }
  measureOutline: {
    input: { sent: unknown; inland: boolean; shoreBufferKm: number; grids: MeasuredGrid[] }
    output: { outline: CheckedOutline; counts: GridCount[] } | RefusedOutline
  }
  readAreas: { input: { bytes: Uint8Array; fileName: string; inland: boolean }; output: AreasRead | { refusedFile: string } }
}

export interface AreasRead {
  format: AreaFile['format']
  notes: string[]
  areas: { name: string; outcome: OutlineOutcome }[]
}

export interface RefusedOutline {
  refused: { sentence: string; place: Position | null; reason: 'all-land' | null }
}

export type OutlineOutcome = { outline: CheckedOutline } | RefusedOutline

/** A grid with the box round its cells, degrees. */
export interface MeasuredGrid {
  grid: Grid
  west: number
  south: number
  east: number
  north: number
  /** The water mask in force, a bit a cell; left out where that is the land outline. */
  mask?: Uint8Array
}

/** What a grid holds of a region. Not exact: an estimate from areas. */
export interface GridCount {
  exact: boolean
  /** Cells the region touches. */
  cells: number
  /** Those wholly inside that are water. */
  wholeCells: number
  waterAreaKm2: number | null
  /** Share of the water within one cell of land; null where it is not known. */
  nearLandShare: number | null
}
