import { build, type Plugin } from 'esbuild'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))

const inPackages = (path: string) => fileURLToPath(new URL(`../../node_modules/${path}`, import.meta.url))

/** A JSON file inside a package: bundled, so that Node needs no import attributes. */
const landOutline: Plugin = {
  name: 'land-outline',
  setup: (bundle) => bundle.onResolve({ filter: /^world-atlas\/.*\.json$/ }, ({ path }) => ({ path: inPackages(path) })),
}

/** Bundles the server, its commands and the worker into dist/server; other packages stay in node_modules. */
export async function buildServer(): Promise<void> {
  await bundle({ main: 'server/index.ts', worker: 'server/workers/worker.ts', offing: 'server/commands/offing.ts' }, 'dist/server')
}

export async function bundle(entryPoints: Record<string, string>, outdir: string): Promise<void> {
  await build({
    absWorkingDir: root,
    entryPoints,
    outdir,
    bundle: true,
    packages: 'external',
    platform: 'node',
    target: 'node20',
    format: 'esm',
    sourcemap: true,
    logLevel: 'warning',
    plugins: [landOutline],
  })
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await buildServer()
