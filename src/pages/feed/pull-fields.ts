import { z } from 'zod'
import { pullFields, pullSettings, type FeedPull } from '../../../shared/schemas/pulls'
import type { PullBody } from '../../api/pulls'

/** The form is flat; what it sends is held against the call's own schema, and its sentences come back to the fields. */
export const fields = pullFields
  .extend({
    choice: z.enum(['keep', 'none', 'basic', 'bearer']),
    user: z.string(),
    password: z.string(),
    token: z.string(),
  })
  .superRefine((given, check) => {
    const parsed = pullSettings.safeParse(bodyOf(given, null))
    for (const issue of parsed.error?.issues ?? []) {
      const path = issue.path[0] === 'credentials' ? issue.path.slice(1) : issue.path
      check.addIssue({ code: 'custom', path, message: issue.message })
    }
  })

export type PullFormInput = z.input<typeof fields>
export type PullFormOutput = z.output<typeof fields>

export function bodyOf({ choice, user, password, token, ...rest }: PullFormOutput, version: number | null): PullBody {
  return { ...rest, version, ...credentialsOf({ choice, user, password, token }) }
}

function credentialsOf({ choice, user, password, token }: Pick<PullFormOutput, 'choice' | 'user' | 'password' | 'token'>): Pick<PullBody, 'credentials'> {
  if (choice === 'keep') return {}
  if (choice === 'none') return { credentials: null }
  return { credentials: choice === 'basic' ? { kind: 'basic', user, password } : { kind: 'bearer', token } }
}

export function startOf(settings: FeedPull['settings']): PullFormInput {
  const { address = '', everyHours = 6, atMinute = 0, lookBackDays = 7, stepMinutes = null } = settings ?? {}
  const choice = settings && settings.credentials !== 'none' ? 'keep' : 'none'
  return { address, everyHours, atMinute, lookBackDays, stepMinutes, choice, user: '', password: '', token: '' }
}
