import type { Polygon } from 'geojson'

export interface Shape {
  name: string
  geometry: Polygon
}

/** Outlines with twelve corners, of a fixed seed: centres anywhere in the box, radii between two lengths in degrees. */
export function shapes(count: number, box: { west: number; east: number; south: number; north: number; least: number; most: number }, seed = 7): Shape[] {
  const random = generator(seed)
  return Array.from({ length: count }, (_, i) => {
    const radius = box.least * (box.most / box.least) ** random()
    const lon = box.west + radius + random() * (box.east - box.west - 2 * radius)
    const lat = box.south + radius + random() * (box.north - box.south - 2 * radius)
    const ring = Array.from({ length: 12 }, (_, corner) => {
      const away = radius * (0.6 + 0.4 * random())
      const turn = (corner / 12) * 2 * Math.PI
      return [lon + away * Math.cos(turn), lat + away * Math.sin(turn)]
    })
    return { name: `Bench ${seed}-${i + 1}`, geometry: { type: 'Polygon', coordinates: [[...ring, ring[0]!]] } }
  })
}

/** Numbers from 0 to 1 after Park and Miller's minimal standard generator. */
function generator(seed: number): () => number {
  let state = seed
  return () => (state = (state * 48271) % 2147483647) / 2147483647
}
