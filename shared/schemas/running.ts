import { z } from 'zod'
import { id, instant } from './common'

export const jobStates = ['waiting', 'running', 'paused', 'done', 'failed', 'cancelled'] as const
export const job = z.object({
  id,
  kind: z.string(),
  /** What it works on, in words. */
  subject: z.string(),
  state: z.enum(jobStates),
  done: z.number().int(),
  total: z.number().int(),
  attempts: z.number().int(),
  lastError: z.string().nullable(),
  createdAt: instant,
  updatedAt: instant,
  runAfter: instant.nullable(),
})
export type Job = z.infer<typeof job>

export const auditEntry = z.object({
  id,
  at: instant,
  who: z.string().nullable(),
  action: z.string(),
  subject: z.string(),
  details: z.record(z.string(), z.unknown()),
})

export const health = z.object({
  status: z.enum(['ok', 'degraded']),
  version: z.string(),
  now: instant,
  lastTickAt: instant.nullable(),
  jobsWaiting: z.number().int(),
  lettersWaiting: z.number().int(),
})
