import { ensureBuilt } from '../../server/commands/ensure-built'

await ensureBuilt()
