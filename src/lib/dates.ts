const months = ['January', 'February', 'March', 'April', 'May', 'June', 'July', 'August', 'September', 'October', 'November', 'December']
const weekdays = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat']

/** A calendar day (YYYY-MM-DD) has no zone: it is taken apart, never moved. */
function parts(day: string) {
  const [year = 1970, month = 1, date = 1] = day.slice(0, 10).split('-').map(Number)
  return { year, month, date, weekday: new Date(Date.UTC(year, month - 1, date)).getUTCDay() }
}

/** "10 June" */
export function dayWords(day: string): string {
  const { month, date } = parts(day)
  return `${date} ${months[month - 1]}`
}

/** "10 Jun 2026" */
export function dayWithYear(day: string): string {
  const { year, month, date } = parts(day)
  return `${date} ${shortMonth(month)} ${year}`
}

/** "10 Jun" */
export function shortDay(day: string): string {
  const { month, date } = parts(day)
  return `${date} ${shortMonth(month)}`
}

/** "Wed 10 June" */
export function longDay(day: string): string {
  return `${weekdays[parts(day).weekday]} ${dayWords(day)}`
}

/** "1 to 21 June", "30 May to 10 June 2026" only as far as needed. */
export function daySpan(from: string, to: string): string {
  const a = parts(from)
  const b = parts(to)
  if (from.slice(0, 10) === to.slice(0, 10)) return dayWords(from)
  if (a.year === b.year && a.month === b.month) return `${a.date} to ${dayWords(to)}`
  return a.year === b.year ? `${dayWords(from)} to ${dayWords(to)}` : `${dayWithYear(from)} to ${dayWithYear(to)}`
}

export function addDays(day: string, count: number): string {
  const { year, month, date } = parts(day)
  return new Date(Date.UTC(year, month - 1, date + count)).toISOString().slice(0, 10)
}

export function daysBetween(from: string, to: string): number {
  return Math.round((Date.parse(`${to.slice(0, 10)}T00:00Z`) - Date.parse(`${from.slice(0, 10)}T00:00Z`)) / 86_400_000)
}

export function dayOfYear(day: string): number {
  return daysBetween(`${day.slice(0, 4)}-01-01`, day) + 1
}

/** "04:12" in a zone. */
export function clockTime(instant: string | number | Date, timeZone: string): string {
  return formatter({ timeZone, hour: '2-digit', minute: '2-digit', hourCycle: 'h23' }).format(new Date(instant))
}

/** "11 Jun 04:12" in a zone. */
export function dayAndTime(instant: string | number | Date, timeZone: string): string {
  return `${shortDay(localDay(instant, timeZone))} ${clockTime(instant, timeZone)}`
}

/** The calendar day of an instant in a zone, YYYY-MM-DD. */
export function localDay(instant: string | number | Date, timeZone: string): string {
  return formatter({ timeZone, year: 'numeric', month: '2-digit', day: '2-digit' }, 'en-CA').format(new Date(instant))
}

/** "Thu 11 Jun" in a zone. */
export function weekdayAndDay(instant: string | number | Date, timeZone: string): string {
  const day = localDay(instant, timeZone)
  return `${weekdays[parts(day).weekday]} ${shortDay(day)}`
}

/** "IST", or "GMT+2" where the zone has no short name. */
export function zoneWord(instant: string | number | Date, timeZone: string): string {
  const found = formatter({ timeZone, timeZoneName: 'short' }, 'en-IE').formatToParts(new Date(instant))
  return found.find((part) => part.type === 'timeZoneName')?.value ?? timeZone
}

function shortMonth(month: number): string {
  return (months[month - 1] ?? '').slice(0, 3)
}

const kept = new Map<string, Intl.DateTimeFormat>()

/** Making a formatter is slow; a page asks for the same few thousands of times. */
function formatter(options: Intl.DateTimeFormatOptions, locale = 'en-GB'): Intl.DateTimeFormat {
  const key = locale + JSON.stringify(options)
  const found = kept.get(key) ?? new Intl.DateTimeFormat(locale, options)
  kept.set(key, found)
  return found
}
