import { dayInYear, epochDay } from './days'
import { addPatch } from './blooms'
import { box, eachCell, type DemoGrid } from './grid'
import { addNoise, addWhiteNoise } from './noise'
import { streams } from './streams'

/** Weather the story needs: pushes the cloud field up (overcast) or down (open sky) round a place for some days. */
interface Sky {
  from: number
  to: number
  push: number
  middle: [number, number]
  widthKm: [number, number]
}

function sky(from: string, to: string, push: number, middle: [number, number], widthKm: [number, number]): Sky {
  return { from: epochDay(from), to: epochDay(to), push, middle, widthKm }
}

const overcast = 5
const open = -5

const past = [
  // Three blooms that hardly anybody could have seen from above.
  sky('2017-08-25', '2017-09-01', overcast, [-7.8, 51.45], [48, 40]),
  sky('2019-05-30', '2019-06-08', overcast, [-10.1, 51.22], [44, 40]),
  sky('2020-09-30', '2020-10-05', overcast, [-7.8, 51.45], [48, 40]),
]

/** The last week of the history and the first day after it, so that every region stands where the story says. */
const skies: Sky[] = [
  ...past,
  // Tarrow Bay: seen on the 6th, then under cloud until the bloom shows on the 10th.
  sky('2026-06-06', '2026-06-06', open, [-10.75, 51.9], [45, 38]),
  sky('2026-06-07', '2026-06-09', overcast, [-10.85, 51.9], [40, 34]),
  sky('2026-06-10', '2026-06-11', open, [-10.75, 51.9], [55, 45]),
  // Mether Sound: two clear views on the 5th and 6th open its alert; seen again from the 10th.
  sky('2026-06-03', '2026-06-04', overcast, [-9.15, 51.3], [50, 30]),
  sky('2026-06-05', '2026-06-06', open, [-9.15, 51.3], [55, 32]),
  sky('2026-06-07', '2026-06-09', overcast, [-9.15, 51.3], [45, 30]),
  sky('2026-06-10', '2026-06-11', open, [-9.15, 51.3], [55, 32]),
  // Quillin Roads: nothing since the 7th.
  sky('2026-06-07', '2026-06-07', open, [-9.7, 53.13], [32, 20]),
  sky('2026-06-08', '2026-06-12', overcast, [-9.6, 53.2], [42, 30]),
  // Hallin Bank: last seen on the 8th.
  sky('2026-06-08', '2026-06-08', open, [-11.7, 51.12], [55, 42]),
  sky('2026-06-09', '2026-06-12', overcast, [-11.8, 51.1], [50, 44]),
  // Kestle Shelf, Corran Mouth, Skerrow Reach: usual and seen today.
  sky('2026-06-11', '2026-06-11', open, [-10.1, 51.2], [40, 30]),
  sky('2026-06-11', '2026-06-11', open, [-10.05, 52.65], [38, 28]),
  sky('2026-06-11', '2026-06-11', open, [-7.8, 51.45], [38, 32]),
  // The second sensor's last days and the long record's first: seen often enough to show a value.
  sky('2026-06-01', '2026-06-02', open, [-10.7, 53.3], [38, 30]),
  sky('2026-06-11', '2026-06-11', open, [-11.85, 52.7], [45, 38]),
]

/**
 * 1 where nothing was seen: cloud with memory of days and soft shapes, more in winter, and on some days of the
 * orbit's sixteen a slanting gap between swaths. `sensor` gives each sensor its own ragged edges (another hour).
 */
export function hidden(grid: DemoGrid, seed: number, day: number, sensor: number): Uint8Array {
  const cloud = new Float64Array(grid.latitudes.length * grid.longitudes.length)
  const { weather, bands, shreds, ragged } = streams
  addNoise(cloud, 0.55, weather, seed, day, grid)
  addNoise(cloud, 0.74, bands, seed, day, grid)
  addNoise(cloud, 0.36, { ...shreds, stream: shreds.stream + 100 * sensor }, seed, day, grid)
  addWhiteNoise(cloud, 0.14, ragged + sensor, seed, day)
  for (const one of skies) {
    if (day >= one.from && day <= one.to) addPatch(cloud, grid, one.push, one.middle, one.widthKm)
  }
  // The noise has unit variance, so this is the normal quantile near its middle.
  const share = 0.49 + 0.09 * Math.cos((2 * Math.PI * (dayInYear(day) - 15)) / 365.25)
  const level = (0.5 - share) * Math.sqrt(2 * Math.PI)
  const gap = swathGap(day)
  const mask = new Uint8Array(cloud.length)
  for (let i = 0; i < cloud.length; i++) if ((cloud[i] ?? 0) > level) mask[i] = 1
  if (gap === null) return mask
  eachCell(grid, (index, longitude, latitude) => {
    if (Math.abs(longitude - gap - 0.35 * (latitude - box.south)) < 0.42) mask[index] = 1
  })
  return mask
}

/** Longitude at the southern edge of the gap between two swaths, or null on days whose swath takes in the whole box. */
function swathGap(day: number): number | null {
  const turn = (((day - epochDay('2026-06-11')) * 7) % 16 + 16) % 16
  return turn >= 4 && turn <= 8 ? box.west - 0.9 + (turn - 4) * 1.3 : null
}
