import { rgbOf, type Rgb } from './ok-lab'
import type { Theme } from './ramps'

/** What a cell of a mask is: as in the land outline, or water there is not in it, or land. */
export const maskGrounds = ['water', 'land', 'gained', 'lost'] as const
export type MaskGround = (typeof maskGrounds)[number]

interface Ink {
  fill: Rgb
  /** Of the strokes that tell differing cells apart without colour. */
  stroke: Rgb
}

const inks = (water: string, land: string, onWater: string, onLand: string): Record<MaskGround, Ink> => ({
  water: { fill: rgbOf(water), stroke: rgbOf(water) },
  land: { fill: rgbOf(land), stroke: rgbOf(land) },
  gained: { fill: rgbOf(water), stroke: rgbOf(onWater) },
  lost: { fill: rgbOf(land), stroke: rgbOf(onLand) },
})

/** The colours of the map's own sea and land, a step further apart. */
export const maskInks: Record<Theme, Record<MaskGround, Ink>> = {
  light: inks('#c0d4d2', '#dcd7c7', '#04596e', '#943f19'),
  night: inks('#16323a', '#2b302b', '#80c2d0', '#e49869'),
}

const gap = 6

/** Water that the outline has as land is stroked one way, land that it has as water the other way. */
export function strokeAt(ground: MaskGround, x: number, y: number): boolean {
  if (ground === 'gained') return (x + y) % gap < 2
  return ground === 'lost' && (x - y + 256 * gap) % gap < 2
}
