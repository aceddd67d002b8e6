import { build } from 'esbuild'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))

/** Bundles the server, its commands and the worker into dist/server; packages stay in node_modules. */
export async function buildServer(): Promise<void> {
  await build({
    absWorkingDir: root,
    entryPoints: { main: 'server/index.ts', worker: 'server/workers/worker.ts' },
    outdir: 'dist/server',
    bundle: true,
    packages: 'external',
    platform: 'node',
    target: 'node20',
    format: 'esm',
    sourcemap: true,
    logLevel: 'warning',
    // The land outline is a JSON file inside a package: bundled, so that Node needs no import attributes.
    plugins: [{ name: 'bundled-json', setup: (b) => b.onResolve({ filter: /^world-atlas\/.*\.json$/ }, async ({ path }) => ({ path: fileURLToPath(new URL(`../../node_modules/${path}`, import.meta.url)) })) }],
  })
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await buildServer()
