import type { Scale } from '../../shared/science/figures'
import type { Away, Place } from '../geography/geodesic'
import type { PatchChangeKind } from '../../shared/science/patch-changes'
import type { Patch } from '../../shared/science/patches'
import type { ValidRange } from './picture-tasks'
import type { LayerPlace, RegionCellWeights } from './tasks'

/** One view of a region: its layers, all on one grid, and the cells of the region on it. */
export interface ViewAsked {
  layers: LayerPlace[]
  weights: RegionCellWeights
  grid: string
}

/** What became of it since the view before, together with all it overlaps with. */
export interface PatchChange {
  kind: PatchChangeKind
  /** Numbers of the patches now that came of the same water. */
  together: number[]
  beforeKm2: number
  changeKm2: number
  /** Way of the middle of them all; null where there was, or is, nothing. */
  moved: Away | null
}

export interface PlacedPatch extends Omit<Patch, 'greatestAt'> {
  peak: Place
  centre: Place
  /** From the site: to the nearest cell's middle (0 km where the site lies in the patch), and to the greatest value. */
  nearest: Away | null
  peakAway: Away | null
  change: PatchChange | null
  /** Lines along the edges of its cells. */
  outline: [number, number][][]
}

export interface GonePatch {
  kind: 'gone' | 'not seen now'
  areaKm2: number
  greatest: number
  peak: Place
}

export interface FoundPatches {
  seenCells: number
  areaAboveKm2: number
  areaAboveBeforeKm2: number | null
  /** The largest; the others only counted. */
  patches: PlacedPatch[]
  others: { patches: number; cells: number; areaKm2: number }
  gone: GonePatch[]
}

/** Tasks that read the cells of single views. */
export interface PatchTasks {
  /** The values of a view's cells, in the order of its weights; NaN for missing. */
  readView: { input: Omit<ViewAsked, 'grid'> & { reading: ValidRange & { scale: Scale } }; output: Float64Array }
  findPatches: {
    input: {
      now: ViewAsked
      before: ViewAsked | null
      level: number
      minimumCells: number
      /** At most so many are placed and outlined. */
      most: number
      site: Place | null
      /** Outlines are drawn in the turn of the globe nearest to it. */
      nearLongitude: number
      reading: ValidRange & { scale: Scale }
    }
    output: FoundPatches
  }
}
