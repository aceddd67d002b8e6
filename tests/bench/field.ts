import { copyFileSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import type { LayerPlace, RegionCellWeights } from '../../server/workers/tasks'
import { startWorkers } from '../../server/workers/workers'
import { median, ratio, report, type Measured } from './measured'
import { referenceRegions, referenceSeconds } from './reference'
import { shapes } from './shapes'

/** One global field of 8640 x 4320 and 200 regions, decoded tiles written along the way. */
const fields = process.argv[2]!
const turns = 5
const box = { west: -180, east: 180, south: -70, north: 70, least: 0.3, most: 2 }
const folder = mkdtempSync(join(tmpdir(), 'offing-bench-field-'))
const workers = startWorkers(resolve('dist/server/worker.js'))
try {
  const original = join(fields, 'global.nc')
  const grid = (await workers.heavy('inspectFile', { path: original, fileName: 'global.nc' })).grids[0]!
  const weights: RegionCellWeights[] = []
  for (const { geometry } of shapes(200, box)) {
    weights.push({ rows: grid.rows, columns: grid.columns, ...(await workers.heavy('weighCells', { geometry, shoreBufferKm: 0, grid: grid.definition })) })
  }
  const usual = await byTurns('global.nc', weights)
  const small = await byTurns('global-small-chunks.nc', weights)
  const growth: Measured = { what: 'time for 200 regions over time for 1', value: median(usual.ours) / median(usual.one), unit: '', most: 12 }
  const memory: Measured = { what: 'memory of the process, at its highest', value: process.resourceUsage().maxRSS / 1024, unit: 'MB', most: 600 }
  report([
    ratio("a global field of 8640 x 4320 in the library's own chunks, 200 regions", usual.ours, usual.reference, 0.5),
    growth,
    memory,
    ratio('the same field in chunks of 216 x 216', small.ours, small.reference, null),
  ])
} finally {
  await workers.close()
  rmSync(folder, { recursive: true, force: true })
}

interface Turns {
  ours: number[]
  one: number[]
  reference: number[]
}

async function byTurns(name: string, weights: RegionCellWeights[]): Promise<Turns> {
  const took: Turns = { ours: [], one: [], reference: [] }
  for (let turn = -1; turn < turns; turn++) {
    const ours = await figures(name, `${turn}`, weights)
    const one = await figures(name, `${turn}-one`, weights.slice(0, 1))
    const reference = referenceSeconds(folder, { files: [join(fields, name)], variable: 'chlor_a', regions: referenceRegions(weights) })
    // The first turn warms up both sides.
    if (turn < 0) continue
    took.ours.push(ours)
    took.one.push(one)
    took.reference.push(reference)
  }
  return took
}

/** Seconds for a file nobody has opened yet. */
async function figures(name: string, turn: string, weights: RegionCellWeights[]): Promise<number> {
  const path = join(folder, `${turn}-${name}`)
  copyFileSync(join(fields, name), path)
  const { rows, columns } = weights[0]!
  const layer: LayerPlace = {
    path, fileName: 'global.nc', variable: 'chlor_a', step: 0, processingVersion: '1', observedAt: 0, endsAt: null, producedAt: null, rows, columns,
    pack: join(folder, 'decoded', `${turn}-${name}`), reading: { hiddenFlags: [], storedLog10: false, fileUnit: null, unit: 'mg m-3' },
  }
  const started = performance.now()
  await workers.heavy('summariseViews', { layers: [layer], weights, views: weights.map((_, i) => ({ layers: [0], weights: i })), scale: 'log10', validMin: null, validMax: null })
  const seconds = (performance.now() - started) / 1000
  rmSync(path)
  return seconds
}
