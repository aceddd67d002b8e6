import { build, type Plugin } from 'esbuild'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))

const inPackages = (path: string) => fileURLToPath(new URL(`../../node_modules/${path}`, import.meta.url))

/** A JSON file inside a package: bundled, so that Node needs no import attributes. */
const landOutline: Plugin = {
  name: 'land-outline',
  setup: (bundle) => bundle.onResolve({ filter: /^world-atlas\/.*\.json$/ }, ({ path }) => ({ path: inPackages(path) })),
}

/** geotiff brings a thread pool that we don't use, and whose loading alone throws inside a worker thread: left out. */
const geotiffWithoutThreads: Plugin = {
  name: 'geotiff-without-threads',
  setup: (bundle) => {
    bundle.onResolve({ filter: /^geotiff$/ }, () => ({ path: inPackages('geotiff/dist-module/geotiff.js') }))
    bundle.onResolve({ filter: /^web-worker$/ }, () => ({ path: 'web-worker', namespace: 'left-out' }))
    bundle.onLoad({ filter: /.*/, namespace: 'left-out' }, () => ({ contents: 'export default null' }))
  },
}

/** Bundles the server, its commands and the worker into dist/server; other packages stay in node_modules. */
export async function buildServer(): Promise<void> {
  await build({
    absWorkingDir: root,
    entryPoints: { main: 'server/index.ts', worker: 'server/workers/worker.ts', offing: 'server/commands/offing.ts' },
    outdir: 'dist/server',
    bundle: true,
    packages: 'external',
    platform: 'node',
    target: 'node20',
    format: 'esm',
    sourcemap: true,
    logLevel: 'warning',
    plugins: [landOutline, geotiffWithoutThreads],
  })
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await buildServer()
