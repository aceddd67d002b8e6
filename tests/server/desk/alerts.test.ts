import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import request from 'supertest'
import type { Person } from '../../../server/accounts/person'
import { standings } from '../../../server/desk/standing'
import type { FeedRecord } from '../../../server/models/feed'
import type { RegionRecord } from '../../../server/models/region'
import { deliverDue } from '../../../server/mail/delivery'
import { aFeed, aPerson, aRegion, cleanSea, quietYears, runJobs, seaFile, send } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'
import { aUser, bearer, type TestUser } from '../../support/people'

let context: TestContext
let person: Person
let officer: TestUser
let feed: FeedRecord
let region: RegionRecord

const years = [2022, 2023, 2024, 2025]

beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z'), mail: true })
  person = await aPerson(context)
  officer = await aUser(context, { roles: ['officer'], name: 'Ines Marrow' })
  feed = await aFeed(context, person)
  region = await aRegion(context, person)
  await context.models.subscriptions.create({ userId: officer.id, allRegions: true, minimumSeverity: 'Minor', delivery: 'at once' })
  await send(context, await seaFile(quietYears(years, '05-25', 30)))
  await runJobs(context)
})
afterEach(() => context.close())
afterAll(cleanSea)

const arrive = async (...steps: [date: string, value: number][]) => {
  await send(context, await seaFile(steps.map(([date, value]) => ({ at: `${date}T12:00:00Z`, value }))))
  await runJobs(context)
}
const alerts = () => context.models.alerts.findAll({ order: [['id', 'ASC']] })
const letters = () => context.models.letters.findAll({ order: [['id', 'ASC']] })
const stateOf = async () => (await standings(context, region.id)).get(region.id)!
const asOfficer = async () => request.agent(context.app).set('Authorization', await bearer(context, officer))

