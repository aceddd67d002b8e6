import { addBlooms, blooms, strengthOn, type Bloom } from './blooms'
import { coarseGrid, demoGrid, eachCell, landOn, type DemoGrid } from './grid'
import { addChalk, addPlume, chalkMasked, chalkStrength, plumeStrength } from './look-alikes'
import { regionOf, regions, scenarioDays, seed, type RegionKey } from './scenario'
import { usualLog10 } from './usual'

/** Days, first and last included, on which one cause held in one region. */
export interface KeyedPeriod {
  region: RegionKey
  from: number
  to: number
  cause: 'bloom' | 'chalky bloom' | 'river plume'
  /** Greatest times usual of the region's median without scatter or cloud; null for the chalky, whose middle is masked. */
  timesUsual: number | null
}

/** A region counts as unusual when its median, free of scatter and cloud, is at least this many times the usual. */
const unusualFrom = 2

/** A chalky bloom counts while its masked middle takes at least this share of the region's cells. */
const chalkyFrom = 0.15

/**
 * What was truly unusual, where and when, from the definition of the scenario up to `last` (the day after the
 * history unless said otherwise). For tests and scores only: nothing that watches the sea may read it.
 */
export function answerKey(last = scenarioDays.today): KeyedPeriod[] {
  const found = [...blooms.flatMap((one) => bloomPeriods(one, last)), ...chalkyPeriods(last)]
  return found.sort((a, b) => a.from - b.from)
}

/** What only looks unusual: a rule that fires on these days alone has raised a false alarm. */
export function lookAlikes(last = scenarioDays.today): KeyedPeriod[] {
  return regions.flatMap(({ key }) => {
    const watch = watcher(key)
    return periods(scenarioDays.first, last, (day) => {
      const strength = plumeStrength(seed, day)
      return strength < 0.02 ? 0 : watch.timesUsual(day, (target) => addPlume(target, watch.grid, strength))
    }).map((period) => ({ region: key, cause: 'river plume' as const, ...period }))
  })
}

function bloomPeriods(bloom: Bloom, last: number): KeyedPeriod[] {
  // A bloom is named for one region but may reach its neighbours: the key asks the sea, not the name.
  return regions.flatMap(({ key }) => {
    const watch = watcher(key)
    return periods(bloom.peak - 40, Math.min(last, bloom.peak + 40), (day) =>
      strengthOn(bloom, day) < 0.02 ? 0 : watch.timesUsual(day, (target) => addBlooms(target, watch.grid, day, [bloom])),
    ).map((period) => ({ region: key, cause: 'bloom' as const, ...period }))
  })
}

function chalkyPeriods(last: number): KeyedPeriod[] {
  return regions.flatMap(({ key }) => {
    const watch = watcher(key)
    return periods(scenarioDays.first, last, (day) => {
      const strength = chalkStrength(day)
      if (strength < 0.02) return 0
      const chalk = new Float64Array(demoGrid.latitudes.length * demoGrid.longitudes.length)
      addChalk(chalk, watch.grid, strength)
      const masked = watch.cells.filter((cell) => (chalk[cell] ?? 0) > chalkMasked).length
      return (masked / watch.cells.length / chalkyFrom) * unusualFrom
    }).map(({ from, to }) => ({ region: key, cause: 'chalky bloom' as const, from, to, timesUsual: null }))
  })
}

/** Runs of days from `first` to `last` on which the figure is at least `unusualFrom`, with its greatest. */
function periods(first: number, last: number, figureOn: (day: number) => number) {
  const found: { from: number; to: number; timesUsual: number }[] = []
  for (let day = first; day <= last; day++) {
    const figure = figureOn(day)
    if (figure < unusualFrom) continue
    const run = found.at(-1)
    if (run?.to === day - 1) {
      run.to = day
      run.timesUsual = Math.max(run.timesUsual, figure)
    } else found.push({ from: day, to: day, timesUsual: figure })
  }
  return found
}

/** A region's water cells on its feed's grid, and how many times its usual the median stands with something added. */
function watcher(key: RegionKey) {
  const { feed } = regionOf(key)
  const grid = feed === 'chl' ? demoGrid : coarseGrid
  const cells = cellsInside(key, grid)
  const timesUsual = (day: number, add: (target: Float64Array) => void) => {
    const added = new Float64Array(grid.latitudes.length * grid.longitudes.length)
    add(added)
    if (!cells.some((cell) => (added[cell] ?? 0) > 0.1)) return 1
    const usual = usualLog10(grid, seed, day)
    const raised = usual.map((log10, cell) => log10 + (added[cell] ?? 0))
    return 10 ** (medianOf(cells, raised) - medianOf(cells, usual))
  }
  return { grid, cells, timesUsual }
}

function medianOf(cells: number[], values: Float64Array): number {
  const sorted = cells.map((cell) => values[cell] ?? Number.NaN).sort((a, b) => a - b)
  return sorted[Math.floor((sorted.length - 1) / 2)] ?? Number.NaN
}

/** Cells of a grid whose centre is inside a region and, unless asked otherwise, water. */
export function cellsInside(key: RegionKey, grid: DemoGrid, which: 'water' | 'land too' = 'water'): number[] {
  const land = landOn(grid)
  const ring = regionOf(key).geometry.coordinates[0] ?? []
  const cells: number[] = []
  eachCell(grid, (index, longitude, latitude) => {
    if ((!land[index] || which === 'land too') && insideRing(ring, longitude, latitude)) cells.push(index)
  })
  return cells
}

function insideRing(ring: [number, number][], longitude: number, latitude: number): boolean {
  let inside = false
  for (let i = 1; i < ring.length; i++) {
    const [lonA = 0, latA = 0] = ring[i - 1] ?? []
    const [lonB = 0, latB = 0] = ring[i] ?? []
    if (latA > latitude === latB > latitude) continue
    if (longitude < lonA + ((latitude - latA) / (latB - latA)) * (lonB - lonA)) inside = !inside
  }
  return inside
}
