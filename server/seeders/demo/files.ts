import { dayInYear, daysBetween, isoDay, yearOf } from './days'
import { hasLayer } from './fields'
import { longFeedVersions, scenarioDays, type FeedKey } from './scenario'
import { reflectanceBands, type ChlorophyllFeedKey } from './scenario-feeds'

export { writeDemoFile } from './write-file'

/** One file as a provider would deliver it. The same plan always gives the same names, days and values. */
export interface DemoFile {
  /** Starts with the first day, and the last where there are several: demo-chl-20240101-20241231.nc. */
  name: string
  format: 'netcdf4' | 'netcdf-classic' | 'geotiff'
  content: ChlorophyllFeedKey | 'rrs'
  /** Feeds that find a layer in it. */
  feeds: FeedKey[]
  /** Epoch days, ascending, one time step each. */
  days: number[]
  packing: 'int16' | 'float32'
  processingVersion: string
}

type Plan = Pick<DemoFile, 'format' | 'packing'>

const packed: Plan = { format: 'netcdf4', packing: 'int16' }
const classic: Plan = { format: 'netcdf-classic', packing: 'float32' }
const packedClassic: Plan = { format: 'netcdf-classic', packing: 'int16' }
const picture: Plan = { format: 'geotiff', packing: 'float32' }

const stems = { chl: 'demo-chl', chlSecond: 'demo-second', chlLong: 'demo-long', rrs: 'demo-rrs' } as const

/** All files of the history, 11 June 2016 to 10 June 2026, feed by feed and in order of time. */
export function historyFiles(): DemoFile[] {
  return [...firstSensor(), ...secondSensor(), ...longRecord(), ...reflectances()]
}

/** Files that arrive on one day after the history; none for a day within it. */
export function filesOf(day: number): DemoFile[] {
  if (day < scenarioDays.today) return []
  const contents = (['chl', 'chlLong', 'rrs'] as const).filter((content) => hasLayer(content, day))
  return contents.map((content) => demoFile(content, [day], packed))
}

function firstSensor(): DemoFile[] {
  return [
    ...[2016, 2017, 2018, 2019, 2020, 2021, 2022, 2023].map((year) => yearly('chl', year, packed)),
    yearly('chl', 2024, classic),
    yearly('chl', 2025, packedClassic),
    span('chl', '2026-01-01', '2026-04-30', packed),
    span('chl', '2026-05-01', '2026-05-31', classic),
    ...daysBetween('2026-06-01', '2026-06-10').map((day) => demoFile('chl', [day], picture)),
  ]
}

function secondSensor(): DemoFile[] {
  return [2020, 2021, 2022, 2023, 2024, 2025, 2026].map((year) => yearly('chlSecond', year, packed))
}

function longRecord(): DemoFile[] {
  const change = scenarioDays.longFeedChange
  return [
    ...[2020, 2021, 2022, 2023, 2024, 2025].map((year) => yearly('chlLong', year, packed)),
    span('chlLong', '2026-01-01', isoDay(change - 1), packed),
    span('chlLong', isoDay(change), '2026-12-31', packed),
  ]
}

/** One file a quarter, five bands in each. */
function reflectances(): DemoFile[] {
  const quarters = new Map<string, number[]>()
  for (let day = scenarioDays.firstOfReflectance; day < scenarioDays.today; day++) {
    const quarter = `${yearOf(day)} ${Math.min(3, Math.floor(dayInYear(day) / 91.5))}`
    quarters.set(quarter, [...(quarters.get(quarter) ?? []), day])
  }
  return [...quarters.values()].map((days) => demoFile('rrs', days, packed))
}

function yearly(content: DemoFile['content'], year: number, plan: Plan): DemoFile {
  return span(content, `${year}-01-01`, `${year}-12-31`, plan)
}

/** A file with every day of a period that has a layer and lies in the history. */
function span(content: DemoFile['content'], first: string, last: string, plan: Plan): DemoFile {
  const days = daysBetween(first, last).filter((day) => day < scenarioDays.today && hasLayer(content, day))
  return demoFile(content, days, plan)
}

function demoFile(content: DemoFile['content'], days: number[], plan: Plan): DemoFile {
  const first = days[0] ?? Number.NaN
  const stamps = [...new Set([first, days.at(-1) ?? first])].map((day) => isoDay(day).replaceAll('-', ''))
  const ending = plan.format === 'geotiff' ? 'tif' : 'nc'
  const feeds: FeedKey[] = content === 'rrs' ? reflectanceBands.map((band) => `rrs${band}` as const) : [content]
  const after = content === 'chlLong' && first >= scenarioDays.longFeedChange
  const processingVersion = after ? longFeedVersions.after : longFeedVersions.before
  return { name: `${stems[content]}-${stamps.join('-')}.${ending}`, content, feeds, days, processingVersion, ...plan }
}
