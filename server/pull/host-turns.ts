/** One request at a time for each host, however many feeds ask it. */
export interface HostTurns {
  take<T>(host: string, ask: () => Promise<T>): Promise<T>
}

export function createHostTurns(): HostTurns {
  const last = new Map<string, Promise<unknown>>()
  return {
    take: (host, ask) => {
      const turn = (last.get(host) ?? Promise.resolve()).then(ask)
      const settled = turn.catch(() => undefined).then(() => {
        if (last.get(host) === settled) last.delete(host)
      })
      last.set(host, settled)
      return turn
    },
  }
}
