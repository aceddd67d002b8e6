import type { AlertItem } from '../../../shared/schemas/alerts'

/** Who has it, in a few words; nothing where nobody has and nobody need. */
export function holderWords(alert: AlertItem, myId: number | undefined): string {
  if (alert.state !== 'closed' && alert.assignee) return alert.assignee.id === myId ? 'you have it' : `${alert.assignee.name} has it`
  if (alert.acknowledgedBy) return `acknowledged by ${alert.acknowledgedBy}`
  return alert.state === 'open' ? 'nobody yet' : ''
}
