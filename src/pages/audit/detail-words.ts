/** The facts of an audit entry on one line: "version 2, note Fewer false calls". */
export function detailWords(details: Record<string, unknown>): string {
  return Object.entries(details)
    .filter(([, value]) => value !== null && value !== undefined && value !== '')
    .map(([name, value]) => `${inWords(name)} ${valueWords(value)}`)
    .join(', ')
}

function valueWords(value: unknown): string {
  if (Array.isArray(value)) return value.map(valueWords).join(' and ')
  if (typeof value === 'number') return String(Number(value.toPrecision(6)))
  return typeof value === 'object' ? JSON.stringify(value) : String(value)
}

function inWords(name: string): string {
  return name.replace(/([a-z])([A-Z])/g, '$1 $2').toLowerCase()
}
