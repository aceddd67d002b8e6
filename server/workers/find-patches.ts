import { cellBox, columnsRound } from '../../shared/science/cell-box'
import { awayFrom, MiddleOf, nearestOf, type Away, type Place } from '../geography/geodesic'
import type { Grid } from '../../shared/science/grid'
import { patchChanges, type PatchFamily, type SeenPatches } from '../../shared/science/patch-changes'
import { patchOutlines } from '../../shared/science/patch-outlines'
import { findPatches as patchesAbove } from '../../shared/science/patches'
import { outlineOf, type RegionOutline } from '../../shared/science/region-outline'
import { cellCentre } from '../grids/cell-centre'
import { decodeGrid } from '../grids/grid-text'
import { outlineLines } from '../grids/outline-lines'
import { projectTo } from '../grids/read/project'
import { cellFinder } from '../pictures/cell-finder'
import type { FoundPatches, GonePatch, PatchChange, PatchTasks, PlacedPatch, ViewAsked } from './patch-tasks'
import { readView } from './view-cells'

type Input = PatchTasks['findPatches']['input']

interface SeenView extends SeenPatches {
  index: Uint32Array
  grid: Grid
  round: number | null
  outline: RegionOutline
  box: ReturnType<typeof cellBox>
  /** Middles of the cells that are in a patch, by position. */
  longitudes: Float64Array
  latitudes: Float64Array
  /** Middle of each patch. */
  middles: MiddleOf[]
}

/** The patches of one view above a level, where they lie, and what became of those of the view before. */
export async function findPatches(input: Input): Promise<FoundPatches> {
  const now = await seenView(input.now, input)
  const before = input.before && (await seenView(input.before, input))
  const families = before && patchChanges(before, now, cellsBefore(before, now), now.outline.weightKm2)
  const shown = now.patches.slice(0, input.most)
  const rings = patchOutlines(now.labels, shown.length, now.box, now.grid.kind !== 'axes')
  const siteLabel = input.site && labelAt(now, input.site)
  const changes = changesOf(families ?? [], before, now)
  const others = now.patches.slice(input.most)
  return {
    seenCells: seenCells(now),
    areaAboveKm2: areaOf(now),
    areaAboveBeforeKm2: before && areaOf(before),
    patches: shown.map(({ greatestAt, ...patch }, i): PlacedPatch => {
      const peak = cellCentre(now.grid, now.index[greatestAt]!)
      return {
        ...patch,
        peak,
        centre: now.middles[i]!.place() ?? peak,
        nearest: input.site && (siteLabel === i ? { km: 0, bearing: null } : nearestCell(now, i, patch.cells, input.site)),
        peakAway: input.site && awayFrom(input.site, peak),
        change: changes[i] ?? null,
        outline: outlineLines(now.grid, rings[i]!, now.round, input.nearLongitude),
      }
    }),
    others: {
      patches: others.length + now.dropped.patches,
      cells: others.reduce((sum, patch) => sum + patch.cells, now.dropped.cells),
      areaKm2: others.reduce((sum, patch) => sum + patch.areaKm2, now.dropped.areaKm2),
    },
    gone: before ? goneOf(families ?? [], before, input.most) : [],
  }
}

async function seenView({ layers, weights, grid: text }: ViewAsked, { reading, level, minimumCells }: Input): Promise<SeenView> {
  const grid = decodeGrid(text)
  const round = columnsRound(grid)
  const values = await readView(layers, weights, reading)
  const outline = outlineOf(weights)
  const box = cellBox(weights.index, grid.columns, round)
  const found = patchesAbove(values, outline, box, level, minimumCells)
  const [longitudes, latitudes] = [new Float64Array(values.length), new Float64Array(values.length)]
  const middles = found.patches.map(() => new MiddleOf())
  for (let at = 0; at < values.length; at++) {
    const label = found.labels[at]!
    if (label < 0) continue
    const place = cellCentre(grid, weights.index[at]!)
    longitudes[at] = place[0]
    latitudes[at] = place[1]
    middles[label]!.add(place, outline.weightKm2[at]!)
  }
  return { ...found, values, index: weights.index, grid, round, outline, box, longitudes, latitudes, middles }
}

