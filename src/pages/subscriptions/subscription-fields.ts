import { z } from 'zod'
import { severity } from '../../../shared/schemas/common'
import type { Subscription } from '../../../shared/schemas/duty'

/** What the dialog holds, as typed. */
export const subscriptionForm = z
  .object({
    userId: z.string(),
    scope: z.enum(['all', 'some']),
    regionIds: z.array(z.string()),
    minimumSeverity: severity,
    delivery: z.enum(['at once', 'daily digest']),
    /** A calendar day; empty for no pause. */
    pausedUntil: z.string(),
  })
  .refine((form) => form.scope === 'all' || form.regionIds.length > 0, { message: 'Choose at least one region, or all of them.', path: ['regionIds'] })
export type SubscriptionForm = z.infer<typeof subscriptionForm>

export function formOf(subscription: Subscription | undefined): SubscriptionForm {
  return {
    userId: '',
    scope: subscription && !subscription.allRegions ? 'some' : 'all',
    regionIds: subscription?.regionIds.map(String) ?? [],
    minimumSeverity: subscription?.minimumSeverity ?? 'Minor',
    delivery: subscription?.delivery ?? 'at once',
    pausedUntil: subscription?.pausedUntil?.slice(0, 10) ?? '',
  }
}

export function bodyOf(form: SubscriptionForm) {
  return {
    allRegions: form.scope === 'all',
    regionIds: form.scope === 'all' ? [] : form.regionIds.map(Number),
    minimumSeverity: form.minimumSeverity,
    delivery: form.delivery,
    pausedUntil: form.pausedUntil === '' ? null : `${form.pausedUntil}T00:00:00Z`,
  }
}
