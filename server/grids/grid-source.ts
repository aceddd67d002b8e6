import type { FoundAxis } from '../../shared/schemas/found'
import type { Grid, GridWindow } from '../../shared/science/grid'
import type { FlagCells, FlagVariable } from './flags'

export type GridFormat = 'netcdf-classic' | 'netcdf4' | 'geotiff'

/** One instant or period a variable holds. Epoch milliseconds UTC; null when the file itself has no time. */
export interface LayerTime {
  observedAt: number | null
  /** Set for composites: the period is [observedAt, endsAt]. */
  endsAt: number | null
  /** False when only a date is known (shown without a clock time). */
  hasClock: boolean
  /** Where the time came from, for the report: 'time axis', 'global attribute', 'none'. */
  from: string
}

/** A variable on a grid that could serve as a layer, as understood. */
export interface GridVariable {
  name: string
  longName: string | null
  standardName: string | null
  /** Unit as the file spells it (null when none). */
  fileUnit: string | null
  /** Unit of the values `readWindow` returns ('mg m-3', 'sr-1', or the file's own spelling). */
  unit: string | null
  /** What was done to get there, for the report, e.g. 'scale 0.01, offset 0; kg m-3 to mg m-3'; null if nothing. */
  conversion: string | null
  /** 'chlorophyll', 'reflectance' (with wavelengthNm), or 'other'. Never 'chlorophyll' for an error, bias or count variable. */
  quantity: 'chlorophyll' | 'reflectance' | 'other'
  wavelengthNm: number | null
  validMin: number | null
  validMax: number | null
  grid: Grid
  times: LayerTime[]
  attributes: Record<string, string | number | number[]>
  dimensions: { name: string; size: number }[]
  /** What the file says of these dimensions; left out by formats whose grid says it all. */
  axes?: FoundAxis[]
  /** The variable that says why a cell may not be trusted, where the file has one for this variable. */
  flags?: FlagVariable
  /**
   * Set when cells may have been filled in rather than seen: the meanings that mark such cells, or `variable: null`
   * when the file says that it is gap-filled but not where.
   */
  gapFilled?: FlagVariable | { variable: null; meanings: [] }
}

/**
 * What the pipeline sees of a file, whatever its format. Values come unpacked, unit-converted and with NaN for
 * missing (fill, missing value, outside the valid range), row-major over the window.
 */
export interface GridSource {
  readonly format: GridFormat
  readonly variables: GridVariable[]
  readonly globalAttributes: Record<string, string | number | number[]>
  readonly warnings: string[]
  /** `step` indexes `times` of the variable. Throws LayerRefused when the bytes can't be trusted. */
  readWindow(variable: string, step: number, window: GridWindow): Promise<Float64Array>
  /**
   * The flags of the same cells, from `flags` of the variable or from another flag variable that its `gapFilled`
   * names. RangeError for a variable without flags; LayerRefused as for `readWindow`.
   */
  readFlags(variable: string, step: number, window: GridWindow, flagVariable?: string): Promise<FlagCells>
  /**
   * 1 where the file holds a number that its own valid range leaves out, for formats that have such ranges;
   * errors as for `readWindow`.
   */
  readOutside?(variable: string, step: number, window: GridWindow): Promise<Uint8Array>
  close(): void
}
