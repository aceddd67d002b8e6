import { expect, test } from 'vitest'
import { entryWords } from '../../../src/pages/alert/entry-words'

const entry = (kind: 'held' | 'acknowledged' | 'raised', text: string) => ({ id: 1, at: '2026-06-11T03:00:00Z', by: null, kind, text })

test('times in an entry are told where the reader is, days stay days', () => {
  expect(entryWords(entry('held', 'Held until 2026-06-11T23:30:00.000Z: fog'), 'Europe/Dublin')).toBe('Held until 12 Jun 00:30: fog')
  expect(entryWords(entry('raised', 'Raised as Severe: 2 flagged views since 2026-06-10.'), 'Europe/Dublin')).toBe('Raised as Severe: 2 flagged views since 10 June.')
})

test('an acknowledgement with a note says that it is one', () => {
  expect(entryWords(entry('acknowledged', 'Rang the growers.'), 'UTC')).toBe('Acknowledged. Rang the growers.')
  expect(entryWords(entry('acknowledged', 'Acknowledged.'), 'UTC')).toBe('Acknowledged.')
})
