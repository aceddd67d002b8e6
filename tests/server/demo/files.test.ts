import { mkdtemp, readdir, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { gridFingerprint } from '../../../server/grids/grid-text'
import { openGridSource } from '../../../server/grids/read/open'
import { dateInName, fitsPattern } from '../../../server/pipeline/file-name-pattern'
import { epochDay } from '../../../server/seeders/demo/days'
import { chlorophyllOn, hasLayer, reflectanceOn } from '../../../server/seeders/demo/fields'
import { filesOf, historyFiles, writeDemoFile, type DemoFile } from '../../../server/seeders/demo/files'
import { feeds, scenarioDays } from '../../../server/seeders/demo/scenario'

const whole = { row: 0, column: 0, rows: 80, columns: 100 }

describe('the delivery of the demo', () => {
  let directory = ''
  beforeAll(async () => {
    directory = await mkdtemp(join(tmpdir(), 'offing-demo-'))
  })
  afterAll(() => rm(directory, { recursive: true }))

  const written = async (file: DemoFile) => openGridSource(await writeDemoFile(file, directory), file.name)

  it('brings every layer of the history once, under a name of its own that its feeds know', () => {
    const files = historyFiles()
    expect(new Set(files.map(({ name }) => name)).size).toBe(files.length)
    for (const content of ['chl', 'chlSecond', 'chlLong', 'rrs'] as const) {
      const days = files.filter((file) => file.content === content).flatMap((file) => file.days)
      const expected: number[] = []
      for (let day = scenarioDays.first; day < scenarioDays.today; day++) if (hasLayer(content, day)) expected.push(day)
      expect(days).toEqual(expected)
    }
    for (const file of [...files, ...filesOf(scenarioDays.today)]) {
      const knowing = feeds.filter(({ fileNamePattern }) => fitsPattern(fileNamePattern, file.name)).map(({ key }) => key)
      expect(knowing, file.name).toEqual(file.feeds)
    }
    expect(new Set(files.map(({ format }) => format))).toEqual(new Set(['netcdf4', 'netcdf-classic', 'geotiff']))
  })

  it('brings three files a day after the history, none within it', () => {
    expect(filesOf(scenarioDays.today - 1)).toEqual([])
    expect(filesOf(scenarioDays.today).map(({ name }) => name)).toEqual([
      'demo-chl-20260611.nc', 'demo-long-20260611.nc', 'demo-rrs-20260611.nc',
    ])
  })

  it("writes today's layer as it was made, but for the packing, with unit, time and version", async () => {
    const [today] = filesOf(scenarioDays.today)
    const source = await written(today!)
    const made = chlorophyllOn('chl', scenarioDays.today)
    const variable = source.variables.find(({ name }) => name === 'chlor_a')
    expect(variable).toMatchObject({ quantity: 'chlorophyll', unit: 'mg m-3' })
    expect(variable?.times.map(({ observedAt }) => observedAt)).toEqual([Date.parse('2026-06-11T12:40:00Z')])
    expect(source.globalAttributes).toMatchObject({ processing_version: 'R2022.0' })
    expect(String(source.globalAttributes['title'])).toContain('DEMO synthetic data')
    const read = await source.readWindow('chlor_a', 0, whole)
    source.close()
    read.forEach((value, i) => {
      const original = made?.values[i] ?? Number.NaN
      if (Number.isNaN(original)) expect(value).toBeNaN()
      else expect(Math.abs(value - original)).toBeLessThanOrEqual(0.001 + 1e-9)
    })
    expect((await readdir(directory)).filter((name) => name.endsWith('.part'))).toEqual([])
  })

  it('writes a picture without a time, on the very grid of the other files', async () => {
    const picture = historyFiles().find(({ name }) => name === 'demo-chl-20260605.tif')
    const day = epochDay('2026-06-05')
    const source = await written(picture!)
    const other = await written(filesOf(scenarioDays.today)[0]!)
    const [variable] = source.variables
    expect(variable?.times.map(({ observedAt }) => observedAt)).toEqual([null])
    expect(dateInName('demo-chl-{yyyy}{MM}{dd}*', picture!.name)?.instant).toBe(day * 86_400_000)
    expect(gridFingerprint(variable!.grid)).toBe(gridFingerprint(other.variables[0]!.grid))
    const read = await source.readWindow(variable!.name, 0, whole)
    expect(Float32Array.from(read)).toEqual(Float32Array.from(chlorophyllOn('chl', day)!.values))
    source.close()
    other.close()
  })

  it('writes a month of classic NetCDF and five bands of reflectance', async () => {
    const may = historyFiles().find(({ name }) => name === 'demo-chl-20260501-20260531.nc')
    const source = await written(may!)
    expect(source.format).toBe('netcdf-classic')
    expect(source.variables[0]?.times.length).toBe(31)
    const read = await source.readWindow('chlor_a', 9, whole)
    expect(Float32Array.from(read)).toEqual(Float32Array.from(chlorophyllOn('chl', epochDay('2026-05-10'))!.values))
    source.close()
    const bands = await written(filesOf(scenarioDays.today)[2]!)
    expect(bands.variables.map(({ wavelengthNm, quantity }) => [wavelengthNm, quantity])).toEqual(
      [443, 490, 510, 555, 670].map((band) => [band, 'reflectance']),
    )
    const green = await bands.readWindow('Rrs_555', 0, whole)
    const made = reflectanceOn(scenarioDays.today)!.values[555]
    green.forEach((value, i) => {
      if (Number.isNaN(made[i])) expect(value).toBeNaN()
      else expect(Math.abs(value - made[i]!)).toBeLessThanOrEqual(1e-6 + 1e-12)
    })
    bands.close()
  })
})
