import { mkdtemp, rm } from 'node:fs/promises'
import { createServer, type AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import { aStation, filesByName, outcome, secret, twentyFiles, unfinished, type Sent, type Station } from '../support/journey-crash'
import { freePort, startOffing } from '../support/offing-process'

const settled = { timeout: 60_000, interval: 200 }
const allDone = (station: Station) => vi.waitFor(async () => expect(await unfinished(station.api)).toEqual([]), settled)
const sendAll = ({ api }: Station, files: readonly Sent[]) => Promise.all(files.map(({ name, bytes }) => api.send(name, bytes)))

describe('twenty files at once and the plug pulled twice in the middle', () => {
  const today = new Date().toISOString().slice(0, 10)
  let files: Sent[]
  let undisturbed: Awaited<ReturnType<typeof outcome>>
  let station: Station
  const stations: Station[] = []
  const opened = async () => {
    const one = await aStation()
    stations.push(one)
    return one
  }

  beforeAll(async () => {
    files = await twentyFiles(today)
    expect(files).toHaveLength(20)
    const calm = await opened()
    await sendAll(calm, files)
    await allDone(calm)
    undisturbed = await outcome(calm)
    expect(await calm.offing().stop()).toBe(0)
    station = await opened()
  })

  afterAll(async () => {
    for (const one of stations) {
      await one.offing().stop()
      await one.remove()
    }
  })

  it('the undisturbed run reads every layer and raises one alert a region', () => {
    const layers = files.reduce((sum, file) => sum + (file.layers ?? 0), 0)
    expect(undisturbed.layerTimes).toHaveLength(layers)
    for (const columns of undisturbed.series) expect(columns.day).toHaveLength(layers)
    expect(undisturbed.alerts.map(({ regionName, state }) => [regionName, state])).toEqual([['North Patch', 'open'], ['South Patch', 'open']])
    expect(undisturbed.letters).toHaveLength(2)
  })

  it('are all taken, and left half done by each kill', async () => {
    const receipts = await sendAll(station, files)
    expect(new Set(receipts.map(({ id }) => id)).size).toBe(20)
    for (const enough of [2, 6]) {
      const left = await vi.waitFor(
        async () => {
          const items = [...(await filesByName(station.api)).values()]
          const dealtWith = items.filter(({ status }) => status === 'processed' || status === 'refused').length
          expect(dealtWith).toBeGreaterThanOrEqual(enough)
          return items.length - dealtWith
        },
        { timeout: 60_000, interval: 10 },
      )
      expect(left).toBeGreaterThan(0)
      await station.offing().kill()
      await station.restart()
    }
    expect((await unfinished(station.api)).length).toBeGreaterThan(0)
  })

  it('afterwards every good file was read once, every wrong one refused with its sentence, and nothing waits', async () => {
    await allDone(station)
    const found = await filesByName(station.api)
    expect([...found.keys()].sort()).toEqual(files.map(({ name }) => name).sort())
    for (const { name, layers } of files) expect([name, found.get(name)?.status]).toEqual([name, layers === null ? 'refused' : 'processed'])
    const sentence = (name: string) => found.get(name)?.refusal?.message
    expect(sentence('survey-text.nc')).toMatch(/^This is not a NetCDF or GeoTIFF file: it begins with/)
    expect(sentence('survey-empty.nc')).toBe('This file is empty.')
    const notWhole = /^This file is not whole: .*\d+.*\d+/
    expect(sentence('survey-cut-netcdf4.nc')).toMatch(notWhole)
    expect(sentence('survey-cut-classic.nc')).toMatch(notWhole)
  })

  it('the figures, events, alerts and letters are those of the undisturbed run, none lost and none doubled', async () => {
    expect(await outcome(station)).toEqual(undisturbed)
  })

  it('sending all of it again changes nothing', async () => {
    const before = await filesByName(station.api)
    const receipts = await sendAll(station, files)
    expect(receipts.map(({ id, name }) => [name, id])).toEqual(files.map(({ name }) => [name, before.get(name)?.id]))
    await allDone(station)
    expect(await outcome(station)).toEqual(undisturbed)
  })

  it('a second process on the same folder is refused with a sentence, and the first goes on', async () => {
    const second = startOffing('production', { DATA_DIR: station.dataDir, PORT: String(await freePort()), SESSION_SECRET: secret })
    expect(await second.ended).toEqual({ code: 1, signal: null })
    expect(second.printed().trim()).toBe(`Another Offing already serves ${station.dataDir}. Stop it, or set DATA_DIR to another folder.`)
    expect(await unfinished(station.api)).toEqual([])
  })
})

describe('a start that cannot be', () => {
  let dataDir: string
  beforeAll(async () => {
    dataDir = await mkdtemp(join(tmpdir(), 'offing-start-'))
  })
  afterAll(() => rm(dataDir, { recursive: true, force: true }))

  const refusalOf = async (env: Record<string, string>) => {
    const offing = startOffing('production', { DATA_DIR: dataDir, ...env })
    const { code } = await offing.ended
    return { code, sentence: offing.printed().trim() }
  }

  it('on a taken port ends with 1 and says which and what to set', async () => {
    const holder = createServer()
    await new Promise<void>((resolve) => holder.listen(0, '127.0.0.1', resolve))
    const { port } = holder.address() as AddressInfo
    const refused = await refusalOf({ PORT: String(port), SESSION_SECRET: secret, LOG_LEVEL: 'silent' })
    await new Promise((resolve) => holder.close(resolve))
    expect(refused).toEqual({ code: 1, sentence: `Port ${port} is taken. Set PORT to another one.` })
  })

  it('without a session secret, or with a weak one, ends with 1 and says what to set', async () => {
    const advice = 'Set it to at least 32 random characters, for example the output of: openssl rand -hex 32'
    const port = String(await freePort())
    expect(await refusalOf({ PORT: port })).toEqual({ code: 1, sentence: `SESSION_SECRET is not set. ${advice}` })
    for (const weak of ['short', 'a'.repeat(64)]) {
      expect(await refusalOf({ PORT: port, SESSION_SECRET: weak })).toEqual({ code: 1, sentence: `SESSION_SECRET is too weak. ${advice}` })
    }
  })
})
