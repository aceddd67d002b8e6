import { buildAll } from './ensure-built'

await buildAll()
