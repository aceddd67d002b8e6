const longestMs = 7 * 86_400_000

/** When a Retry-After header lets us come again (RFC 9110: seconds or a date), at most a week ahead; null without one. */
export function retryAfter(header: string | undefined, now: number): number | null {
  if (header === undefined) return null
  const value = header.trim()
  const until = /^\d+$/.test(value) ? now + Number(value) * 1000 : Date.parse(value)
  return Number.isNaN(until) ? null : Math.min(Math.max(until, now), now + longestMs)
}
