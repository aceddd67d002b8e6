import type { Position } from 'geojson'
import { union, type Geom } from 'polyclip-ts'
import { polygonAreaKm2 } from '../../../shared/science/ring-area'
import { OutlineRefused } from './outline-refused'
import type { Repairs } from './repairs'

/**
 * Parts that overlap or share an edge are joined, so that water counts once and an outline cut at the 180th meridian
 * (RFC 7946, 3.1.9) is the same region as one that runs across it. Parts must lie in one turn of longitudes.
 */
export function joinParts(parts: Position[][][], repairs: Repairs): Position[][][] {
  if (!parts.some((part, i) => parts.slice(i + 1).some((other) => boxesMeet(part[0]!, other[0]!)))) return parts
  const before = areaOf(parts)
  const joined = unionOf(parts)
  const after = areaOf(joined)
  if (after < before * (1 - 1e-9)) repairs.note('Parts that overlapped were joined; their water counts once.')
  else if (joined.length === parts.length) return parts
  else repairs.note('Parts that share an edge were joined.')
  return joined
}

function unionOf(parts: Position[][][]): Position[][][] {
  try {
    const [first, ...others] = parts.map((part) => [part] as Geom)
    return union(first!, ...others) as Position[][][]
  } catch {
    throw new OutlineRefused('Parts of the outline overlap in a way that cannot be joined. Draw the water as parts that lie beside each other.', parts[0]![0]![0]!)
  }
}

function areaOf(parts: Position[][][]): number {
  return polygonAreaKm2({ type: 'MultiPolygon', coordinates: parts })
}

function boxesMeet(a: readonly Position[], b: readonly Position[]): boolean {
  return [0, 1].every((axis) => {
    const of = (ring: readonly Position[]) => ring.map((point) => point[axis]!)
    const [first, second] = [of(a), of(b)]
    return least(first) <= most(second) && least(second) <= most(first)
  })
}

const least = (values: number[]) => values.reduce((a, b) => Math.min(a, b), Infinity)
const most = (values: number[]) => values.reduce((a, b) => Math.max(a, b), -Infinity)
