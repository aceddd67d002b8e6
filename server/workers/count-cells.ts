import type { GridWindow } from '../../shared/science/grid'
import { tileBox } from '../grids/decoded/tile-pack'
import { tileRectangles } from '../grids/decoded/tile-rectangles'
import { cellsWith } from '../grids/flags'
import { landMarks, landMarksText, type LandMarks } from '../grids/land-marks'
import type { CellCounts, MaskTasks } from './mask-tasks'
import { sourceOf } from './open-sources'
import { readTiles } from './read-tiles'
import type { LayerPlace, StoredValues } from './tasks'
import { withinRange } from './valid-range'

/** Tiles read of one layer at a time: 32 MB of values. */
const tilesAtOnce = 1024

/** What a layer's file says of land itself, in words. */
export async function findLandMarks({ layer }: MaskTasks['findLandMarks']['input']): Promise<string | null> {
  const { marks } = await marksOf(layer)
  return marks && landMarksText(marks)
}

/** Counts, over some layers of one grid, how often each cell of the tiles was water. Sums: the order does not matter. */
export async function countCells({ kind, layers, tiles, range }: MaskTasks['countCells']['input']): Promise<CellCounts> {
  const shape = layers[0]!
  const first = firstCells(shape, tiles)
  const counts: CellCounts = { water: new Uint32Array(first.at(-1)!), known: new Uint32Array(first.at(-1)!) }
  for (const layer of layers) {
    for (let from = 0; from < tiles.length; from += tilesAtOnce) {
      const some = tiles.slice(from, from + tilesAtOnce)
      if (kind === 'own') await addLand(layer, some, first.slice(from), counts)
      else await addValid(layer, some, first.slice(from), range, counts)
    }
  }
  return counts
}

/** Where the cells of each tile begin in the counts; one more at the end is how many there are. */
function firstCells(shape: Pick<LayerPlace, 'rows' | 'columns'>, tiles: readonly number[]): number[] {
  const first = [0]
  for (const tile of tiles) {
    const { rows, columns } = tileBox(shape, tile)
    first.push(first.at(-1)! + rows * columns)
  }
  return first
}

/** A finite value that its feed neither hides nor finds out of range was seen; every cell of a layer could have been. */
async function addValid(layer: LayerPlace, tiles: readonly number[], first: readonly number[], range: MaskTasks['countCells']['input']['range'], { water, known }: CellCounts): Promise<void> {
  const read = await readTiles(layer, tiles, true)
  for (const [i, tile] of tiles.entries()) {
    const { values } = withinRange({ values: read.tiles.get(tile)!.values, hidden: new Map() }, range)
    for (let cell = 0, to = first[i]!; cell < values.length; cell++, to++) {
      known[to]!++
      if (Number.isFinite(values[cell])) water[to]!++
    }
  }
}

async function addLand(layer: LayerPlace, tiles: readonly number[], first: readonly number[], { water, known }: CellCounts): Promise<void> {
  const { marks, at } = await marksOf(layer)
  // A file of the period that says nothing of land counts for nothing; it cannot speak against the others.
  if (!marks) return
  for (const rectangle of tileRectangles(layer, tiles)) {
    const land = await landIn(at, marks, rectangle.window)
    for (const tile of rectangle.tiles) {
      const box = tileBox(layer, tile)
      let to = first[tiles.indexOf(tile)]!
      for (let row = 0; row < box.rows; row++) {
        const from = (box.row - rectangle.window.row + row) * rectangle.window.columns + box.column - rectangle.window.column
        for (let column = 0; column < box.columns; column++, to++) {
          const is = land[from + column]!
          if (Number.isNaN(is)) continue
          known[to]!++
          if (is === 0) water[to]!++
        }
      }
    }
  }
}

/** 1 where the file marks land, 0 where it marks water, NaN where it does not say. */
async function landIn({ path, fileName, step }: StoredValues, marks: LandMarks, window: GridWindow): Promise<Float64Array> {
  const source = await sourceOf(path, fileName)
  if (marks.kind === 'flag') {
    const flags = await source.readFlags(marks.variable, step, window, marks.flagVariable)
    const land = cellsWith(flags, marks.meaning)
    return Float64Array.from(land, (is, cell) => (flags.missing?.[cell] ? NaN : is))
  }
  const values = await source.readWindow(marks.variable, Math.min(step, marks.steps - 1), window)
  const landIs = marks.marks === 'land' ? 1 : 0
  return values.map((value) => (value === 0 || value === 1 ? Number(value === landIs) : NaN))
}

/** Of a derived layer the first band's file is asked. */
async function marksOf(layer: LayerPlace): Promise<{ marks: LandMarks | null; at: StoredValues }> {
  const at = layer.recipe?.bands[0] ?? layer
  const source = await sourceOf(at.path, at.fileName)
  return { marks: landMarks(source, at.variable), at }
}
