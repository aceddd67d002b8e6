/** One ring in the plane of a grid: points x, y in order, closed or not; an outer ring adds, a hole takes away. */
export interface PlaneRing {
  x: Float64Array
  y: Float64Array
  hole: boolean
}

/** Sums of rounding leave shares of about 1e-16 where there is none, and as much short of 1 inside. */
const roundingShare = 1e-13

interface Edges {
  count: number
  /** Five numbers an edge: x, y of the lower end, x, y of the upper end, weight (+1 right of water, -1 left). */
  numbers: Float64Array
}

function orientation({ x, y }: PlaneRing): number {
  let twice = 0
  for (let i = 0, j = x.length - 1; i < x.length; j = i++) {
    twice += (x[j]! - x[0]!) * (y[i]! - y[0]!) - (x[i]! - x[0]!) * (y[j]! - y[0]!)
  }
  return Math.sign(twice)
}

function edgesOf(rings: readonly PlaneRing[]): Edges {
  const numbers = new Float64Array(5 * rings.reduce((sum, ring) => sum + ring.x.length, 0))
  let count = 0
  for (const ring of rings) {
    const sign = ring.hole ? -orientation(ring) : orientation(ring)
    if (sign === 0) continue
    const { x, y } = ring
    for (let i = 0, j = x.length - 1; i < x.length; j = i++) {
      if (y[i] === y[j]) continue
      const [lower, upper] = y[j]! < y[i]! ? [j, i] : [i, j]
      numbers.set([x[lower]!, y[lower]!, x[upper]!, y[upper]!, lower === j ? sign : -sign], 5 * count++)
    }
  }
  return { count, numbers }
}

/** The step of an ascending axis that holds a value: -1 before the first edge, the number of steps after the last. */
function stepOf(edges: Float64Array, value: number): number {
  const steps = edges.length - 1
  if (value < edges[0]!) return -1
  if (value >= edges[steps]!) return steps
  let [low, high] = [0, steps]
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (edges[middle]! <= value) low = middle
    else high = middle
  }
  return low
}

/** One row of cells: what each cell gets from the edges inside it, and what every cell left of it gets in full. */
class RowSums {
  private readonly inside: Float64Array
  private readonly leftOf: Float64Array
  private first = Infinity
  private last = -1

  constructor(private readonly xEdges: Float64Array) {
    this.inside = new Float64Array(xEdges.length)
    this.leftOf = new Float64Array(xEdges.length)
  }

  /** A piece of an edge from xa to xb that rises by `rise` of the row's height. */
  add(xa: number, xb: number, rise: number, weight: number): void {
    const columns = this.xEdges.length - 1
    const [from, to] = xa < xb ? [xa, xb] : [xb, xa]
    let column = stepOf(this.xEdges, from)
    this.first = Math.min(this.first, Math.max(column, 0))
    for (let start = from, risen = 0; ; column++) {
      const end = column < columns ? Math.min(to, this.xEdges[column + 1]!) : to
      const reached = end >= to ? rise : (rise * (end - from)) / (to - from)
      if (column >= 0) this.put(column, (start + end) / 2, weight * (reached - risen))
      this.last = Math.max(this.last, column)
      if (end >= to) return
      start = end
      risen = reached
    }
  }

  private put(column: number, x: number, amount: number): void {
    this.leftOf[column]! += amount
    const west = this.xEdges[column]!
    const width = this.xEdges[column + 1]! - west
    if (width > 0) this.inside[column]! += (amount * (x - west)) / width
  }

  /** Hands out the shares above zero, columns ascending, and empties the row. */
  drain(emit: (column: number, share: number) => void): void {
    const columns = this.xEdges.length - 1
    let toTheRight = 0
    for (let column = this.last; column >= this.first; column--) {
      this.inside[column]! += toTheRight
      toTheRight += this.leftOf[column]!
      this.leftOf[column] = 0
    }
    for (let column = this.first; column <= this.last; column++) {
      const share = this.inside[column]!
      this.inside[column] = 0
      if (column < columns && share > roundingShare) emit(column, share > 1 - roundingShare ? 1 : share)
    }
    this.first = Infinity
    this.last = -1
  }
}

/** Edges by the first row they touch, as chains: `head` of each row, then `next`. */
function chainsByRow({ count, numbers }: Edges, yEdges: Float64Array): { head: Int32Array; next: Int32Array } {
  const rows = yEdges.length - 1
  const head = new Int32Array(rows).fill(-1)
  const next = new Int32Array(count).fill(-1)
  for (let i = 0; i < count; i++) {
    const row = Math.max(0, stepOf(yEdges, numbers[5 * i + 1]!))
    if (row >= rows || numbers[5 * i + 3]! <= yEdges[0]!) continue
    next[i] = head[row]!
    head[row] = i
  }
  return { head, next }
}

/**
 * The exact share of every cell that lies inside the rings, by summing x dy along the edges cell by cell, row by row.
 * `xEdges` and `yEdges` ascend; `emit` is called for shares above zero, rows ascending, then columns. Rings may be
 * concave, of either winding, reach past the grid, or be smaller than a cell.
 */
export function scanCoverage(
  rings: readonly PlaneRing[],
  xEdges: Float64Array,
  yEdges: Float64Array,
  emit: (row: number, column: number, share: number) => void,
): void {
  const edges = edgesOf(rings)
  const { numbers } = edges
  const { head, next } = chainsByRow(edges, yEdges)
  const sums = new RowSums(xEdges)
  let active: number[] = []
  for (let row = 0; row < head.length; row++) {
    for (let i = head[row]!; i >= 0; i = next[i]!) active.push(i)
    if (active.length === 0) continue
    const bottom = yEdges[row]!
    const top = yEdges[row + 1]!
    for (const i of active) {
      const [xl, yl, xu, yu] = [numbers[5 * i]!, numbers[5 * i + 1]!, numbers[5 * i + 2]!, numbers[5 * i + 3]!]
      const low = Math.max(yl, bottom)
      const high = Math.min(yu, top)
      if (high <= low) continue
      const xa = low === yl ? xl : xl + (xu - xl) * ((low - yl) / (yu - yl))
      const xb = high === yu ? xu : xl + (xu - xl) * ((high - yl) / (yu - yl))
      const rise = (high - bottom) / (top - bottom) - (low - bottom) / (top - bottom)
      sums.add(xa, xb, rise, numbers[5 * i + 4]!)
    }
    sums.drain((column, share) => emit(row, column, share))
    active = active.filter((i) => numbers[5 * i + 3]! > top)
  }
}
