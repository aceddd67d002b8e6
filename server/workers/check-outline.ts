import { checkOutline as check } from '../geography/outline/check-outline'
import { OutlineRefused } from '../geography/outline/outline-refused'
import type { OutlineOutcome, OutlineTasks } from './outline-tasks'

export function checkOutline({ sent, inland }: OutlineTasks['checkOutline']['input']): OutlineOutcome {
  try {
    return { outline: check(sent, { inland }) }
  } catch (error) {
    if (!(error instanceof OutlineRefused)) throw error
    return { refused: { sentence: error.message, place: error.place, reason: error.reason } }
  }
}
