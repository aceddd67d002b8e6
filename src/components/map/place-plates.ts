export interface Box {
  x: number
  y: number
  width: number
  height: number
}

export interface Anchor {
  id: number
  /** Outline points on screen. */
  outline: readonly (readonly [x: number, y: number])[]
  width: number
  height: number
}

export interface PlacedPlate extends Box {
  id: number
  /** Where the leader meets the outline, and where it leaves the plate. */
  leader: { x1: number; y1: number; x2: number; y2: number }
}

const gaps = [14, 34, 58]
const margin = 4

/**
 * Finds a place for each plate beside its outline, in the order given: the first ones have the choice. A place costs
 * what it covers of other plates, of the kept-free boxes and of other outlines, and its distance.
 */
export function placePlates(anchors: readonly Anchor[], map: { width: number; height: number }, keepFree: readonly Box[]): PlacedPlate[] {
  const placed: PlacedPlate[] = []
  for (const anchor of anchors) {
    const own = boxOf(anchor.outline)
    if (own.x > map.width || own.y > map.height || own.x + own.width < 0 || own.y + own.height < 0) continue
    let best: { box: Box; cost: number } | undefined
    for (const box of candidates(own, anchor.width, anchor.height)) {
      const cost =
        10 * outside(box, map) +
        6 * sum(placed, (other) => overlap(box, grown(other))) +
        6 * sum(keepFree, (other) => overlap(box, other)) +
        4 * sum(anchors, (other) => covered(box, other.outline)) +
        3 * distance(box, own)
      if (!best || cost < best.cost) best = { box, cost }
    }
    if (best) placed.push({ id: anchor.id, ...best.box, leader: leaderOf(best.box, anchor.outline) })
  }
  return placed
}

function boxOf(points: Anchor['outline']): Box {
  const xs = points.map(([x]) => x)
  const ys = points.map(([, y]) => y)
  const [x, y] = [Math.min(...xs), Math.min(...ys)]
  return { x, y, width: Math.max(...xs) - x, height: Math.max(...ys) - y }
}

function* candidates(own: Box, width: number, height: number): Generator<Box> {
  const middleX = own.x + own.width / 2 - width / 2
  const middleY = own.y + own.height / 2 - height / 2
  for (const gap of gaps) {
    const left = own.x - width - gap
    const right = own.x + own.width + gap
    const above = own.y - height - gap
    const below = own.y + own.height + gap
    for (const x of [left, own.x - width * 0.6, middleX, own.x + own.width - width * 0.4, right]) {
      yield { x, y: above, width, height }
      yield { x, y: below, width, height }
    }
    for (const y of [own.y, middleY, own.y + own.height - height]) {
      yield { x: left, y, width, height }
      yield { x: right, y, width, height }
    }
  }
}

function outside(box: Box, map: { width: number; height: number }): number {
  const inside = overlap(box, { x: margin, y: margin, width: map.width - 2 * margin, height: map.height - 2 * margin })
  return box.width * box.height - inside
}

function overlap(a: Box, b: Box): number {
  const width = Math.min(a.x + a.width, b.x + b.width) - Math.max(a.x, b.x)
  const height = Math.min(a.y + a.height, b.y + b.height) - Math.max(a.y, b.y)
  return width > 0 && height > 0 ? width * height : 0
}

/** About how much of an outline a box hides: of its water by a few points inside the box, of its line by its corners. */
function covered(box: Box, outline: Anchor['outline']): number {
  const around = boxOf(outline)
  if (overlap(grown(box), around) === 0) return 0
  let hits = 0
  for (const share of [0.1, 0.37, 0.63, 0.9]) {
    for (const down of [0, 0.5, 1]) if (isInside(box.x + share * box.width, box.y + down * box.height, outline)) hits++
  }
  const corners = outline.filter(([x, y]) => overlap(grown(box), { x, y, width: 1, height: 1 }) > 0).length
  return (hits / 12) * box.width * box.height + corners * 150
}

function isInside(x: number, y: number, outline: Anchor['outline']): boolean {
  let inside = false
  outline.forEach(([x1, y1], index) => {
    const [x2, y2] = outline.at(index - 1) ?? [x1, y1]
    if (y1 > y !== y2 > y && x < x1 + ((y - y1) / (y2 - y1)) * (x2 - x1)) inside = !inside
  })
  return inside
}

function grown(box: Box): Box {
  return { x: box.x - 6, y: box.y - 6, width: box.width + 12, height: box.height + 12 }
}

function distance(a: Box, b: Box): number {
  return Math.hypot(a.x + a.width / 2 - b.x - b.width / 2, a.y + a.height / 2 - b.y - b.height / 2)
}

function sum<T>(items: readonly T[], cost: (item: T) => number): number {
  return items.reduce((total, item) => total + cost(item), 0)
}

/** From the outline's nearest corner to the nearest point on the plate's edge. */
function leaderOf(box: Box, outline: Anchor['outline']): PlacedPlate['leader'] {
  let found = { x1: 0, y1: 0, x2: 0, y2: 0 }
  let shortest = Infinity
  for (const [x, y] of outline) {
    const x2 = Math.min(Math.max(x, box.x), box.x + box.width)
    const y2 = Math.min(Math.max(y, box.y), box.y + box.height)
    const length = Math.hypot(x - x2, y - y2)
    if (length < shortest) {
      shortest = length
      found = { x1: x, y1: y, x2, y2 }
    }
  }
  return found
}
