import { spawnSync } from 'node:child_process'
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { windowOf } from '../../shared/science/cell-shares'
import type { RegionCellWeights } from '../../server/workers/tasks'

export interface ReferenceTask {
  files: string[]
  variable: string
  regions: { window: [number, number, number, number]; index: number[]; weight: number[]; water: number[] }[]
}

/** The regions as the reference takes them: each a window, and its cells within that. */
export function referenceRegions(weights: readonly RegionCellWeights[]): ReferenceTask['regions'] {
  return weights.map(({ index, columns, share, areaKm2, water }) => {
    const window = windowOf(index, columns)!
    return {
      window: [window.row, window.column, window.rows, window.columns],
      index: Array.from(index, (cell) => (Math.floor(cell / columns) - window.row) * window.columns + (cell % columns) - window.column),
      weight: Array.from(share, (part, i) => part * areaKm2[i]!),
      water: water.some((cell) => cell === 1) ? [...water] : Array.from(water, () => 1),
    }
  })
}

/** Seconds that Debian's numpy and netCDF4 take, without their imports. */
export function referenceSeconds(folder: string, task: ReferenceTask, mode: 'figures' | 'read' = 'figures'): number {
  const path = join(folder, 'reference-task.json')
  writeFileSync(path, JSON.stringify(task))
  const run = spawnSync('/usr/bin/python3', ['tests/bench/reference.py', path, ...(mode === 'read' ? ['read'] : [])], { encoding: 'utf8' })
  if (run.status !== 0) throw new Error(`The reference needs Debian's python3-numpy and python3-netcdf4: ${run.stderr}`)
  return (JSON.parse(run.stdout) as { seconds: number }).seconds
}
