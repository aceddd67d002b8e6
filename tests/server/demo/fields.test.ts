import { describe, expect, it } from 'vitest'
import { cellsInside } from '../../../server/seeders/demo/answer-key'
import { dayInYear, epochDay } from '../../../server/seeders/demo/days'
import { chlorophyllOn, coarseGrid, demoGrid, gridOf, reflectanceOn } from '../../../server/seeders/demo/fields'
import { landOn } from '../../../server/seeders/demo/grid'
import { bandRatioLog10, log10RatioOf } from '../../../server/seeders/demo/reflectance'
import { regionOf, regions, scenarioDays, type ChlorophyllFeedKey, type RegionKey } from '../../../server/seeders/demo/scenario'

const chl = (day: number, feed: ChlorophyllFeedKey = 'chl') => chlorophyllOn(feed, day)?.values ?? new Float64Array()

describe('the demo sea', () => {
  it('has values that depend on the date alone, not on what was made before', () => {
    const day = epochDay('2023-11-05')
    const alone = chl(day)
    for (let before = day - 20; before < day; before++) chl(before)
    reflectanceOn(day)
    expect(chl(day)).toEqual(alone)
    expect(chl(day + 1)).not.toEqual(alone)
  })

  it('has nothing on land and lies on two grids of one box', () => {
    const land = landOn(demoGrid)
    const values = chl(scenarioDays.today)
    expect(values.length).toBe(80 * 100)
    expect(coarseGrid.latitudes.length * coarseGrid.longitudes.length).toBe(40 * 50)
    expect(values.some((value, i) => land[i] === 1 && !Number.isNaN(value))).toBe(false)
    expect(land.reduce((sum, cell) => sum + cell, 0) / land.length).toBeGreaterThan(0.2)
  })

  it('hides about half of the water over a year, more in winter', () => {
    const land = landOn(demoGrid)
    const missing = { year: 0, winter: 0, summer: 0 }
    const seen = { year: 0, winter: 0, summer: 0 }
    for (let day = epochDay('2021-01-01'); day < epochDay('2023-01-01'); day++) {
      const season = dayInYear(day) < 60 || dayInYear(day) > 330 ? 'winter' : dayInYear(day) > 150 && dayInYear(day) < 240 ? 'summer' : null
      chl(day).forEach((value, i) => {
        if (land[i]) return
        const counts = Number.isNaN(value) ? missing : seen
        counts.year++
        if (season) counts[season]++
      })
    }
    const share = (part: keyof typeof seen) => missing[part] / (missing[part] + seen[part])
    expect(share('year')).toBeGreaterThan(0.45)
    expect(share('year')).toBeLessThan(0.58)
    expect(share('winter')).toBeGreaterThan(share('summer') + 0.08)
  })

  it('has cloud and scatter that remember the days before', () => {
    const cells = cellsInside('skerrow', demoGrid)
    const start = epochDay('2021-02-01')
    const pictures = Array.from({ length: 365 }, (_, i) => chl(start + i))
    const cell = cells[40] ?? 0
    const clouded = pictures.map((values) => (Number.isNaN(values[cell]) ? 1 : 0))
    const departures = pictures.map((values) => Math.log10(values[cell] ?? Number.NaN) - seasonal(pictures, cell, values))
    expect(lagged(clouded, 1)).toBeGreaterThan(0.3)
    expect(lagged(clouded, 1)).toBeGreaterThan(lagged(clouded, 5) + 0.15)
    expect(lagged(departures, 1)).toBeGreaterThan(0.4)
    expect(lagged(departures, 1)).toBeLessThan(0.9)
    expect(lagged(departures, 1)).toBeGreaterThan(lagged(departures, 12) + 0.2)
  })

  it('rises in spring, is low in winter and richer near the coast', () => {
    const june = summary('2021-06-10', '2021-06-25', 'skerrow')
    expect(summary('2021-04-15', '2021-05-05', 'skerrow')).toBeGreaterThan(1.6 * june)
    expect(summary('2021-01-01', '2021-01-25', 'skerrow')).toBeLessThan(0.8 * june)
    expect(june).toBeGreaterThan(1.3 * summary('2021-06-10', '2021-06-25', 'fennick'))
  })

  it('shows the bloom in Tarrow Bay on the 10th and 11th of June, hardly before, and not on the three days between', () => {
    const usual = usualMedian('tarrow')
    const [sixth, tenth, eleventh] = ['2026-06-06', '2026-06-10', '2026-06-11'].map((date) => view('tarrow', date))
    expect(sixth?.coverage).toBeGreaterThan(0.5)
    expect((sixth?.median ?? 0) / usualMedian('tarrow', '2026-06-06')).toBeLessThan(1.8)
    expect(tenth?.coverage).toBeGreaterThan(0.9)
    expect((tenth?.median ?? 0) / usual).toBeGreaterThan(2.4)
    expect(eleventh?.coverage).toBeGreaterThan(0.9)
    expect((eleventh?.median ?? 0) / usual).toBeGreaterThan(4.5)
    for (const date of ['2026-06-07', '2026-06-08', '2026-06-09']) expect(view('tarrow', date).coverage).toBeLessThan(0.25)
  })

  it('shows the milder bloom in Mether Sound on two views before the 7th, and still on the 11th', () => {
    const usual = usualMedian('mether')
    for (const date of ['2026-06-05', '2026-06-06', '2026-06-10', '2026-06-11']) {
      expect(view('mether', date).coverage).toBeGreaterThan(0.8)
      expect(view('mether', date).median / usual).toBeGreaterThan(2.4)
      expect(view('mether', date).median / usual).toBeLessThan(4.4)
    }
  })

  it('lets each other region stand where the story wants it on the 11th of June', () => {
    for (const key of ['kestle', 'corran', 'skerrow', 'fennick'] as const) {
      const today = view(key, '2026-06-11')
      expect(today.coverage, key).toBeGreaterThan(0.6)
      expect(today.median / usualMedian(key), key).toBeLessThan(1.9)
    }
    expect(view('quillin', '2026-06-07').coverage).toBeGreaterThan(0.5)
    for (const date of ['2026-06-08', '2026-06-09', '2026-06-10', '2026-06-11']) {
      expect(view('quillin', date).coverage, date).toBeLessThan(0.25)
    }
    expect(view('hallin', '2026-06-11').coverage).toBeLessThan(0.25)
    expect(view('vane', '2026-06-11').coverage).toBeGreaterThan(0.6)
  })

  it('ends the second sensor on the 2nd of June and lifts the long record on the 20th of May', () => {
    expect(chlorophyllOn('chlSecond', epochDay('2026-06-02'))).not.toBeNull()
    expect(chlorophyllOn('chlSecond', epochDay('2026-06-03'))).toBeNull()
    expect(chlorophyllOn('chlLong', epochDay('2020-06-10'))).toBeNull()
    // What differs between the two sensors of one grid is scatter alone, save for the lift.
    const gap = (from: string) => {
      const ratios = [0, 1, 2, 3, 4, 5].flatMap((i) => {
        const [long, second] = [chl(epochDay(from) + i, 'chlLong'), chl(epochDay(from) + i, 'chlSecond')]
        return [...long.map((value, cell) => value / (second[cell] ?? Number.NaN))].filter((ratio) => !Number.isNaN(ratio))
      })
      return middle(ratios)
    }
    expect(gap('2026-05-10')).toBeCloseTo(1, 1)
    expect(gap('2026-05-21')).toBeCloseTo(1.35, 1)
  })

  it('goes on after the day the demo begins: the bloom grows, then fades', () => {
    const usual = usualMedian('tarrow')
    const later = Array.from({ length: 50 }, (_, i) => view('tarrow', '2026-06-12', i)).filter(({ coverage }) => coverage > 0.5)
    expect(Math.max(...later.slice(0, 4).map(({ median }) => median / usual))).toBeGreaterThan(5)
    expect(middle(later.slice(-5).map(({ median }) => median / usual))).toBeLessThan(2)
  })
})

