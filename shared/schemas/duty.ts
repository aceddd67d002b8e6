import { z } from 'zod'
import { id, instant, severity, version } from './common'

export const subscriptionFields = z.object({
  allRegions: z.boolean(),
  regionIds: z.array(id).max(1000).default([]),
  minimumSeverity: severity,
  delivery: z.enum(['at once', 'daily digest']).default('at once'),
  pausedUntil: instant.nullable().default(null),
})
export const newSubscription = subscriptionFields.extend({
  /** Somebody else's needs the admin. */
  userId: id.optional(),
})
export const subscriptionChange = z.object({
  version,
  allRegions: z.boolean().optional(),
  regionIds: z.array(id).max(1000).optional(),
  minimumSeverity: severity.optional(),
  delivery: z.enum(['at once', 'daily digest']).optional(),
  pausedUntil: instant.nullable().optional(),
})
export const subscription = subscriptionFields.extend({ id, userId: id, userName: z.string(), email: z.string(), version })
export type Subscription = z.infer<typeof subscription>

export const letterStates = ['waiting', 'delivered', 'failed'] as const
export const letter = z.object({
  id,
  to: z.string(),
  kind: z.string(),
  subject: z.string(),
  state: z.enum(letterStates),
  attempts: z.number().int(),
  nextAttemptAt: instant.nullable(),
  deliveredAt: instant.nullable(),
  lastError: z.string().nullable(),
  alertId: id.nullable(),
  messageId: z.string(),
  createdAt: instant,
})
export type Letter = z.infer<typeof letter>

/** A letter caught by the local mail catcher, as it came over SMTP. */
export const caughtLetter = z.object({
  id: z.string(),
  from: z.string(),
  to: z.array(z.string()),
  subject: z.string(),
  date: instant,
  messageId: z.string(),
  text: z.string(),
  html: z.string().nullable(),
})
export type CaughtLetter = z.infer<typeof caughtLetter>
