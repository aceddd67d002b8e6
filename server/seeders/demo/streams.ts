import type { NoiseStream } from './noise'

const field = (stream: number, knots: [number, number], memory: number): NoiseStream => ({ stream, knots, memory })

/** Every stream of noise the scenario draws from. Changing one changes all values of the demo. */
export const streams = {
  standing: field(1, [12, 12], 0),
  /** Scatter of the sea, from slow and wide to quick and small. */
  slow: field(2, [4, 5], 0.965),
  wide: field(3, [6, 7], 0.88),
  eddies: field(4, [12, 15], 0.8),
  patches: field(5, [34, 42], 0.5),
  /** Threads and holes in blooms and chalk. */
  threads: field(6, [20, 25], 0.75),
  /** Cloud: whole weather systems, their bands, their ragged edges. */
  weather: field(10, [4, 4], 0.82),
  bands: field(11, [9, 10], 0.7),
  shreds: field(12, [26, 32], 0.35),
  /** Numbers, not fields. */
  springShift: 20,
  pulses: 21,
  /** A sensor's own noise: added to the feed's number. */
  sensor: 30,
  ragged: 40,
  glint: 50,
}
