import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import { enqueueJob, takeJob, type JobKind } from '../../../server/jobs/queue'
import { runNextJob } from '../../../server/jobs/run-job'
import { voidLeases } from '../../../server/jobs/void-leases'
import { aFeed, aPerson, aRegion, cleanSea, seaFile, send } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
})
afterEach(() => context.close())
afterAll(cleanSea)

const jobs = async () => (await context.models.jobs.findAll({ order: [['id', 'ASC']] })).map(({ kind, state, lastError }) => ({ kind, state, lastError }))

async function queue(kind: JobKind): Promise<void> {
  await context.db.write((tx) => enqueueJob(context, tx, { kind, key: '1', subject: '', payload: {}, priority: 30 }))
}

/** The process is killed while it works on the next job; the one that follows starts. */
async function endDuringNext(done = 0): Promise<void> {
  const job = await takeJob(context, 'a process that was killed', 'road')
  if (job && done > 0) await job.update({ done })
  await voidLeases(context)
}

describe('a job during which the process ended', () => {
  it('is done again from where it was', async () => {
    await queue('judge-region')
    await endDuringNext()
    await endDuringNext()
    expect(await jobs()).toEqual([{ kind: 'judge-region', state: 'waiting', lastError: null }])
  })

  it('three times is failed, and the next one has its turn', async () => {
    await queue('backfill-region')
    for (let turn = 0; turn < 3; turn++) await endDuringNext()
    await endDuringNext()
    expect(await jobs()).toEqual([{ kind: 'backfill-region', state: 'failed', lastError: 'This job ended Offing 3 times, so it was given up.' }])
    await queue('backfill-region')
    expect((await jobs()).map(({ state }) => state)).toEqual(['failed', 'waiting'])
  })

  it('is not given up while it gets further each time', async () => {
    await queue('backfill-region')
    for (let turn = 1; turn <= 6; turn++) await endDuringNext(turn)
    expect((await jobs())[0]!.state).toBe('waiting')
    await endDuringNext(6)
    await endDuringNext(6)
    expect((await jobs())[0]!.state).toBe('failed')
  })

  it('does not start anew by being queued again meanwhile', async () => {
    await queue('judge-region')
    for (let turn = 0; turn < 3; turn++) {
      const running = await takeJob(context, 'a process that was killed', 'road')
      expect(running).not.toBeNull()
      await queue('judge-region')
      await voidLeases(context)
    }
    expect((await jobs()).map(({ state }) => state)).toEqual(['cancelled', 'cancelled', 'failed', 'waiting'])
  })

  it('is refused when it read a file; the files after it are read', async () => {
    const person = await aPerson(context)
    await aFeed(context, person)
    await aRegion(context, person)
    while (await runNextJob(context));
    const deadly = await send(context, await seaFile([{ at: '2026-06-10T12:00:00Z', value: 2 }]))
    const good = await send(context, await seaFile([{ at: '2026-06-11T12:00:00Z', value: 3 }]))
    for (let turn = 0; turn < 3; turn++) await endDuringNext()
    await deadly.reload()
    expect(deadly).toMatchObject({ status: 'refused', refusal: { code: 'reading-ended', message: 'Reading this file ended Offing 3 times, so it was given up.' } })
    while (await runNextJob(context));
    await good.reload()
    expect(good.status).toBe('processed')
  })
})
