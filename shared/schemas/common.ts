import { z } from 'zod'

export const id = z.number().int().positive()
export const idParam = z.object({ id: z.coerce.number().int().positive() })
/** An instant, ISO 8601 in UTC. */
export const instant = z.iso.datetime({ offset: true })
/** A calendar day, YYYY-MM-DD. */
export const day = z.iso.date()
export const version = z.number().int().positive()

export const page = z.object({
  limit: z.coerce.number().int().min(1).max(500).default(100),
  cursor: z.string().max(100).optional(),
})

export function list<T extends z.ZodType>(item: T) {
  return z.object({ items: z.array(item), nextCursor: z.string().nullable() })
}

export const nothing = z.undefined()
export const errorReply = z.object({
  error: z.object({ code: z.string(), message: z.string(), details: z.record(z.string(), z.unknown()) }),
})

export const severities = ['Minor', 'Moderate', 'Severe', 'Extreme'] as const
export const severity = z.enum(severities)
export type Severity = z.infer<typeof severity>

/** In order of worry. */
export const regionStates = ['unusual', 'not seen', 'stale', 'not ready', 'not comparable', 'usual'] as const
export const regionState = z.enum(regionStates)
export type RegionStateName = z.infer<typeof regionState>

export const timeZone = z.string().refine(isTimeZone, 'This is not a time zone name such as Europe/Dublin.')

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name })
    return true
  } catch {
    return false
  }
}
