import { spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { parseArgs } from 'node:util'
import { buildServer, bundle } from '../../server/commands/build'
import type { Measured } from './measured'

/**
 * What Offing takes of the time that Debian's numpy and netCDF4 take for the same work, in the same run, taking turns.
 * Ratios are the result: seconds depend on the machine and on what else it does. `--only field,history` runs some parts.
 */
const parts = ['field', 'history', 'answering', 'storage'] as const
const { values } = parseArgs({ options: { only: { type: 'string' }, fields: { type: 'string' }, json: { type: 'string', default: 'data/var/bench.json' } } })
const wanted = values.only === undefined ? parts : parts.filter((part) => values.only!.split(',').includes(part))

await buildServer()
await bundle(Object.fromEntries(parts.map((part) => [part, `tests/bench/${part}.ts`])), 'dist/bench')
const folder = values.fields ?? mkdtempSync(join(tmpdir(), 'offing-bench-fields-'))
try {
  if (!existsSync(join(folder, 'global.nc'))) makeFields(folder)
  const results = wanted.flatMap((part) => measure(part, folder))
  table(results)
  mkdirSync(join(values.json, '..'), { recursive: true })
  writeFileSync(values.json, `${JSON.stringify({ results }, null, 2)}\n`)
} finally {
  if (!values.fields) rmSync(folder, { recursive: true, force: true })
}

function makeFields(into: string): void {
  const made = spawnSync('/usr/bin/python3', ['tests/bench/make-fields.py', into], { stdio: ['ignore', 'inherit', 'inherit'] })
  if (made.status !== 0) throw new Error("The fields need Debian's python3-numpy and python3-netcdf4.")
}

/** Each part runs in a process of its own, whose memory is nobody else's. */
function measure(part: (typeof parts)[number], fields: string): Measured[] {
  const run = spawnSync(process.execPath, [`dist/bench/${part}.js`, fields], { encoding: 'utf8', stdio: ['ignore', 'pipe', 'inherit'], maxBuffer: 1e8 })
  if (run.status !== 0) throw new Error(`The part "${part}" failed.\n${run.stdout}`)
  return JSON.parse(run.stdout.trim().split('\n').at(-1)!) as Measured[]
}

function table(results: readonly Measured[]): void {
  const rows = results.map(({ what, value, unit, most, ours, reference }) => [
    what,
    `${format(value)}${unit ? ` ${unit}` : ''}`,
    most === null ? '' : `at most ${most}${unit ? ` ${unit}` : ''}`,
    ours === undefined ? '' : `${format(ours)} s`,
    reference === undefined ? '' : `${format(reference)} s`,
  ])
  const head = ['what', 'measured', 'aim', 'Offing', 'reference']
  const widths = head.map((title, i) => Math.max(title.length, ...rows.map((row) => row[i]!.length)))
  for (const row of [head, widths.map((width) => '-'.repeat(width)), ...rows]) console.log(`| ${row.map((cell, i) => cell.padEnd(widths[i]!)).join(' | ')} |`)
}

function format(value: number): string {
  return value >= 100 ? value.toFixed(0) : value.toPrecision(3)
}