describe('the reflectances of the demo', () => {
  it('turn the band ratio round over the whole range', () => {
    for (const chlorophyll of [0.03, 0.2, 1, 5, 30, 80]) {
      expect(10 ** bandRatioLog10(log10RatioOf(Math.log10(chlorophyll)))).toBeCloseTo(chlorophyll, chlorophyll < 1 ? 3 : 1)
    }
    // Published check values of the four-band polynomial, version 6: ratio 1 gives 2.12422, ratio 2 gives 0.43098.
    expect(10 ** bandRatioLog10(0)).toBeCloseTo(2.12422, 4)
    expect(10 ** bandRatioLog10(Math.log10(2))).toBeCloseTo(0.43098, 4)
  })

  it('give back the chlorophyll of the same day by the band ratio', () => {
    const day = epochDay('2025-03-14')
    const bands = reflectanceOn(day)?.values
    const values = chl(day)
    let compared = 0
    values.forEach((value, i) => {
      if (Number.isNaN(value) || !bands) return
      const blue = Math.max(bands[443][i] ?? 0, bands[490][i] ?? 0, bands[510][i] ?? 0)
      expect(10 ** bandRatioLog10(Math.log10(blue / (bands[555][i] ?? 0))) / value).toBeCloseTo(1, 2)
      compared++
    })
    expect(compared).toBeGreaterThan(1000)
    expect(reflectanceOn(scenarioDays.firstOfReflectance - 1)).toBeNull()
  })

  it('are bright where the chalky bloom took the chlorophyll away', () => {
    // 28 June 2025: the water is at its chalkiest.
    const day = epochDay('2025-06-28')
    const cells = cellsInside('fennick', demoGrid)
    const green = reflectanceOn(day)?.values[555] ?? new Float64Array()
    const values = chl(day)
    const hollow = cells.filter((cell) => Number.isNaN(values[cell]) && !Number.isNaN(green[cell]))
    expect(hollow.length / cells.length).toBeGreaterThan(0.25)
    expect(Math.min(...hollow.map((cell) => green[cell] ?? 0))).toBeGreaterThan(0.005)
    const clear = middle([...green].filter((_, i) => !Number.isNaN(values[i])))
    expect(middle(hollow.map((cell) => green[cell] ?? 0))).toBeGreaterThan(3 * clear)
  })
})

