import { bell } from './bell'
import { epochDay } from './days'
import { kmFrom, type DemoGrid } from './grid'
import type { RegionKey } from './scenario-regions'

/** A true bloom: its greatest is `times` the usual at `middle` on `peak`, fading in space and time as a normal curve. */
export interface Bloom {
  region: RegionKey
  peak: number
  times: number
  /** Days from usual to peak and back, as widths of the two half curves. */
  riseDays: number
  fallDays: number
  middle: [number, number]
  /** Half widths in km, east and north. */
  widthKm: [number, number]
}

function bloom(
  region: RegionKey,
  peak: string,
  times: number,
  [riseDays, fallDays]: [number, number],
  middle: [number, number],
  widthKm: [number, number],
): Bloom {
  return { region, peak: epochDay(peak), times, riseDays, fallDays, middle, widthKm }
}

/** Ten years of blooms, the mild one in Mether Sound since early June, and the one building in Tarrow Bay. */
export const blooms: Bloom[] = [
  bloom('tarrow', '2017-07-22', 5.5, [4, 7], [-10.75, 51.9], [34, 30]),
  bloom('skerrow', '2017-08-30', 4, [3, 4], [-7.8, 51.45], [32, 26]),
  bloom('kestle', '2018-05-21', 2.6, [3, 4], [-10.1, 51.22], [34, 32]),
  bloom('mether', '2018-06-19', 7, [5, 9], [-9.15, 51.3], [42, 26]),
  bloom('quillin', '2018-08-11', 5, [3, 5], [-9.7, 53.14], [30, 18]),
  bloom('kestle', '2019-06-03', 4.2, [3, 5], [-10.1, 51.22], [30, 30]),
  bloom('corran', '2019-07-27', 6, [4, 6], [-10.05, 52.64], [32, 24]),
  bloom('tarrow', '2019-09-05', 3.6, [3, 3.5], [-10.8, 51.9], [34, 30]),
  bloom('vane', '2020-07-14', 6.5, [5, 8], [-11.85, 52.7], [46, 40]),
  bloom('mether', '2020-08-24', 4.5, [3, 4], [-9.1, 51.32], [40, 26]),
  bloom('skerrow', '2020-10-02', 3.2, [2, 3], [-7.8, 51.45], [32, 26]),
  bloom('fennick', '2021-05-29', 4.8, [4, 6], [-7.8, 50.94], [48, 34]),
  bloom('brannoch', '2021-07-06', 5.2, [4, 6], [-10.7, 53.32], [36, 30]),
  bloom('skerrow', '2021-07-31', 6.8, [5, 9], [-7.8, 51.45], [36, 28]),
  bloom('hallin', '2022-08-08', 5.5, [4, 7], [-11.7, 51.1], [46, 40]),
  bloom('quillin', '2022-06-26', 3.8, [3, 4], [-9.7, 53.14], [28, 18]),
  bloom('tarrow', '2023-06-27', 7.5, [5, 8], [-10.8, 51.92], [38, 32]),
  bloom('corran', '2023-09-17', 4.2, [3, 4], [-10.1, 52.64], [32, 22]),
  bloom('mether', '2024-07-09', 5, [4, 6], [-9.15, 51.3], [42, 28]),
  bloom('kestle', '2024-08-20', 6, [4, 7], [-10.1, 51.22], [32, 30]),
  bloom('vane', '2025-05-27', 5, [4, 6], [-11.85, 52.7], [44, 38]),
  bloom('skerrow', '2025-08-06', 4.4, [3, 5], [-7.8, 51.45], [34, 26]),
  bloom('mether', '2026-06-09', 8.1, [5, 10], [-9.15, 51.3], [38, 30]),
  bloom('tarrow', '2026-06-12', 10.2, [2.8, 9], [-10.78, 51.93], [42, 33]),
]

/** Share of its full log10 strength a bloom has on a day. */
export function strengthOn({ peak, riseDays, fallDays }: Bloom, day: number): number {
  return bell(day, peak, riseDays, fallDays)
}

/** Adds to `target` what blooms put on top of the usual on a day, in log10. */
export function addBlooms(target: Float64Array, grid: DemoGrid, day: number, among: Bloom[] = blooms) {
  for (const one of among) {
    const strength = strengthOn(one, day) * Math.log10(one.times)
    if (strength < 0.02) continue
    addPatch(target, grid, strength, one.middle, one.widthKm)
  }
}

/** Adds a patch that falls off as a normal curve from `amount` at its middle, to three widths out. */
export function addPatch(
  target: Float64Array,
  grid: DemoGrid,
  amount: number,
  [lon, lat]: [number, number],
  [eastKm, northKm]: [number, number],
) {
  const { latitudes, longitudes } = grid
  const eastward = longitudes.map((longitude) => kmFrom(lon, lat, longitude, lat)[0] / eastKm)
  latitudes.forEach((latitude, row) => {
    const northward = kmFrom(lon, lat, lon, latitude)[1] / northKm
    if (Math.abs(northward) >= 3) return
    for (let column = 0; column < longitudes.length; column++) {
      const away = northward ** 2 + (eastward[column] ?? 0) ** 2
      const index = row * longitudes.length + column
      if (away < 9) target[index] = (target[index] ?? 0) + amount * Math.exp(-0.5 * away)
    }
  })
}
