/** Packs being written while reading goes on: a few at a time, so that memory stays bounded. */
export interface PendingPacks {
  add(kept: Promise<void> | undefined): Promise<void>
  /** Done when all are written; throws what went wrong with any. */
  all(): Promise<void>
}

const most = 8

export function pendingPacks(): PendingPacks {
  const waiting: Promise<void>[] = []
  return {
    add: async (kept) => {
      if (!kept) return
      waiting.push(kept)
      if (waiting.length > most) await waiting.shift()
    },
    all: async () => {
      await Promise.all(waiting.splice(0))
    },
  }
}
