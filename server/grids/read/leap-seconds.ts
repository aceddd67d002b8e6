/** Days at whose beginning a leap second had just been added; TAI was 10 s ahead of UTC from 1972 on. Source: IERS Bulletin C. */
const added = [
  [1972, 7], [1973, 1], [1974, 1], [1975, 1], [1976, 1], [1977, 1], [1978, 1], [1979, 1], [1980, 1], [1981, 7], [1982, 7],
  [1983, 7], [1985, 7], [1988, 1], [1990, 1], [1991, 1], [1992, 7], [1993, 7], [1994, 7], [1996, 1], [1997, 7], [1999, 1],
  [2006, 1], [2009, 1], [2012, 7], [2015, 7], [2017, 1],
].map(([year, month]) => Date.UTC(year!, month! - 1, 1))

/** UTC as whole seconds off TAI begins here; before it no count of leap seconds says what the difference was. */
const utcBegins = Date.UTC(1972, 0, 1)
const taiBegins = Date.UTC(1958, 0, 1)

/** Seconds by which TAI is ahead of UTC at an instant written as UTC; null before 1972. */
export function taiAheadOfUtc(utcMs: number): number | null {
  if (utcMs < utcBegins) return null
  return 10 + added.filter((start) => start <= utcMs).length
}

/** TAI (milliseconds since 1970 as that clock writes dates) as UTC; an added second is the last of its day. */
export function utcFromTai(taiMs: number): number | null {
  if (taiMs < taiBegins) return null
  for (let i = added.length - 1; i >= -1; i--) {
    const ahead = 1000 * (11 + i)
    const begins = i < 0 ? utcBegins : added[i]!
    if (taiMs - ahead >= begins) return taiMs - ahead
    // Within the added second: 23:59:60 has no place on a scale of days of 86,400 seconds.
    if (i >= 0 && taiMs - ahead >= begins - 1000) return begins - 1
  }
  return null
}
