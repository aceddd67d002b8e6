import { bell } from './bell'
import { dayInYear, yearOf } from './days'
import { eachCell, kmFrom, landOn, type DemoGrid } from './grid'
import { addNoise, normalAt } from './noise'
import { streams } from './streams'

/** Standing shape of the sea: log10 of its summer chlorophyll, and km from the coast, per cell. */
interface Shape {
  coastKm: Float64Array
  summerLog10: Float64Array
}

const shapeOf = new WeakMap<DemoGrid, Shape>()

function shape(grid: DemoGrid, seed: number): Shape {
  const known = shapeOf.get(grid)
  if (known) return known
  const coastKm = coastDistanceKm(grid)
  const summerLog10 = new Float64Array(coastKm.length)
  const bend = new Float64Array(coastKm.length)
  addNoise(summerLog10, 0.06, streams.standing, seed, 0, grid)
  addNoise(bend, 0.17, streams.standing, seed, 1, grid)
  eachCell(grid, (index, longitude, latitude) => {
    const onshore = 0.56 * Math.exp(-(coastKm[index] ?? 0) / 42)
    summerLog10[index] = (summerLog10[index] ?? 0) + Math.log10(0.44) + onshore + bank(longitude, latitude, bend[index] ?? 0)
  })
  const made = { coastKm, summerLog10 }
  shapeOf.set(grid, made)
  return made
}

/** Hallin Bank's shoal mixes nutrients up all year: 0.56 in log10 inside, with a sharp front round it. */
function bank(longitude: number, latitude: number, bend: number): number {
  const [east, north] = kmFrom(-11.3, 51.08, longitude, latitude)
  const edge = Math.hypot(east / 36, north / 30)
  return 0.56 / (1 + Math.exp((edge - 1 - bend) * 9))
}

/**
 * What is usual: log10 chlorophyll without scatter, blooms or cloud, NaN on land. `springShiftDays` moves the year's
 * rises; live fields use the year's own, the answer key 0.
 */
export function usualLog10(grid: DemoGrid, seed: number, day: number, springShiftDays = 0): Float64Array {
  const { coastKm, summerLog10 } = shape(grid, seed)
  const land = landOn(grid)
  const time = dayInYear(day) - springShiftDays
  // Rises begin inshore and reach the open sea eight days later, so two ends of the season are enough per day.
  const values = new Float64Array(coastKm.length)
  for (let i = 0; i < values.length; i++) {
    const late = Math.min(8, (coastKm[i] ?? 0) / 16)
    values[i] = land[i] ? Number.NaN : (summerLog10[i] ?? 0) + seasonAt(time - late)
  }
  return values
}

/** How many days the year's rises are late (or early, below 0). */
export function springShiftDays(seed: number, day: number): number {
  return 5 * normalAt(streams.springShift, seed, yearOf(day))
}

const seasonTable = Float64Array.from({ length: 500 }, (_, i) => season(i - 60))

/** The season in log10 against summer; `time` in days since 1 January, -60 to 430. */
function seasonAt(time: number): number {
  const along = time + 60
  const lower = Math.floor(along)
  const from = seasonTable[lower] ?? 0
  return from + (along - lower) * ((seasonTable[lower + 1] ?? from) - from)
}

/** Low winter, diatom-like rise to a peak late in April, summer at 0, a small autumn rise late in September. */
function season(time: number): number {
  const winter = -0.24 * (bell(time, 0, 44, 52) + bell(time, 365.25, 44, 52))
  return winter + 0.42 * bell(time, 114, 17, 23) + 0.15 * bell(time, 268, 17, 20)
}

function coastDistanceKm(grid: DemoGrid): Float64Array {
  const land = landOn(grid)
  const shore: [number, number][] = []
  const neighbours = [-1, 1, -grid.longitudes.length, grid.longitudes.length]
  eachCell(grid, (index, longitude, latitude) => {
    if (land[index] && neighbours.some((step) => land[index + step] === 0)) shore.push([longitude, latitude])
  })
  const distances = new Float64Array(land.length)
  eachCell(grid, (index, longitude, latitude) => {
    if (land[index]) return
    let nearest = Infinity
    for (const [lon, lat] of shore) {
      const [east, north] = kmFrom(longitude, latitude, lon, lat)
      nearest = Math.min(nearest, east * east + north * north)
    }
    distances[index] = Math.sqrt(nearest)
  })
  return distances
}
