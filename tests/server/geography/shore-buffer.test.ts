import { describe, expect, it } from 'vitest'
import { distanceToLandKm } from '../../../server/geography/coast'
import { cellCentre } from '../../../server/grids/cell-centre'
import { weighGrid } from '../../../server/workers/weigh-grid'
import type { AxesGrid } from '../../../shared/science/grid'

const grid: AxesGrid = {
  kind: 'axes',
  rows: 40,
  columns: 60,
  latEdges: Float64Array.from({ length: 41 }, (_, i) => 52 - i / 40),
  lonEdges: Float64Array.from({ length: 61 }, (_, i) => -10.5 + i / 40),
}
const coast = { type: 'Polygon' as const, coordinates: [[[-10.5, 51], [-9, 51], [-9, 52], [-10.5, 52], [-10.5, 51]]] }

describe('a shore buffer', () => {
  it('leaves out exactly the cells whose centre is on land or nearer to it than the buffer', () => {
    const all = weighGrid(coast, grid, 0)
    const kept = weighGrid(coast, grid, 4)
    const expected = Array.from(all.index).filter((cell) => distanceToLandKm(...cellCentre(grid, cell), 50) > 4)
    expect(Array.from(kept.index)).toEqual(expected)
    expect(kept.index.length).toBeLessThan(all.index.length)
    expect(kept.water.every((cell) => cell === 1)).toBe(true)
    const shareOf = new Map(Array.from(all.index, (cell, i) => [cell, [all.share[i], all.areaKm2[i]]]))
    for (const [i, cell] of kept.index.entries()) expect([kept.share[i], kept.areaKm2[i]]).toEqual(shareOf.get(cell))
  })

  it('takes more the wider it is, and nothing where the outline shows no water', () => {
    const counts = [0, 1, 5, 20].map((km) => weighGrid(coast, grid, km).index.length)
    expect(counts).toEqual([...counts].sort((a, b) => b - a))
    expect(new Set(counts).size).toBe(4)
    const inland = { type: 'Polygon' as const, coordinates: [[[8, 48], [9, 48], [9, 49], [8, 49], [8, 48]]] }
    const there: AxesGrid = { ...grid, latEdges: grid.latEdges.map((lat) => lat - 3), lonEdges: grid.lonEdges.map((lon) => lon + 18.5) }
    expect(weighGrid(inland, there, 5).index.length).toBe(weighGrid(inland, there, 0).index.length)
  })
})
