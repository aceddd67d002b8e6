import type { AlertEntry } from '../../../shared/schemas/alerts'
import { dayAndTime, dayWords } from '../../lib/dates'

const instants = /\b\d{4}-\d\d-\d\dT\d\d:\d\d(?::\d\d(?:\.\d+)?)?(?:Z|[+-]\d\d:\d\d)/g
const days = /\b\d{4}-\d\d-\d\d\b/g

/** What an entry says, with its times where the reader is; an acknowledgement with a note says both. */
export function entryWords({ kind, text }: AlertEntry, timeZone: string): string {
  const local = text.replace(instants, (at) => dayAndTime(at, timeZone)).replace(days, dayWords)
  return kind === 'acknowledged' && !local.startsWith('Acknowledged') ? `Acknowledged. ${local}` : local
}
