import type { GridSource } from '../grids/grid-source'
import { openGridSource } from '../grids/read/open'

const kept = new Map<string, Promise<GridSource>>()
/** Enough for a formula of several bands, each in a file of its own. */
const most = 8

/** Opens a stored file, or answers the one this thread has open. Stored files never change: their name is their checksum. */
export async function sourceOf(path: string, fileName: string): Promise<GridSource> {
  const known = kept.get(path)
  if (known) {
    kept.delete(path)
    kept.set(path, known)
    return known
  }
  const opening = openGridSource(path, fileName)
  kept.set(path, opening)
  opening.catch(() => kept.delete(path))
  for (const [oldest, source] of kept) {
    if (kept.size <= most) break
    kept.delete(oldest)
    void source.then((open) => open.close(), () => undefined)
  }
  return opening
}

/** Closes a file whose reading failed, so that nothing half-read is used again. */
export async function forgetSource(path: string): Promise<void> {
  const known = kept.get(path)
  kept.delete(path)
  await known?.then((source) => source.close(), () => undefined)
}
