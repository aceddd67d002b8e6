import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import { tidy } from '../../../server/jobs/tidy'
import { keepPull } from '../../../server/pull/keep-pull'
import { keepPulledAddress } from '../../../server/queries/pulls'
import { pullSettings } from '../../../shared/schemas/pulls'
import { aFeed, aPerson, cleanSea } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

const day = 86_400_000
let context: TestContext
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
})
afterEach(() => context.close())
afterAll(cleanSea)

const jobs = async () => (await context.models.jobs.findAll({ order: [['id', 'ASC']] })).map((job) => `${job.jobKey} ${job.state}`)
const addresses = async () => (await context.db.all<{ address: string }>('SELECT address FROM pulled_addresses ORDER BY address')).map((row) => row.address)

async function aJob(key: string, state: string): Promise<void> {
  const at = context.clock.now()
  await context.db.write((tx) =>
    context.db.run(
      `INSERT INTO jobs (kind, job_key, subject, payload, state, priority, created_at, updated_at) VALUES ('judge-region', $key, '', '{}', $state, 30, $at, $at)`,
      { key, state, at },
      tx,
    ),
  )
}

describe('what nobody needs any more', () => {
  it('is taken away once a day: jobs done for more than 30 days, but none that failed, waits or was cancelled', async () => {
    for (const state of ['done', 'failed', 'cancelled', 'waiting', 'paused']) await aJob('old', state)
    context.clock.pass(day)
    await aJob('newer', 'done')
    await tidy(context)
    expect(await jobs()).toContain('old done')
    context.clock.pass(29.5 * day)
    await tidy(context)
    expect(await jobs()).toEqual(['old failed', 'old cancelled', 'old waiting', 'old paused', 'newer done'])
    context.clock.pass(0.9 * day)
    await tidy(context)
    expect(await jobs()).toContain('newer done')
    context.clock.pass(0.2 * day)
    await tidy(context)
    expect(await jobs()).not.toContain('newer done')
  })

  it('goes on after the clock was set back', async () => {
    await tidy(context)
    context.clock.moveTo(Date.parse('2026-01-01T00:00:00Z'))
    await aJob('old', 'done')
    context.clock.pass(31 * day)
    await tidy(context)
    expect(await jobs()).toEqual([])
  })

  it('includes addresses not asked for since their feed looked back to them, and 60 days more', async () => {
    const feed = await aFeed(context, await aPerson(context))
    context.env.pullAllowPrivate = true
    await keepPull(context, await aPerson(context), feed.id, pullSettings.parse({ address: 'http://127.0.0.1:9/{yyyy}{MM}{dd}.nc', lookBackDays: 10 }))
    const remember = (address: string) =>
      context.db.write((tx) =>
        keepPulledAddress(context.db, tx, { feedId: feed.id, address, etag: null, lastModified: null, checksum: 'c', fileId: null, askedAt: context.clock.now() }),
      )
    await remember('a')
    context.clock.pass(2 * day)
    await remember('b')
    context.clock.pass(67.9 * day)
    await tidy(context)
    expect(await addresses()).toEqual(['a', 'b'])
    context.clock.pass(1.2 * day)
    await tidy(context)
    expect(await addresses()).toEqual(['b'])
  })
})
