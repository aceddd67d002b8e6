import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { CheckedOutline } from '../geography/outline/check-outline'
import { presentRefusal } from './present-outline'

export type { CheckedOutline } from '../geography/outline/check-outline'

/** Takes an outline as sent, puts right what has one meaning, and refuses the rest with a sentence and the place on the map. */
export async function checkedGeometry(context: Context, sent: unknown, inland: boolean): Promise<CheckedOutline> {
  const outcome = await context.workers.light('checkOutline', { sent, inland })
  if ('outline' in outcome) return outcome.outline
  const { sentence, place, reason } = presentRefusal(outcome.refused)
  throw new ApiError('not-valid', sentence, { fields: { geometry: sentence }, ...(place && { place }), ...(reason && { reason }) })
}