function view(key: RegionKey, date: string, later = 0) {
  const { feed } = regionOf(key)
  const chosen = feed === 'chlSecond' || feed === 'chlLong' ? feed : 'chl'
  const cells = cellsInside(key, gridOf(chosen))
  const values = chl(epochDay(date) + later, chosen)
  const seen = cells.map((cell) => values[cell] ?? Number.NaN).filter((value) => !Number.isNaN(value))
  return { coverage: seen.length / cells.length, median: middle(seen) }
}

/** Median of the region's medians within five days of 11 June (or of another day of June 2026) in earlier years. */
function usualMedian(key: RegionKey, date = '2026-06-11'): number {
  const years = [2017, 2018, 2019, 2020, 2021, 2022, 2023, 2024, 2025]
  const views = years.flatMap((year) =>
    Array.from({ length: 11 }, (_, i) => view(key, `${year}${date.slice(4)}`, i - 5)),
  )
  return middle(views.filter(({ coverage }) => coverage >= 0.25).map(({ median }) => median))
}

function summary(from: string, to: string, key: RegionKey): number {
  const days = epochDay(to) - epochDay(from) + 1
  const views = Array.from({ length: days }, (_, i) => view(key, from, i))
  return middle(views.filter(({ coverage }) => coverage >= 0.25).map(({ median }) => median))
}

function middle(values: number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[Math.floor(sorted.length / 2)] ?? Number.NaN
}

/** A cell's mean log10 over the 45 days before and after. */
function seasonal(pictures: Float64Array[], cell: number, of: Float64Array): number {
  const at = pictures.indexOf(of)
  const near = pictures.slice(Math.max(0, at - 45), at + 46).map((values) => Math.log10(values[cell] ?? Number.NaN))
  const known = near.filter((value) => !Number.isNaN(value))
  return known.reduce((sum, value) => sum + value, 0) / known.length
}

/** Correlation of a series with itself some days later; missing days are left out. */
function lagged(series: number[], days: number): number {
  const pairs = series.slice(days).map((value, i): [number, number] => [series[i] ?? Number.NaN, value])
  const known = pairs.filter(([a, b]) => !Number.isNaN(a) && !Number.isNaN(b))
  const mean = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length
  const [meanA, meanB] = [mean(known.map(([a]) => a)), mean(known.map(([, b]) => b))]
  const covariance = mean(known.map(([a, b]) => (a - meanA) * (b - meanB)))
  const spread = mean(known.map(([a]) => (a - meanA) ** 2)) * mean(known.map(([, b]) => (b - meanB) ** 2))
  return covariance / Math.sqrt(spread)
}

describe('the demo regions', () => {
  it('lie mostly over water of the feed they watch, each with enough cells', () => {
    for (const { key, feed } of regions) {
      const grid = feed === 'chl' ? demoGrid : coarseGrid
      expect(cellsInside(key, grid).length, key).toBeGreaterThan(20)
      const allCells = cellsInside(key, grid, 'land too').length
      expect(cellsInside(key, grid).length / allCells, key).toBeGreaterThan(0.9)
    }
  })
})
