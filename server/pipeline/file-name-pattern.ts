const parts: Record<string, string> = {
  yyyy: '(?<yyyy>\\d{4})',
  MM: '(?<MM>0[1-9]|1[0-2])',
  dd: '(?<dd>0[1-9]|[12]\\d|3[01])',
  DDD: '(?<DDD>[0-3]\\d\\d)',
  HH: '(?<HH>[01]\\d|2[0-3])',
  mm: '(?<mm>[0-5]\\d)',
}

/** A pattern such as "chl-{yyyy}{MM}{dd}*.tif": date parts in braces, * for anything, the rest as it stands. */
function expressionOf(pattern: string): RegExp {
  const seen = new Set<string>()
  const source = pattern.replace(/\{(\w+)\}|\*|[^{*]+|\{/g, (piece, name: string | undefined) => {
    if (piece === '*') return '.*'
    const part = name === undefined ? undefined : parts[name]
    if (name === undefined || part === undefined) return piece.replace(/[\\^$.*+?()[\]{}|]/g, '\\$&')
    if (seen.has(name)) return `\\k<${name}>`
    seen.add(name)
    return part
  })
  return new RegExp(`^${source}$`)
}

export function fitsPattern(pattern: string, name: string): boolean {
  return expressionOf(pattern).test(name)
}

/** The date, and the time if the pattern has one, that a file name carries; null when it carries none. */
export function dateInName(pattern: string, name: string): { instant: number; hasClock: boolean } | null {
  const found = expressionOf(pattern).exec(name)?.groups
  if (!found?.['yyyy']) return null
  const year = Number(found['yyyy'])
  const ordinal = found['DDD'] === undefined ? null : Number(found['DDD'])
  if (ordinal === null && (found['MM'] === undefined || found['dd'] === undefined)) return null
  const month = ordinal === null ? Number(found['MM']) - 1 : 0
  const day = ordinal ?? Number(found['dd'])
  const instant = Date.UTC(year, month, day, Number(found['HH'] ?? 0), Number(found['mm'] ?? 0))
  const date = new Date(instant)
  const real = ordinal === null ? date.getUTCMonth() === month && date.getUTCDate() === day : ordinal >= 1 && date.getUTCFullYear() === year
  return real ? { instant, hasClock: found['HH'] !== undefined } : null
}
