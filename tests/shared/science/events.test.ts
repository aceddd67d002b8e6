import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { foldEvents, severityOf } from '../../../shared/science/events'
import { defaultRule } from '../../../shared/science/rule'
import { judged } from './series'

const rule = defaultRule()
const events = (drawing: string, today = drawing.length - 1) => foldEvents(judged(drawing), rule, today)
const spans = (drawing: string) =>
  events(drawing).map(({ firstFlagged, lastFlagged, phase }) => [firstFlagged, lastFlagged, phase])

describe('events', () => {
  it('one flagged view is no event, two in a row are', () => {
    expect(spans('uuFuu')).toEqual([])
    expect(spans('uuFFu')).toEqual([[2, 3, 'ended']])
  })

  it('an event runs until a usable view is unflagged', () => {
    expect(events('uFFF')).toEqual([
      {
        phase: 'running',
        lastUnflaggedBefore: 0,
        firstFlagged: 1,
        lastFlagged: 3,
        firstUnflaggedAfter: null,
        triggerDay: 2,
        peakDay: 1,
        peakValue: 4,
        peakTimesUsual: 4,
        severity: 'Moderate',
        usableViews: 3,
        flaggedViews: 3,
      },
    ])
    expect(events('uFFFu')[0]).toMatchObject({ phase: 'ended', firstUnflaggedAfter: 4 })
  })

  it('a region under the coverage floor neither starts nor ends an event', () => {
    expect(spans('u....')).toEqual([])
    expect(spans('uF..F.?.')).toEqual([[1, 4, 'running']])
    expect(events('uF..F..u')[0]).toMatchObject({ phase: 'ended', lastFlagged: 4, firstUnflaggedAfter: 7 })
  })

  it('views that make an event lie within ten days', () => {
    expect(spans('F.........F')).toEqual([[0, 10, 'running']])
    expect(spans('F..........F')).toEqual([])
  })

  it('an event unseen for more than fourteen days is lost, and what is flagged later is another', () => {
    expect(spans('FF' + '.'.repeat(14))).toEqual([[0, 1, 'running']])
    expect(spans('FF' + '.'.repeat(15))).toEqual([[0, 1, 'lost']])
    expect(spans('FF' + '.'.repeat(14) + 'FF')).toEqual([[0, 1, 'lost'], [16, 17, 'running']])
    expect(spans('FF' + '.'.repeat(13) + 'FF')).toEqual([[0, 16, 'running']])
    expect(events('FF' + '.'.repeat(20) + 'u')[0]).toMatchObject({ phase: 'lost', firstUnflaggedAfter: 22 })
  })

  it('events two days apart are one, three days apart are two', () => {
    expect(spans('FFuuFF')).toEqual([[0, 5, 'running']])
    expect(spans('FFuuuFF')).toEqual([[0, 1, 'ended'], [5, 6, 'running']])
    expect(events('FFuuFF')[0]).toMatchObject({ usableViews: 6, flaggedViews: 4, triggerDay: 1 })
  })

  it('a joined gap needs an event on both sides', () => {
    expect(spans('FFuFu')).toEqual([[0, 1, 'ended']])
  })

  it('the peak is the highest flagged value, the earliest if several', () => {
    const views = judged('uFFFFu').map((view) => (view.day === 3 ? { ...view, value: 9, timesUsual: 9 } : view))
    expect(foldEvents(views, rule, 5)[0]).toMatchObject({ peakDay: 3, peakValue: 9, severity: 'Extreme' })
  })

  it('views after today are not looked at', () => {
    expect(events('uFFFu', 3)[0]).toMatchObject({ phase: 'running', lastFlagged: 3 })
    expect(events('uFFFu', 1)).toEqual([])
  })

  it('nothing makes no event', () => {
    expect(foldEvents([], rule, 0)).toEqual([])
  })

  const drawing = fc.string({ unit: fc.constantFrom('F', 'F', 'u', '.', '?', ' '), minLength: 1, maxLength: 120 })

  it('the order of views does not matter', () => {
    fc.assert(
      fc.property(drawing, fc.infiniteStream(fc.nat()), (days, keys) => {
        const views = judged(days)
        const keyed = views.map((view) => ({ view, key: keys.next().value })).sort((a, b) => a.key - b.key)
        const shuffled = keyed.map(({ view }) => view)
        expect(foldEvents(shuffled, rule, days.length)).toEqual(foldEvents(views, rule, days.length))
      }),
      { seed: 11 },
    )
  })

  it('not-seen views change nothing, wherever they fall', () => {
    fc.assert(
      fc.property(drawing, (days) => {
        const today = days.length - 1
        expect(events(days.replaceAll('.', ' '), today)).toEqual(events(days, today))
      }),
      { seed: 12 },
    )
  })

  it('events are in order, apart from each other, and hold their trigger and peak', () => {
    fc.assert(
      fc.property(drawing, (days) => {
        const found = events(days)
        for (const [i, event] of found.entries()) {
          expect(event.firstFlagged).toBeLessThanOrEqual(event.triggerDay)
          expect(event.triggerDay).toBeLessThanOrEqual(event.lastFlagged)
          expect(event.flaggedViews).toBeGreaterThanOrEqual(rule.consecutiveViews)
          if (i > 0) expect(found[i - 1]!.lastFlagged).toBeLessThan(event.firstFlagged)
          if (i < found.length - 1) expect(event.phase).not.toBe('running')
        }
      }),
      { seed: 13 },
    )
  })

  it('fewer flagged views never make more days of events', () => {
    const inEvents = (days: string, flags: string) =>
      events(flags, days.length - 1).flatMap(({ firstFlagged, lastFlagged }) => [firstFlagged, lastFlagged])
    fc.assert(
      fc.property(drawing, fc.nat(), (days, at) => {
        const place = at % days.length
        if (days[place] !== 'F') return
        const fewer = days.slice(0, place) + 'u' + days.slice(place + 1)
        for (const day of inEvents(days, fewer)) {
          expect(events(days).some((event) => event.firstFlagged <= day && day <= event.lastFlagged)).toBe(true)
        }
      }),
      { seed: 14 },
    )
  })
})

describe('severity', () => {
  it('has four words, from the step on', () => {
    const words = [2, 2.99, 3, 4.99, 5, 7.99, 8, 40].map((times) => severityOf(times, rule.severitySteps))
    expect(words).toEqual(['Minor', 'Minor', 'Moderate', 'Moderate', 'Severe', 'Severe', 'Extreme', 'Extreme'])
    expect(severityOf(null, rule.severitySteps)).toBe('Minor')
  })
})