describe('an alert', () => {
  it('is raised, with its letter, by the second usable view in a row that meets the rule', async () => {
    await arrive(['2026-06-09', 1])
    expect((await stateOf()).state).toBe('usual')
    await arrive(['2026-06-10', 4])
    expect(await alerts()).toHaveLength(0)
    await arrive(['2026-06-11', 5])
    const [alert] = await alerts()
    expect(alert).toMatchObject({ state: 'open', phase: 'running', severity: 'Severe' })
    expect(alert!.evidence).toMatchObject({ value: 5, coverageFloor: 0.25, cells: 16, baselineYears: years, geometryVersion: 1, day: '2026-06-11' })
    expect(alert!.evidence.timesUsual!).toBeCloseTo(5 / alert!.evidence.usual!, 12)
    expect(await letters()).toHaveLength(1)
    expect(await stateOf()).toMatchObject({ state: 'unusual', severity: 'Severe', alertId: alert!.id })
  })

  it('writes a letter that says what, why and what colour cannot show, with a link to the alert', async () => {
    await arrive(['2026-06-10', 4], ['2026-06-11', 5])
    await deliverDue(context)
    const [caught] = context.mailCatcher!.list()
    expect(caught!.to).toEqual([officer.email])
    expect(caught!.subject).toBe('Quiet Water: Severe, view 3 h old')
    for (const part of [caught!.text, caught!.html!]) {
      expect(part).toContain('Quiet Water is at 5.0 times usual.')
      expect(part).toContain('100 % of the water was seen')
      expect(part).toContain('neither species nor toxins')
      expect(part).toContain(`/alerts/${(await alerts())[0]!.id}`)
    }
  })

  it('is not raised twice by running everything again', async () => {
    await arrive(['2026-06-10', 4], ['2026-06-11', 5])
    await context.db.write((tx) => context.db.run(`UPDATE jobs SET state = 'waiting' WHERE id IN (SELECT max(id) FROM jobs GROUP BY kind, job_key)`, {}, tx))
    await runJobs(context)
    expect(await alerts()).toHaveLength(1)
    expect(await letters()).toHaveLength(1)
  })

  it('is not raised by history that arrives late', async () => {
    await arrive(['2026-06-01', 4], ['2026-06-02', 5], ['2026-06-03', 1])
    expect(await alerts()).toHaveLength(0)
    expect(await context.models.events.count()).toBe(1)
  })

  it('grows with its event: it rises with a second letter in the same thread, and says when the event ended', async () => {
    await arrive(['2026-06-09', 2.5], ['2026-06-10', 2.5])
    expect((await alerts())[0]!.severity).toBe('Minor')
    await arrive(['2026-06-11', 9])
    expect((await alerts())[0]!.severity).toBe('Extreme')
    const [raised, rose] = await letters()
    expect(rose!.inReplyTo).toBe(raised!.messageId)
    context.clock.moveTo(Date.parse('2026-06-12T15:00:00Z'))
    await arrive(['2026-06-12', 1])
    const [alert] = await alerts()
    expect(alert).toMatchObject({ state: 'open', phase: 'ended' })
    const entries = await context.models.alertEntries.findAll({ where: { alertId: alert!.id }, order: [['id', 'ASC']] })
    expect(entries.map((entry) => entry.kind)).toEqual(['raised', 'letter', 'rose', 'letter', 'ended'])
  })

  it('is not started or ended by a view under the coverage floor', async () => {
    await arrive(['2026-06-10', 4])
    await send(context, await seaFile([{ at: '2026-06-11T12:00:00Z', value: (_, column) => (column === 2 && _ < 5 ? 6 : NaN) }]))
    await runJobs(context)
    expect(await alerts()).toHaveLength(0)
    expect((await stateOf()).view!.day).toBe('2026-06-10')
  })

  it('says so when a corrected layer takes its event away', async () => {
    await arrive(['2026-06-10', 4], ['2026-06-11', 5])
    await send(context, await seaFile([{ at: '2026-06-11T12:00:00Z', value: 1 }, { at: '2026-06-10T12:00:00Z', value: 1 }].reverse(), { processingVersion: 'R1' }))
    await send(context, await seaFile([{ at: '2026-06-10T12:30:00Z', value: 0.1 }, { at: '2026-06-11T12:30:00Z', value: 0.1 }]))
    await runJobs(context)
    const [alert] = await alerts()
    expect(alert!.phase).toBe('ended')
    const entries = await context.models.alertEntries.findAll({ where: { alertId: alert!.id } })
    expect(entries.map((entry) => entry.text).join(' ')).toContain('no longer finds an event')
  })
})

