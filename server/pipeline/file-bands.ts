import type { ReportVariable } from '../../shared/schemas/files'

/** A reflectance band found in a file: what a recipe names it by. */
export interface FileBand {
  variable: string
  wavelengthNm: number
  /** Equal for variables on one grid and one set of times. */
  place: string
}

/** The reflectance bands of a file, from what was understood of it. */
export function bandsOfReport(variables: readonly ReportVariable[]): FileBand[] {
  return variables.flatMap(({ name, quantity, unit, wavelengthNm, grid, times }) =>
    quantity === 'reflectance' && unit === 'sr-1' && wavelengthNm != null
      ? [{ variable: name, wavelengthNm, place: JSON.stringify([grid, times.count, times.first, times.last]) }]
      : [],
  )
}
