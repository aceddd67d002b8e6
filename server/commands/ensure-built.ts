import { existsSync } from 'node:fs'
import { readdir, readFile, stat, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))
const stampFile = join(root, 'dist', 'built-from')
const sources = ['src', 'server', 'shared', 'index.html', 'package-lock.json', 'vite.config.ts', 'tailwind.config.ts']

/** Builds client, server and workers unless dist was made from just these sources. */
export async function ensureBuilt(): Promise<void> {
  const stamp = await stampOf()
  if (existsSync(stampFile) && (await readFile(stampFile, 'utf8')) === stamp) return
  console.error('Building client, server and workers ...')
  await buildAll(stamp)
}

/** Builds everything and notes what it was made from. */
export async function buildAll(stamp?: string): Promise<void> {
  const { build } = await import('vite')
  const { buildServer } = await import('./build')
  await Promise.all([build({ root, logLevel: 'warn' }), buildServer()])
  await writeFile(stampFile, stamp ?? (await stampOf()))
}

/** Names, sizes and times of all sources. */
async function stampOf(): Promise<string> {
  const lines: string[] = []
  for (const source of sources) {
    const path = join(root, source)
    if (!existsSync(path)) continue
    const inside = (await stat(path)).isDirectory() ? await readdir(path, { recursive: true }) : ['']
    for (const name of inside.sort()) {
      const found = await stat(join(path, name))
      if (found.isFile()) lines.push(`${source}/${name} ${found.size} ${Math.round(found.mtimeMs)}`)
    }
  }
  return lines.join('\n')
}
