const minuteMs = 60_000
const hourMs = 60 * minuteMs

/** The next time a pull is due after `now`: every so many hours counted from midnight UTC of 1 January 1970, at a minute. */
export function nextDue({ everyHours, atMinute }: { everyHours: number; atMinute: number }, now: number): number {
  const period = everyHours * hourMs
  const offset = atMinute * minuteMs
  return (Math.floor((now - offset) / period) + 1) * period + offset
}

/** How long to wait after so many failures in a row: 5 minutes, doubled each time, 6 hours at most. */
export function backoffMs(failures: number): number {
  return Math.min(5 * minuteMs * 2 ** Math.min(Math.max(failures, 1) - 1, 20), 6 * hourMs)
}
