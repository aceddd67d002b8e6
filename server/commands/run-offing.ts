import { spawnSync } from 'node:child_process'
import { ensureBuilt } from './ensure-built'

/** Commands run from the bundle in a plain Node process: reading files through the development loader is far slower. */
await ensureBuilt()
const { status } = spawnSync(process.execPath, ['dist/server/offing.js', ...process.argv.slice(2)], { stdio: 'inherit' })
process.exitCode = status ?? 1
