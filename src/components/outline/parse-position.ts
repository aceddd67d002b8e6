export interface Position {
  latitude: number
  longitude: number
}

const part = /([NSEW])?\s*([+-]?\d+(?:\.\d+)?)[°\s]*(?:(\d+(?:\.\d+)?)['′\s]*)?(?:(\d+(?:\.\d+)?)["″\s]*)?([NSEW])?/i

/**
 * One position, latitude first: decimal degrees, or degrees with minutes (and seconds), with letters or signs.
 * Undefined when it cannot be read or lies off the globe.
 */
export function parsePosition(text: string): Position | undefined {
  const halves = split(text.trim())
  if (!halves) return undefined
  const first = angle(halves[0])
  const second = angle(halves[1])
  if (!first || !second) return undefined
  const swapped = first.axis === 'longitude' || second.axis === 'latitude'
  if (swapped && (first.axis === 'latitude' || second.axis === 'longitude')) return undefined
  const latitude = swapped ? second.degrees : first.degrees
  const longitude = swapped ? first.degrees : second.degrees
  if (Math.abs(latitude) > 90 || Math.abs(longitude) > 360) return undefined
  return { latitude, longitude }
}

function split(text: string): [string, string] | undefined {
  const byComma = text.split(',').map((half) => half.trim())
  if (byComma.length === 2 && byComma[0] && byComma[1]) return [byComma[0], byComma[1]]
  if (byComma.length > 1) return undefined
  const afterLetter = text.match(/^(.*?[NSEW])\s+(.+)$/i)
  if (afterLetter?.[1] && afterLetter[2] && /\d/.test(afterLetter[1])) return [afterLetter[1], afterLetter[2]]
  const words = text.split(/\s+/)
  return words.length === 2 && words[0] && words[1] ? [words[0], words[1]] : undefined
}

function angle(text: string): { degrees: number; axis: 'latitude' | 'longitude' | undefined } | undefined {
  const match = part.exec(text)
  if (!match || match[0].trim() !== text.trim()) return undefined
  const letter = (match[1] ?? match[5])?.toUpperCase()
  const whole = Number(match[2])
  const minutes = Number(match[3] ?? 0)
  const seconds = Number(match[4] ?? 0)
  if (minutes >= 60 || seconds >= 60) return undefined
  const size = Math.abs(whole) + minutes / 60 + seconds / 3600
  const negative = String(match[2]).startsWith('-') || letter === 'S' || letter === 'W'
  const axis = letter === undefined ? undefined : 'NS'.includes(letter) ? 'latitude' : 'longitude'
  return { degrees: negative ? -size : size, axis }
}
