import { parseInstant } from './read/coverage-time'

/** Names under which producers say when a file was made or last changed; the first two are ACDD's. */
const names = ['date_created', 'date_modified', 'creation_date', 'creation_time', 'processing_time', 'date_processed', 'product_creation_time']
const dayMs = 86_400_000

/**
 * When a file says it was made: the latest of its dates, as a correction may keep the first of them. Epoch milliseconds,
 * UTC where no offset is given; null where it says nothing that can be read.
 */
export function producedAt(attributes: Record<string, unknown>): number | null {
  const found = new Map(Object.entries(attributes).map(([name, value]) => [name.toLowerCase(), value]))
  const instants = names.flatMap((name) => instantOf(found.get(name), name === 'creation_time' ? found.get('creation_date') : undefined) ?? [])
  return instants.length === 0 ? null : Math.max(...instants)
}

function instantOf(value: unknown, day: unknown): number | null {
  if (value === undefined) return null
  const text = String(value).trim()
  // A clock time whose day stands in an attribute of its own.
  if (day !== undefined && /^\d{1,2}:\d{2}/.test(text)) return parseInstant(`${String(day).replace(/\s*(utc|z)$/i, '')} ${text}`)?.ms ?? null
  return parseInstant(text)?.ms ?? tiffInstant(text) ?? ordinalInstant(text)
}

/** TIFF's own form, 2024:05:01 10:40:00. */
function tiffInstant(text: string): number | null {
  const match = /^(\d{4}):(\d{2}):(\d{2}) (\d{2}:\d{2}:\d{2})$/.exec(text)
  return match ? (parseInstant(`${match[1]}-${match[2]}-${match[3]} ${match[4]}`)?.ms ?? null) : null
}

/** Year, day of the year and clock run together, 2024122104000 with milliseconds: an older habit of ocean colour files. */
function ordinalInstant(text: string): number | null {
  const match = /^(\d{4})(\d{3})(\d{2})(\d{2})(\d{2})(\d{3})$/.exec(text)
  if (!match) return null
  const [year, day, hour, minute, second, ms] = match.slice(1).map(Number) as [number, number, number, number, number, number]
  if (day < 1 || day > 366 || hour > 23 || minute > 59 || second > 60) return null
  return Date.UTC(year, 0, 1) + (day - 1) * dayMs + hour * 3_600_000 + minute * 60_000 + second * 1000 + ms
}
