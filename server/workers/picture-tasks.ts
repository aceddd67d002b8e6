import type { Colouring, ColouredFeed } from '../../shared/colouring'
import type { LayerPlace } from './tasks'

/** A feed's own valid range, in its unit. */
export interface ValidRange {
  validMin: number | null
  validMax: number | null
}

/** One cell of one layer. */
export interface CellAsked {
  layer: LayerPlace
  row: number
  column: number
}

/** What a whole layer holds, for its legend. Counts are of cells looked at. */
export interface LayerSurvey {
  colouring: Colouring
  /** All of them, or strips spread over a layer too large to be looked at for a legend. */
  looked: 'all' | 'strips'
  cells: number
  valid: number
  /** Cells hidden by flags, filled in, or out of the valid range; one cell may have several reasons. */
  hidden: { reason: string; cells: number }[]
  /** Valid cells by value, evenly along the scale; those beyond its ends apart. */
  bins: number[]
  below: number
  above: number
}

/** Tasks that make pictures and answer questions about single cells. */
export interface PictureTasks {
  drawTile: {
    input: { layer: LayerPlace; range: ValidRange; colouring: Colouring; grid: string; z: number; x: number; y: number; theme: 'light' | 'night' }
    output: Uint8Array | null
  }
  surveyLayer: { input: { layer: LayerPlace; feed: ColouredFeed; rows: number; columns: number }; output: LayerSurvey }
  /** Null where a cell is missing; among many, also where its file could not be read. */
  readCells: { input: { cells: CellAsked[]; range: ValidRange }; output: (number | null)[] }
}
