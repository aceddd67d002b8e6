import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import { buildServer } from '../../server/commands/build'
import { historyFiles } from '../../server/seeders/demo/files'
import { regions } from '../../server/seeders/demo/scenario'
import type { RegionCellWeights } from '../../server/workers/tasks'
import { startWorkers } from '../../server/workers/workers'

/**
 * Figures of ten regions for a year of daily layers, read from a NetCDF-4 file: Offing's worker against numpy and
 * netCDF4 doing the same in the same run. The ratio is the result; seconds depend on the machine.
 */
await buildServer()
const folder = mkdtempSync(join(tmpdir(), 'offing-bench-'))
const workers = startWorkers(resolve('dist/server/worker.js'))
try {
  const file = historyFiles().find((one) => one.name.startsWith('demo-chl-2022'))!
  const path = await workers.heavy('writeDemoFile', { file, directory: folder })
  const seen = await workers.heavy('inspectFile', { path, fileName: file.name })
  const grid = seen.grids[0]!
  const weights: RegionCellWeights[] = []
  for (const region of regions) weights.push({ columns: grid.columns, ...(await workers.heavy('weighCells', { geometry: region.geometry, grid: grid.definition })) })
  const reading = { hiddenFlags: [], storedLog10: false, fileUnit: null, unit: 'mg m-3' }
  const layers = file.days.map((_, step) => ({ path, fileName: file.name, variable: 'chlor_a', step, processingVersion: '1', observedAt: step, endsAt: null, producedAt: null, reading }))
  const views = layers.flatMap((_, layer) => weights.map((_, region) => ({ layers: [layer], weights: region })))
  const input = { layers, weights, views, scale: 'log10' as const, validMin: null, validMax: null }
  await workers.heavy('summariseViews', { ...input, layers: layers.slice(0, 20), views: views.filter((view) => view.layers[0]! < 20) })
  const ours = await best(3, async () => {
    const started = performance.now()
    await workers.heavy('summariseViews', input)
    return (performance.now() - started) / 1000
  })
  writeFileSync(join(folder, 'regions.json'), JSON.stringify(weights.map((w) => ({ index: [...w.index], weight: [...w.share].map((share, i) => share * w.areaKm2[i]!) }))))
  const theirs = await best(3, async () => {
    const run = spawnSync('/usr/bin/python3', ['tests/bench/reference.py', path, join(folder, 'regions.json')], { encoding: 'utf8' })
    if (run.status !== 0) throw new Error(`The reference needs Debian's python3-numpy and python3-netcdf4: ${run.stderr}`)
    return (JSON.parse(run.stdout) as { seconds: number }).seconds
  })
  console.log(`views: ${views.length} (365 layers, ${weights.length} regions)`)
  console.log(`Offing ${ours.toFixed(2)} s, numpy and netCDF4 ${theirs.toFixed(2)} s: ${(theirs / ours).toFixed(2)} times as fast`)
} finally {
  await workers.close()
  rmSync(folder, { recursive: true, force: true })
}

async function best(times: number, run: () => Promise<number>): Promise<number> {
  let least = Infinity
  for (let i = 0; i < times; i++) least = Math.min(least, await run())
  return least
}
