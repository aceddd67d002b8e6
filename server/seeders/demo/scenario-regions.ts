import type { FeedKey } from './scenario-feeds'

export interface DemoRegion {
  key: RegionKey
  name: string
  geometry: { type: 'Polygon'; coordinates: [number, number][][] }
  timeZone: string
  site: { name: string; latitude: number; longitude: number }
  contacts: { name: string; phone: string; note: string }[]
  /** The feed its rule watches. */
  feed: FeedKey
}

export type RegionKey =
  | 'tarrow'
  | 'mether'
  | 'quillin'
  | 'hallin'
  | 'brannoch'
  | 'vane'
  | 'corran'
  | 'kestle'
  | 'skerrow'
  | 'fennick'

const lunn = { name: 'Perpetua Lunn (demo)', phone: '555 0101', note: 'Hollin Ledge Growers, mussels, gear at 8 m' }
const quell = { name: 'Dara Quell (demo)', phone: '555 0114', note: 'duty lead' }
const tesk = { name: 'Merrin Tesk (demo)', phone: '555 0127', note: 'salmon cages, two barges' }

type Outline = [number, number][]

function region(
  key: RegionKey,
  name: string,
  feed: FeedKey,
  site: [string, number, number],
  contacts: DemoRegion['contacts'],
  outline: Outline,
): DemoRegion {
  const [siteName, longitude, latitude] = site
  const first = outline[0] ?? [0, 0]
  const geometry = { type: 'Polygon' as const, coordinates: [[...outline, first]] }
  return { key, name, feed, site: { name: siteName, latitude, longitude }, contacts, geometry, timeZone: 'Europe/Dublin' }
}

/** Outlines run counter-clockwise, longitude first. Names are invented; the coast is a real one. */
export const regions: DemoRegion[] = [
  region('tarrow', 'Tarrow Bay', 'chl', ['Tarrow lines', -10.48, 51.95], [lunn, quell], [
    [-11.12, 51.96], [-11.05, 51.79], [-10.62, 51.72], [-10.42, 51.86], [-10.55, 52.04], [-10.77, 52.07], [-10.98, 52.09],
  ]),
  region('mether', 'Mether Sound', 'chl', ['Mether cages', -9.1, 51.42], [tesk, quell], [
    [-9.63, 51.21], [-9.35, 51.13], [-8.86, 51.2], [-8.68, 51.28], [-8.76, 51.48], [-9.14, 51.43], [-9.6, 51.34],
  ]),
  region('quillin', 'Quillin Roads', 'chl', ['Quillin trestles', -9.62, 53.16], [lunn], [
    [-10.02, 53.16], [-9.94, 53.02], [-9.6, 53.06], [-9.38, 53.16], [-9.45, 53.23], [-9.8, 53.21],
  ]),
  region('hallin', 'Hallin Bank', 'chl', ['Hallin buoy', -11.45, 51.12], [quell], [
    [-12.12, 51.34], [-12.2, 51.05], [-11.95, 50.86], [-11.4, 50.88], [-11.22, 51.16], [-11.6, 51.42],
  ]),
  region('brannoch', 'Brannoch Ledge', 'chlSecond', ['Brannoch mark', -10.6, 53.32], [tesk], [
    [-11.05, 53.28], [-10.74, 53.12], [-10.42, 53.22], [-10.34, 53.42], [-10.7, 53.47], [-10.98, 53.45],
  ]),
  region('vane', 'Vane Deep', 'chlLong', ['Vane station', -11.85, 52.72], [quell], [
    [-12.3, 52.74], [-12.24, 52.5], [-11.72, 52.43], [-11.42, 52.64], [-11.62, 52.96], [-12.26, 52.91],
  ]),
  region('corran', 'Corran Mouth', 'chl', ['Corran rafts', -9.88, 52.6], [lunn, tesk], [
    [-10.32, 52.54], [-9.84, 52.49], [-9.74, 52.56], [-9.72, 52.62], [-9.9, 52.78], [-10.34, 52.75],
  ]),
  region('kestle', 'Kestle Shelf', 'chl', ['Kestle buoy', -10.1, 51.3], [quell], [
    [-10.4, 51.1], [-10.22, 51.02], [-9.94, 51.03], [-9.81, 51.2], [-9.95, 51.4], [-10.36, 51.39],
  ]),
  region('skerrow', 'Skerrow Reach', 'chl', ['Skerrow rope', -7.75, 51.6], [lunn, quell], [
    [-8.1, 51.27], [-7.6, 51.27], [-7.45, 51.52], [-7.72, 51.64], [-8.14, 51.53],
  ]),
  region('fennick', 'Fennick Ground', 'chl', ['Fennick mark', -7.8, 50.95], [tesk, quell], [
    [-8.35, 50.92], [-8.05, 50.72], [-7.45, 50.74], [-7.25, 50.98], [-7.6, 51.15], [-8.2, 51.14],
  ]),
]

export function regionOf(key: RegionKey): DemoRegion {
  const found = regions.find((candidate) => candidate.key === key)
  if (!found) throw new Error(`The demo has no region ${key}.`)
  return found
}
