import type { ViewKey } from './summarise-views'

/** The views of one region, newest day first, and how many of them have been taken. */
export interface Share {
  keys: readonly ViewKey[]
  next: number
}

/**
 * The next views of several regions, whole days at a time, newest first, until `most` days of feeds are met: a layer that
 * several regions need is in one batch for all of them. A region that is behind catches up first.
 */
export function nextViews<T extends Share>(shares: readonly T[], most: number): Map<T, ViewKey[]> {
  const views = new Map<T, ViewKey[]>()
  const next = new Map(shares.map((share) => [share, share.next]))
  const days = new Set<string>()
  while (days.size < most) {
    const day = Math.max(...shares.map((share) => share.keys[next.get(share)!]?.day ?? -Infinity))
    if (day === -Infinity) break
    for (const share of shares) {
      let at = next.get(share)!
      for (; share.keys[at]?.day === day; at++) {
        const key = share.keys[at]!
        days.add(`${key.feedId}:${key.day}`)
        const taken = views.get(share) ?? []
        taken.push(key)
        views.set(share, taken)
      }
      next.set(share, at)
    }
  }
  return views
}