describe('over HTTP', () => {
  beforeEach(() => arrive(['2026-06-10', 4], ['2026-06-11', 5]))

  it('an officer acknowledges with a note; a second one is told who was first, and nothing is overwritten', async () => {
    const [alert] = await alerts()
    const agent = await asOfficer()
    const reply = await agent.post(`/api/alerts/${alert!.id}/acknowledge`).send({ note: 'Called the farm.', version: alert!.version }).expect(200)
    expect(reply.body).toMatchObject({ state: 'acknowledged', acknowledgedBy: 'Ines Marrow', assignee: { name: 'Ines Marrow' } })
    expect(reply.body.entries[0]).toMatchObject({ kind: 'acknowledged', by: 'Ines Marrow', text: 'Called the farm.' })
    const second = await agent.post(`/api/alerts/${alert!.id}/acknowledge`).send({ note: 'Me too', version: alert!.version }).expect(409)
    expect(second.body.error).toMatchObject({ code: 'stale-version', message: expect.stringContaining('acknowledged by Ines Marrow') })
    const third = await agent.post(`/api/alerts/${alert!.id}/acknowledge`).send({}).expect(409)
    expect(third.body.error.code).toBe('conflict')
  })

  it('it is closed with an outcome, and not without the cause where it was no bloom', async () => {
    const [alert] = await alerts()
    const agent = await asOfficer()
    await agent.post(`/api/alerts/${alert!.id}/close`).send({ outcome: 'not a bloom' }).expect(422)
    await agent.post(`/api/alerts/${alert!.id}/close`).send({ outcome: 'not a bloom', cause: 'sediment', note: 'River in spate.' }).expect(200)
    await agent.post(`/api/alerts/${alert!.id}/reopen`).send({ note: 'Sample came back.' }).expect(200)
    const { body } = await agent.get(`/api/alerts/${alert!.id}`).expect(200)
    expect(body).toMatchObject({ state: 'acknowledged', outcome: null })
    expect(body.entries.map((entry: { kind: string }) => entry.kind)).toEqual(['reopened', 'closed', 'letter', 'raised'])
  })

  it('the explanation computes it again from the stored layers, and agrees', async () => {
    const [alert] = await alerts()
    const { body } = await (await asOfficer()).get(`/api/alerts/${alert!.id}/explanation`).expect(200)
    expect(body.differences).toEqual([])
    expect(body.agrees).toBe(true)
    expect(body.recomputed.value).toBe(5)
  })

  it('the explanation says what differs when the stored figures do not agree', async () => {
    const [alert] = await alerts()
    await context.models.alerts.update({ evidence: { ...alert!.evidence, value: 6 } }, { where: { id: alert!.id } })
    const { body } = await (await asOfficer()).get(`/api/alerts/${alert!.id}/explanation`).expect(200)
    expect(body).toMatchObject({ agrees: false, differences: ['value was 6, is 5'] })
  })

  it('lists come by worry and page by cursor', async () => {
    const agent = await asOfficer()
    const { body } = await agent.get('/api/alerts?limit=1').expect(200)
    expect(body.items).toHaveLength(1)
    expect(body.nextCursor).toBeNull()
    expect((await agent.get('/api/alerts?state=closed').expect(200)).body.items).toEqual([])
    expect((await agent.get(`/api/alerts?severity=Severe&regionId=${region.id}`).expect(200)).body.items).toHaveLength(1)
  })

  it('the series, its CSV, the baseline and the events tell the same story', async () => {
    const agent = await asOfficer()
    const series = (await agent.get(`/api/regions/${region.id}/series?feedId=${feed.id}&from=2026-06-01`).expect(200)).body
    expect(series.columns.median).toEqual([4, 5])
    const csv = (await agent.get(`/api/exports/regions/${region.id}/series.csv?feedId=${feed.id}&from=2026-06-01&columns=day,median,departure`).expect(200)).text
    expect(csv).toBe('day,median,departure\n2026-06-10,4,\n2026-06-11,5,\n')
    const baseline = (await agent.get(`/api/regions/${region.id}/baseline?feedId=${feed.id}`).expect(200)).body
    expect(baseline).toMatchObject({ version: 1, statistic: 'median', years, halfWidthDays: 5, smoothingDays: 1 })
    const slot = baseline.columns.dayOfYear.indexOf(163)
    expect(baseline.columns.n[slot]).toBe(44)
    expect(baseline.columns.p50[slot]).toBe((await alerts())[0]!.evidence.usual)
    const events = (await agent.get(`/api/regions/${region.id}/events`).expect(200)).body.items
    expect(events).toMatchObject([{ phase: 'running', firstFlagged: '2026-06-10', lastFlagged: '2026-06-11', triggerDay: '2026-06-11', peakValue: 5, severity: 'Severe' }])
  })
})

describe('a region and its feed', () => {
  it('a layer dated ahead by mistake does not hide that the feed has gone silent', async () => {
    await arrive(['2026-06-09', 1])
    context.clock.moveTo(Date.parse('2026-06-20T15:00:00Z'))
    await arrive(['2027-06-20', 1])
    expect((await stateOf()).state).toBe('stale')
    const { body } = await (await asOfficer()).get(`/api/feeds/${feed.id}`).expect(200)
    expect(body).toMatchObject({ silent: true })
  })
})
