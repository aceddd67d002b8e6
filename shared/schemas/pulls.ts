import { z } from 'zod'
import { addressesOf, mostAddresses, patternFault } from '../address-pattern'
import { id, instant, version } from './common'

/** Write-only: sent to set them, never sent back. */
export const pullCredentials = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('basic'),
    user: z.string().min(1, 'Give the name.').max(200).regex(/^[^:]*$/, 'A name has no colon.'),
    password: z.string().min(1, 'Give the password.').max(500),
  }),
  z.object({
    kind: z.literal('bearer'),
    token: z.string().trim().min(1, 'Give the token.').max(8000).regex(/^[\x21-\x7e]*$/, 'A token is one word of plain characters.'),
  }),
])
export type PullCredentials = z.infer<typeof pullCredentials>

export const pullSteps = [5, 10, 15, 20, 30, 60, 120, 180, 240, 360, 480, 720, 1440] as const

const address = z
  .string()
  .trim()
  .min(1, 'Give the address.')
  .max(1000, 'At most 1000 characters.')
  .superRefine((pattern, check) => {
    const fault = pattern === '' ? null : patternFault(pattern)
    if (fault) check.addIssue({ code: 'custom', message: fault })
  })

export const pullFields = z.object({
  /** {yyyy} {MM} {dd} {DDD} {HH} {mm} are parts of the date in UTC. */
  address,
  /** Asked every so many hours, counted from midnight UTC... */
  everyHours: z.number('Give a number of hours.').int('Whole hours.').min(1, 'At least 1 hour.').max(168, 'At most 168 hours.').default(6),
  /** ...at this minute. */
  atMinute: z.number('Give a minute.').int('A whole minute.').min(0, '0 to 59.').max(59, '0 to 59.').default(0),
  /** Days before today asked for each time, for late or corrected files. */
  lookBackDays: z.number('Give a number of days.').int('Whole days.').min(0, 'At least 0.').max(60, 'At most 60 days.').default(7),
  /** One file every so many minutes; null: one a day, or an hour where the address has {HH}. */
  stepMinutes: z.literal(pullSteps).nullable().default(null),
})
export type PullFields = z.infer<typeof pullFields>

export const pullSettings = pullFields
  .extend({
    /** Left out: what is stored stays. null: none from now on. */
    credentials: pullCredentials.nullable().optional(),
    /** Of what is being changed; null where there is none yet. */
    version: version.nullable().default(null),
  })
  .superRefine((given, check) => {
    if (given.address.includes('{mm}') && given.stepMinutes === null) {
      check.addIssue({ code: 'custom', path: ['stepMinutes'], message: 'Say how often there is a file: the address has minutes.' })
    }
    const count = addressesOf(given.address, { now: 86_399_999, lookBackDays: given.lookBackDays, stepMinutes: given.stepMinutes }).length
    if (count > mostAddresses) {
      check.addIssue({ code: 'custom', path: ['lookBackDays'], message: `These would be ${count} addresses each time, more than ${mostAddresses}. Look back fewer days.` })
    }
  })
export type PullSettings = z.infer<typeof pullSettings>

export const pullOutcomes = ['ok', 'failed', 'postponed'] as const

export const pullRun = z.object({
  id,
  startedAt: instant,
  endedAt: instant,
  outcome: z.enum(pullOutcomes),
  fetched: z.number().int(),
  /** Asked again and still the same. */
  unchanged: z.number().int(),
  notThere: z.number().int(),
  failed: z.number().int(),
  /** What went wrong, or why it waits. */
  sentence: z.string().nullable(),
})
export type PullRun = z.infer<typeof pullRun>

export const feedPull = z.object({
  feedId: id,
  settings: pullFields.extend({ credentials: z.enum(['none', 'basic', 'bearer']), version }).nullable(),
  /** Today's address. */
  example: z.string().nullable(),
  /** Waiting for its turn or under way. */
  running: z.boolean(),
  nextDueAt: instant.nullable(),
  failuresInRow: z.number().int(),
  /** Three failures in a row or more. */
  failing: z.boolean(),
  lastRun: pullRun.nullable(),
  /** Newest first, at most 20. */
  runs: z.array(pullRun),
})
export type FeedPull = z.infer<typeof feedPull>
