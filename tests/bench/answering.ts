import { spawn } from 'node:child_process'
import type { AddressInfo } from 'node:net'
import { join } from 'node:path'
import { monitorEventLoopDelay } from 'node:perf_hooks'
import { issueToken } from '../../server/accounts/tokens'
import { createApp } from '../../server/app'
import { percentile, report, type Measured } from './measured'
import { openOffing } from './offing'
import { shapes } from './shapes'

/** How long series and map calls take while a global field is read for 200 regions, against when nothing else runs. */
const fields = process.argv[2]!
const box = { west: -14, east: -2, south: 44, north: 56, least: 0.4, most: 0.9 }
const offing = await openOffing()
const server = createApp(offing.context).listen(0)
try {
  for (let year = 0; year < 10; year++) await offing.send(join(fields, `year-${year}.nc`))
  await offing.work()
  const [region] = await offing.draw(shapes(1, box, 5))
  await offing.draw(shapes(200, { west: -180, east: 180, south: -70, north: 70, least: 0.3, most: 2 }, 6))
  await offing.work()
  const person = await offing.context.models.users.findOne({ rejectOnEmpty: true })
  const { token } = await issueToken(offing.context, person.id, { name: 'bench', expiresInDays: null })
  const layers = await offing.context.models.layers.findAll({ attributes: ['id'], limit: 2000 })
  const address = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
  const calls = { address, token, series: `/api/regions/${region!.id}/series?feedId=${offing.feed.id}`, tiles: layers.map(({ id }) => `/api/layers/${id}/tiles/6/30/20.png`) }

  await load({ ...calls, tiles: calls.tiles.slice(0, 60) }, 3_000)
  const idle = await load({ ...calls, tiles: calls.tiles.slice(60, 900) }, 8_000)
  const delay = monitorEventLoopDelay({ resolution: 5 })
  delay.enable()
  await offing.send(join(fields, 'global.nc'))
  let reading = true
  const busyLoad = load({ ...calls, tiles: calls.tiles.slice(900) }, 8_000).finally(() => (reading = false))
  while (reading) {
    await offing.work()
    // The same field again, as if it had just come.
    await offing.context.db.write((tx) => offing.context.db.run(`DELETE FROM files WHERE name = 'global.nc'`, {}, tx))
    await offing.send(join(fields, 'global.nc'))
  }
  const busy = await busyLoad
  delay.disable()
  const p95 = (what: 'series' | 'tiles'): Measured[] => {
    const [quiet, loaded] = [percentile(idle[what], 0.95), percentile(busy[what], 0.95)]
    const name = what === 'series' ? 'series' : 'map tile'
    return [
      { what: `${name} call, p95 when nothing else runs`, value: quiet, unit: 'ms', most: null },
      { what: `${name} call, p95 while a global field is read, over that`, value: loaded / quiet, unit: '', most: 2 },
    ]
  }
  report([...p95('series'), ...p95('tiles'), { what: 'event-loop delay meanwhile, p99', value: delay.percentile(99) / 1e6, unit: 'ms', most: 30 }])
} finally {
  server.close()
  server.closeAllConnections()
  await offing.close()
}

/** Calls from another process, a few a second, as people's pages make them. */
function load(calls: object, forMs: number): Promise<{ series: number[]; tiles: number[] }> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, ['tests/bench/caller.mjs'], { stdio: ['pipe', 'pipe', 'inherit'] })
    let said = ''
    child.stdout.on('data', (piece: Buffer) => (said += piece.toString()))
    child.on('close', (code) => (code === 0 ? resolve(JSON.parse(said) as { series: number[]; tiles: number[] }) : reject(new Error('The caller failed.'))))
    child.stdin.end(JSON.stringify({ ...calls, forMs }))
  })
}
