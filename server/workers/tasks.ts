import type { Polygon, MultiPolygon } from 'geojson'
import type { Figures } from '../../shared/science/figures'
import type { Judgement, JudgeInput } from '../../shared/science/judge'
import type { DemoFile } from '../seeders/demo/files'
import type { Seen } from './inspect-file'
import type { MaskTasks } from './mask-tasks'
import type { OutlineTasks } from './outline-tasks'
import type { PatchTasks } from './patch-tasks'
import type { PackedFigures } from './packed-figures'
import type { PictureTasks } from './picture-tasks'

/** One variable of a stored file, at one step. */
export interface StoredValues {
  path: string
  fileName: string
  variable: string
  step: number
}

/** How a feed wants its numbers read. */
export interface ValueReading {
  hiddenFlags: string[]
  storedLog10: boolean
  /** The unit of the file's numbers where the file names none, and that of the feed. */
  fileUnit: string | null
  unit: string | null
}

/** Where a layer's values are; with a recipe they are worked out from its bands instead. */
export interface LayerPlace extends StoredValues {
  processingVersion: string
  /** Which instant it shows and when it was made, for merging: of two of one instant the last made wins. */
  observedAt: number
  endsAt: number | null
  producedAt: number | null
  /** Size of its grid. */
  rows: number
  columns: number
  /** Where its decoded tiles are kept; null reads the original. */
  pack: string | null
  reading: ValueReading
  recipe?: { formula: string; formulaVersion: string; bands: (StoredValues & { wavelengthNm: number })[] }
}

/** The cells of one region on one grid, as kept by the database. `water` is 1 where the mask says water. */
export interface RegionCellWeights {
  rows: number
  columns: number
  index: Uint32Array
  share: Float64Array
  areaKm2: Float64Array
  water: Uint8Array
  /** Water of the region outside the grid, by the land outline; seen by no layer on it. */
  outsideWaterKm2: number
}

export interface ViewTask {
  /** Positions in `layers`; all on the grid of `weights`. */
  layers: number[]
  /** Position in `weights`. */
  weights: number
}

export type ViewFigures = Omit<Figures, 'histogram' | 'maxIndex'> & {
  /** Cell of the greatest value, its index in the grid. */
  maxCell: number | null
  histogram: Uint8Array
  /** Water not seen, by the reason it was hidden for; one cell may have several. */
  masked: { reason: string; areaKm2: number }[]
}

/** Every task a worker can do. Each takes and answers plain data and typed arrays; none opens the database. */
export interface Tasks extends PictureTasks, OutlineTasks, PatchTasks, MaskTasks {
  /** Shows that the thread has come up. */
  greet: { input: null; output: true }
  hashPassword: { input: { password: string; cost?: number }; output: string }
  comparePassword: { input: { password: string; hash: string }; output: boolean }
  inspectFile: { input: { path: string; fileName: string }; output: Seen }
  weighCells: {
    input: { geometry: Polygon | MultiPolygon; shoreBufferKm?: number; grid: string }
    output: Omit<RegionCellWeights, 'rows' | 'columns'>
  }
  summariseViews: {
    input: {
      layers: LayerPlace[]
      weights: RegionCellWeights[]
      views: ViewTask[]
      scale: 'log10' | 'linear'
      validMin: number | null
      validMax: number | null
    }
    output: PackedFigures
  }
  decodeLayers: { input: { layers: LayerPlace[] }; output: void }
  judgeRegion: { input: JudgeRegionInput; output: RegionJudgement }
  writeDemoFile: { input: { file: DemoFile; directory: string }; output: string }
}

export type JudgeRegionInput = Omit<JudgeInput, 'views'> & {
  views: (JudgeInput['views'][number] & { processingVersion: string })[]
}

export interface RegionJudgement extends Omit<Judgement, 'judged'> {
  judged: (Omit<Judgement['judged'][number], 'state'> & {
    state: Judgement['judged'][number]['state'] | 'not-comparable'
  })[]
  /** The processing version the newest usable view has, and the baseline with it. */
  processingVersion: string | null
}
