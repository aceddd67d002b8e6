/** Address patterns: the braces of file-name patterns, filled in with the parts of an instant in UTC. */

const minuteMs = 60_000
const hourMs = 60 * minuteMs
const dayMs = 24 * hourMs

type Part = 'yyyy' | 'MM' | 'dd' | 'DDD' | 'HH' | 'mm'

const digits = (value: number, width: number) => String(value).padStart(width, '0')

const parts: Record<Part, (date: Date) => string> = {
  yyyy: (date) => digits(date.getUTCFullYear(), 4),
  MM: (date) => digits(date.getUTCMonth() + 1, 2),
  dd: (date) => digits(date.getUTCDate(), 2),
  DDD: (date) => digits(Math.floor((date.getTime() - Date.UTC(date.getUTCFullYear(), 0, 1)) / dayMs) + 1, 3),
  HH: (date) => digits(date.getUTCHours(), 2),
  mm: (date) => digits(date.getUTCMinutes(), 2),
}

const isPart = (name: string): name is Part => Object.hasOwn(parts, name)
const namesIn = (pattern: string): string[] => [...pattern.matchAll(/\{([^{}]*)\}/g)].map((found) => found[1]!)

export const mostAddresses = 500

export interface Slot {
  /** The start of the day, hour or step the address was filled in for. */
  at: number
  address: string
}

/** The pattern filled in for one instant. */
export function addressAt(pattern: string, instant: number): string {
  const date = new Date(instant)
  return pattern.replace(/\{([^{}]*)\}/g, (whole, name: string) => (isPart(name) ? parts[name](date) : whole))
}

/** How far apart two addresses lie: as said, else a day, or an hour where the pattern has one. */
export function stepOf(pattern: string, stepMinutes: number | null): number {
  if (stepMinutes !== null) return stepMinutes * minuteMs
  return namesIn(pattern).includes('HH') ? hourMs : dayMs
}

/** Every address from today back over the given days, newest first; each address once, none of the future. */
export function addressesOf(pattern: string, asked: { now: number; lookBackDays: number; stepMinutes: number | null }): Slot[] {
  const step = stepOf(pattern, asked.stepMinutes)
  const first = Math.floor(asked.now / dayMs) * dayMs - asked.lookBackDays * dayMs
  const slots = new Map<string, Slot>()
  // Steps count from midnight, so that a step longer than an hour falls on the same hours every day.
  for (let at = first + Math.floor((asked.now - first) / step) * step; at >= first; at -= step) {
    const address = addressAt(pattern, at)
    if (!slots.has(address)) slots.set(address, { at, address })
  }
  return [...slots.values()]
}

/** Whether a filled-in address says which day it is of. */
export function namesItsDay(pattern: string): boolean {
  const names = namesIn(pattern)
  return names.includes('yyyy') && (names.includes('DDD') || (names.includes('MM') && names.includes('dd')))
}

/** What is wrong with a pattern, as a sentence; null when nothing is. */
export function patternFault(pattern: string): string | null {
  const strange = namesIn(pattern).find((name) => !isPart(name))
  if (strange !== undefined) return `{${strange}} is no part of a date. Use {yyyy}, {MM}, {dd}, {DDD}, {HH} or {mm}.`
  if (/[{}]/.test(pattern.replace(/\{[^{}]*\}/g, ''))) return 'A brace stands alone.'
  if (/\s/.test(pattern)) return 'An address has no spaces.'
  const host = /^https?:\/\/([^/?#]*)/i.exec(pattern)?.[1]
  if (!host) return 'Begin with https:// and the name of a server.'
  if (host.includes('@')) return 'Leave name and password out of the address: they have fields of their own, which nobody reads.'
  if (/[{}]/.test(host)) return 'The date belongs behind the name of the server.'
  if (pattern.includes('#')) return 'Leave out what follows #: it is never sent to a server.'
  return URL.canParse(addressAt(pattern, 0)) ? null : 'This is not an address.'
}