/** The patch that holds a place; null for none. */
function labelAt({ grid, index, labels }: SeenView, place: Place): number | null {
  const cell = cellHolding(grid, place)
  const at = cell === null ? -1 : index.indexOf(cell)
  return at < 0 || labels[at]! < 0 ? null : labels[at]!
}

function nearestCell({ labels, longitudes, latitudes }: SeenView, label: number, cells: number, site: Place): Away | null {
  const [lons, lats] = [new Float64Array(cells), new Float64Array(cells)]
  for (let at = 0, to = 0; at < labels.length; at++) {
    if (labels[at] !== label) continue
    lons[to] = longitudes[at]!
    lats[to++] = latitudes[at]!
  }
  return nearestOf(site, lons, lats)?.away ?? null
}

function seenCells({ values, outline }: SeenView): number {
  let count = 0
  for (let at = 0; at < values.length; at++) if (Number.isFinite(values[at]) && outline.kind[at] !== 0) count++
  return count
}

const areaOf = ({ patches, dropped }: SeenView) => patches.reduce((sum, patch) => sum + patch.areaKm2, dropped.areaKm2)

function cellHolding(grid: Grid, [longitude, latitude]: Place): number | null {
  const cell = cellFinder(grid, grid.kind === 'transform' ? projectTo(grid.crs) : undefined)(longitude, latitude)
  return cell && cell.row * grid.columns + cell.column
}

/** For each cell now its position in the view before: on another grid the cell that holds its middle. */
function cellsBefore(before: SeenView, now: SeenView): Int32Array {
  if (sameCells(before.index, now.index) && sameGrid(before.grid, now.grid)) {
    const same = new Int32Array(now.index.length)
    for (let at = 0; at < same.length; at++) same[at] = at
    return same
  }
  const positions = new Map(Array.from(before.index, (cell, at) => [cell, at]))
  return Int32Array.from(now.index, (cell) => {
    const then = cellHolding(before.grid, cellCentre(now.grid, cell))
    return then === null ? -1 : (positions.get(then) ?? -1)
  })
}

function sameCells(a: Uint32Array, b: Uint32Array): boolean {
  for (let at = 0; at < a.length; at++) if (a[at] !== b[at]) return false
  return a.length === b.length
}

function sameGrid(a: Grid, b: Grid): boolean {
  const cells = a.rows * a.columns - 1
  return a === b || (a.kind === b.kind && a.rows === b.rows && a.columns === b.columns && [0, cells].every((cell) => String(cellCentre(a, cell)) === String(cellCentre(b, cell))))
}

function changesOf(families: readonly PatchFamily[], before: SeenView | null, now: SeenView): PatchChange[] {
  const changes: PatchChange[] = []
  for (const family of families) {
    const middle = (view: SeenView, patches: readonly number[]) => patches.reduce((sum, at) => sum.join(view.middles[at]!), new MiddleOf()).place()
    const [from, to] = [before && middle(before, family.before), middle(now, family.now)]
    const { kind, beforeKm2, nowKm2 } = family
    const change = { kind, together: family.now.map((at) => at + 1), beforeKm2, changeKm2: nowKm2 - beforeKm2, moved: from && to && awayFrom(from, to) }
    for (const at of family.now) changes[at] = change
  }
  return changes
}

function goneOf(families: readonly PatchFamily[], before: SeenView, most: number): GonePatch[] {
  return families.flatMap(({ kind, before: patches }) => {
    if (kind !== 'gone' && kind !== 'not seen now') return []
    return patches.map((at): GonePatch => {
      const { areaKm2, greatest, greatestAt } = before.patches[at]!
      return { kind, areaKm2, greatest, peak: cellCentre(before.grid, before.index[greatestAt]!) }
    })
  }).sort((a, b) => b.areaKm2 - a.areaKm2).slice(0, most)
}
