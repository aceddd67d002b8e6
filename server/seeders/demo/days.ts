/** Days since 1970-01-01 of a calendar date written YYYY-MM-DD. */
export function epochDay(date: string): number {
  return Math.round(Date.parse(`${date}T00:00:00Z`) / msPerDay)
}

export function isoDay(day: number): string {
  return new Date(day * msPerDay).toISOString().slice(0, 10)
}

export function yearOf(day: number): number {
  return new Date(day * msPerDay).getUTCFullYear()
}

/** Days since 1 January of the same year, 0 to 365. */
export function dayInYear(day: number): number {
  return day - Math.round(Date.UTC(yearOf(day), 0, 1) / msPerDay)
}

/** First and last epoch day of a period given as two dates. */
export function daysBetween(first: string, last: string): number[] {
  const start = epochDay(first)
  return Array.from({ length: Math.max(0, epochDay(last) - start + 1) }, (_, i) => start + i)
}

export const msPerDay = 86_400_000
