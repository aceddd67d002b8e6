import { randomUUID } from 'node:crypto'
import { build } from 'esbuild'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../../..', import.meta.url))

/**
 * Bundles the readers as the server does, so that they can run where a hang can be ended and memory be measured. The
 * caller removes the file; its name is its own, since test files run side by side.
 */
export async function bundleReader(): Promise<string> {
  const outfile = `${root}/dist/test/reader-${randomUUID()}.js`
  await build({
    absWorkingDir: root, entryPoints: ['tests/server/grids/reader-process.ts'], outfile, bundle: true, packages: 'external',
    platform: 'node', target: 'node20', format: 'esm', logLevel: 'warning',
  })
  return outfile
}
