import type { ValidRange } from './picture-tasks'
import type { LayerPlace } from './tasks'

/** How often each cell of the counted tiles was water, and how often that could be told; tile after tile, row-major. */
export interface CellCounts {
  water: Uint32Array
  known: Uint32Array
}

export interface ComposedMask {
  /** A bit a cell, deflated. */
  water: Uint8Array
  checksum: string
  waterCells: number
  /** Water here, land in the outline; and the reverse. */
  gained: number
  lost: number
  /** Cells nothing was counted of, which are as the outline has them. */
  byOutline: number
}

/** Tasks that make water masks and show them. */
export interface MaskTasks {
  /** What a layer's file says of land itself, in words; null when nothing that Offing understands. */
  findLandMarks: { input: { layer: LayerPlace }; output: string | null }
  countCells: { input: { kind: 'valid share' | 'own'; layers: LayerPlace[]; tiles: number[]; range: ValidRange }; output: CellCounts }
  composeMask: {
    input: {
      grid: string
      tiles: number[]
      counts: CellCounts
      /** Of how many layers the counts are; `own` goes by what is known of each cell instead. */
      layers: number
      kind: 'valid share' | 'own'
      minShare: number
      fromDay: number
      toDay: number
    }
    output: ComposedMask
  }
  /** `water` is null for the outline itself. */
  drawMaskTile: { input: { grid: string; water: Uint8Array | null; z: number; x: number; y: number; theme: 'light' | 'night' }; output: Uint8Array | null }
}
