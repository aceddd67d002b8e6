const minute = 60_000
const hour = 60 * minute
const firstWaits = [1, 2, 5, 15, 60].map((minutes) => minutes * minute)
const giveUpAfterMs = 48 * hour

/** How long to wait after the given number of failed attempts; null once 48 hours went by since the first. */
export function waitAfter(attempts: number): number | null {
  let waited = 0
  for (let at = 0; at < attempts - 1; at++) waited += waitAt(at)
  return waited >= giveUpAfterMs ? null : waitAt(attempts - 1)
}

const waitAt = (at: number): number => firstWaits[Math.min(at, firstWaits.length - 1)] ?? hour
