import { colouringOf, colouringOfSpread, shareOf, type ColouredFeed, type Colouring, type Spread } from '../../shared/colouring'
import { quantileOfSorted } from '../../shared/science/quantile'
import type { LayerSurvey, PictureTasks } from './picture-tasks'
import { readWindow } from './read-window'
import { withinRange } from './valid-range'

const mostCells = 4_000_000
const stripRows = 32
const bins = 48

/** What a layer holds, from all of its cells or from strips spread evenly over it. */
export async function surveyLayer({ layer, feed, rows, columns }: PictureTasks['surveyLayer']['input']): Promise<LayerSurvey> {
  const strips = stripsOf(rows, columns)
  const hidden = new Map<string, number>()
  const seen: Float64Array[] = []
  let cells = 0
  for (const strip of strips) {
    const read = withinRange(await readWindow(layer, { ...strip, column: 0, columns }), feed)
    for (const [reason, where] of read.hidden) hidden.set(reason, (hidden.get(reason) ?? 0) + counted(where))
    seen.push(read.values.filter((value) => !Number.isNaN(value)))
    cells += read.values.length
  }
  const colouring = colouringOf(feed) ?? colouringOfSpread(feed, spreadOf(seen, feed))
  return {
    colouring,
    looked: strips.reduce((sum, strip) => sum + strip.rows, 0) === rows ? 'all' : 'strips',
    cells,
    valid: seen.reduce((sum, values) => sum + values.length, 0),
    hidden: [...hidden].filter(([, count]) => count > 0).map(([reason, count]) => ({ reason, cells: count })).sort((a, b) => b.cells - a.cells),
    ...histogramOf(seen, colouring),
  }
}

function stripsOf(rows: number, columns: number): { row: number; rows: number }[] {
  if (rows * columns <= mostCells) {
    return [{ row: 0, rows }]
  }
  const count = Math.max(1, Math.floor(mostCells / (stripRows * columns)))
  const every = rows / count
  return Array.from({ length: count }, (_, i) => {
    const row = Math.min(rows - 1, Math.floor(i * every + (every - stripRows) / 2))
    return { row: Math.max(0, row), rows: Math.min(stripRows, rows - Math.max(0, row)) }
  })
}

function counted(where: Uint8Array): number {
  let count = 0
  for (let i = 0; i < where.length; i++) count += where[i]!
  return count
}

/** On a logarithmic feed only what is above 0 can tell where most of the layer lies. */
function spreadOf(seen: readonly Float64Array[], { scale }: ColouredFeed): Spread | null {
  const all = new Float64Array(seen.reduce((sum, values) => sum + values.length, 0))
  let filled = 0
  for (const values of seen) {
    for (let i = 0; i < values.length; i++) if (scale === 'linear' || values[i]! > 0) all[filled++] = values[i]!
  }
  if (filled === 0) return null
  const sorted = all.subarray(0, filled).sort()
  return { p2: quantileOfSorted(sorted, 0.02)!, p98: quantileOfSorted(sorted, 0.98)! }
}

function histogramOf(seen: readonly Float64Array[], colouring: Colouring): Pick<LayerSurvey, 'bins' | 'below' | 'above'> {
  const counts = new Array<number>(colouring.scale === 'screen' ? 2 : bins).fill(0)
  let [below, above] = [0, 0]
  for (const values of seen) {
    for (let i = 0; i < values.length; i++) {
      const value = values[i]!
      if (colouring.scale !== 'screen' && value < colouring.from) below++
      else if (colouring.scale !== 'screen' && value > colouring.to) above++
      else counts[Math.min(counts.length - 1, Math.floor(shareOf(colouring, value) * counts.length))]!++
    }
  }
  return { bins: counts, below, above }
}
