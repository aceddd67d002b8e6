import { describe, expect, it } from 'vitest'
import { foldEvents } from '../../shared/science/events'
import { defaultRule, type JudgedView } from '../../shared/science/rule'
import published from './values/events.json'

describe('events in a series without gaps agree with the published definition', () => {
  const { min_duration_days, max_gap_days } = published.rule
  const rule = { ...defaultRule(), consecutiveViews: min_duration_days, joinGapDays: max_gap_days }

  it.each(published.events)('$exceed', ({ exceed, events }) => {
    const judged = exceed.map((above, day): JudgedView => {
      const state = above ? 'flagged' : 'unflagged'
      return { day, state, value: 1 + above, usual: 1, p10: 1, p90: 1.5, threshold: 1.5, timesUsual: 1 + above }
    })
    const found = foldEvents(judged, rule, exceed.length)
    expect(found.map(({ firstFlagged, lastFlagged }) => [firstFlagged, lastFlagged])).toEqual(events)
  })
})
