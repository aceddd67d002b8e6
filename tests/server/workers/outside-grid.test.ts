import { describe, expect, it } from 'vitest'
import type { Polygon } from 'geojson'
import { weighGrid } from '../../../server/workers/weigh-grid'
import type { AxesGrid, CurvilinearGrid, TransformGrid } from '../../../shared/science/grid'
import { figuresOf } from '../../../shared/science/figures'
import { outlineOf } from '../../../shared/science/region-outline'

const box = (west: number, south: number, east: number, north: number): Polygon => ({
  type: 'Polygon', coordinates: [[[west, south], [east, south], [east, north], [west, north], [west, south]]],
})
const axes = (west: number, south: number, east: number, north: number, step: number): AxesGrid => {
  const edges = (from: number, to: number) => Float64Array.from({ length: Math.round((to - from) / step) + 1 }, (_, i) => from + i * step)
  const [latEdges, lonEdges] = [edges(south, north), edges(west, east)]
  return { kind: 'axes', rows: latEdges.length - 1, columns: lonEdges.length - 1, latEdges, lonEdges }
}
const coverageOf = (region: Polygon, grid: AxesGrid | CurvilinearGrid | TransformGrid, bufferKm = 0) => {
  const weights = weighGrid(region, grid, bufferKm)
  return figuresOf(new Float64Array(weights.index.length).fill(1), outlineOf(weights), 'log10').coverage
}

describe('a region that reaches beyond the grid', () => {
  it('half of it open sea outside: a full view covers one half', () => {
    expect(coverageOf(box(-14, 46, -12, 48), axes(-13, 40, -8, 50, 0.1))).toBeCloseTo(0.5, 9)
    expect(coverageOf(box(-13, 46, -12, 48), axes(-13, 40, -8, 50, 0.1))).toBe(1)
  })

  it('what is land outside is not missed', () => {
    // Inland Spain from 6W to 4W; the sea off Porto from 11W to 9.5W. The grid ends at 9.5W.
    const region: Polygon = { type: 'Polygon', coordinates: [[[-11, 41], [-4, 41], [-4, 42], [-11, 42], [-11, 41]]] }
    const coverage = coverageOf(region, axes(-20, 35, -9.5, 50, 0.1))!
    // The coast at 41N to 42N lies near 8.8W: 1.5 of some 2.2 degrees of sea.
    expect(coverage).toBeGreaterThan(0.63)
    expect(coverage).toBeLessThan(0.75)
  })

  it('a grid that goes round the globe has all of it, over any seam', () => {
    expect(coverageOf(box(-3, 46, 3, 47), axes(0, -80, 360, 80, 1))).toBe(1)
    expect(coverageOf({ type: 'Polygon', coordinates: [[[178, 0], [182, 0], [182, 4], [178, 4], [178, 0]]] }, axes(-180, -80, 180, 80, 1))).toBe(1)
    expect(coverageOf(box(-160, 10, -158, 12), axes(190, 0, 220, 20, 0.5))).toBe(1)
    expect(coverageOf(box(-171, 10, -169, 12), axes(190, 0, 220, 20, 0.5))).toBeCloseTo(0.5, 9)
  })

  it('a granule of curved cells over one half of it', () => {
    const [rows, columns] = [40, 40]
    const cornerLons = new Float64Array(41 * 41)
    const cornerLats = new Float64Array(41 * 41)
    for (let i = 0; i < cornerLons.length; i++) {
      const [row, column] = [Math.floor(i / 41), i % 41]
      // The western side runs along 13W; the rest leans.
      cornerLons[i] = -13 + column * 0.1 * (1 + row / 400)
      cornerLats[i] = 45 + row * 0.1 + column * 0.01
    }
    const grid: CurvilinearGrid = { kind: 'curvilinear', rows, columns, cornerLons, cornerLats }
    expect(coverageOf(box(-14, 46.5, -12, 48), grid)).toBeCloseTo(0.5, 3)
    expect(coverageOf(box(-12.5, 46.5, -12, 48), grid)).toBe(1)
  })

  it('a wide region wholly on a polar plane lies on it, though its sides are curved there', () => {
    const grid: TransformGrid = { kind: 'transform', rows: 800, columns: 800, transform: [-4e6, 1e4, 0, 4e6, 0, -1e4], crs: '+proj=stere +lat_0=90 +lat_ts=70 +lon_0=-45 +datum=WGS84' }
    expect(coverageOf(box(-40, 60, -15, 62), grid)).toBe(1)
  })

  it('by a shore buffer: cells left out near the shore are not missed, the open sea outside is', () => {
    // Off Portugal, from the shore out to 11W.
    expect(coverageOf(box(-11, 41, -8, 42), axes(-20, 35, -5, 50, 0.1), 20)).toBe(1)
    const coverage = coverageOf(box(-11, 41, -8, 42), axes(-10, 35, -5, 50, 0.1), 20)!
    expect(coverage).toBeGreaterThan(0.4)
    expect(coverage).toBeLessThan(0.6)
  })
})
