/** Days are counted from 1970-01-01 (day 0) in the proleptic Gregorian calendar. */
export type EpochDay = number

const dayMs = 86_400_000
const hourMs = 3_600_000

/**
 * The local solar day of an instant (milliseconds since 1970, UTC) at a longitude: the sun's clock runs four minutes
 * ahead for each degree east. Longitudes are taken into -180..180 first, so 190 and -170 share their days.
 */
export function localSolarDay(instantMs: number, lonDeg: number): EpochDay {
  const lon = lonDeg - 360 * Math.floor((lonDeg + 180) / 360)
  return Math.floor((instantMs + (lon / 15) * hourMs) / dayMs)
}

/** '2024-02-29' as an epoch day. What is no date of the calendar is a RangeError. */
export function epochDayOf(date: string): EpochDay {
  const ms = /^\d{4}-\d\d-\d\d$/.test(date) ? Date.parse(`${date}T00:00:00Z`) : NaN
  const day = ms / dayMs
  if (Number.isNaN(day) || dateOf(day) !== date) throw new RangeError(`"${date}" is not a date like 2024-02-29.`)
  return day
}

/** An epoch day as '2024-02-29'. */
export function dateOf(day: EpochDay): string {
  return new Date(day * dayMs).toISOString().slice(0, 10)
}

export function yearOf(day: EpochDay): number {
  return new Date(day * dayMs).getUTCFullYear()
}

export function firstDayOf(year: number): EpochDay {
  return new Date(0).setUTCFullYear(year, 0, 1) / dayMs
}

export function isLeapYear(year: number): boolean {
  return year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0)
}

/** Slot of the date in a leap year, 1..366: 29 February is 60 and 1 March 61 in every year. */
export function dayOfYear366(day: EpochDay): number {
  const year = yearOf(day)
  const place = day - firstDayOf(year) + 1
  return place >= 60 && !isLeapYear(year) ? place + 1 : place
}
