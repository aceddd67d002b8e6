import { isMainThread, parentPort } from 'node:worker_threads'
import { LayerRefused } from '../../../server/grids/layer-refused'
import { openGridSource } from '../../../server/grids/read/open'

/** What came of one file: every value of every variable, a refusal, or a fault of the reader. */
export type Outcome = { values: Float64Array[] } | { refused: string } | { fault: string }

const mostSteps = 3

async function readAll(path: string): Promise<Float64Array[]> {
  const source = await openGridSource(path, 'sent')
  try {
    const values: Float64Array[] = []
    for (const { name, grid, times } of source.variables) {
      for (let step = 0; step < Math.min(times.length, mostSteps); step++) {
        const rows = Math.min(grid.rows, Math.max(1, Math.floor(2e6 / grid.columns)))
        values.push(await source.readWindow(name, step, { row: 0, column: 0, rows, columns: Math.min(grid.columns, 2e6) }))
      }
    }
    return values
  } finally {
    source.close()
  }
}

async function outcomeOf(path: string): Promise<Outcome> {
  try {
    return { values: await readAll(path) }
  } catch (error) {
    if (error instanceof LayerRefused) return { refused: error.code }
    return { fault: error instanceof Error ? (error.stack ?? error.message) : String(error) }
  }
}

async function readField(path: string): Promise<void> {
  const source = await openGridSource(path, 'large')
  const { name, grid } = source.variables[0]!
  const values = await source.readWindow(name, 0, { row: 0, column: 0, rows: grid.rows, columns: grid.columns })
  const last = values[values.length - 1]
  source.close()
  console.log(JSON.stringify({ cells: values.length, last, peakMb: process.resourceUsage().maxRSS / 1024 }))
}

if (isMainThread) await readField(process.argv[2]!)
else parentPort!.on('message', (path: string) => void outcomeOf(path).then((outcome) => parentPort!.postMessage(outcome)))
