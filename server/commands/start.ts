import { ensureBuilt } from './ensure-built'
import { runBuilt } from './run-built'

await ensureBuilt()
await runBuilt('production')
