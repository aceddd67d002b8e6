import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { createLane, type Lane, ThreadEnded, TookTooLong } from '../../../server/workers/lane'

interface Answer {
  thread: number
  spent: boolean
}

let folder: string
let module: string
let lane: Lane<Answer>
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-lane-'))
  module = join(folder, 'thread.mjs')
  await writeFile(
    module,
    `import { threadId } from 'node:worker_threads'
     export default (call) => {
       if (call === 'end') process.exit(3)
       if (call === 'throw later') setTimeout(() => { throw new Error('out of turn') }, 0)
       if (call === 'spin') for (;;);
       return { thread: threadId, spent: call === 'spend' }
     }`,
  )
})
afterEach(() => lane.close())
afterAll(() => rm(folder, { recursive: true }))

const begin = () => (lane = createLane<Answer>(module, (answer) => answer.spent, 'go'))
const ask = (call: string, seconds = 30, signal?: AbortSignal) => lane.run(call, { seconds, signal })

describe('a lane of tasks', () => {
  it('keeps its thread from task to task', async () => {
    begin()
    const [first, second] = await Promise.all([ask('go'), ask('go')])
    expect(second.thread).toBe(first.thread)
  })

  it('replaces a spent thread before the next task', async () => {
    begin()
    const [spent, next, after] = await Promise.all([ask('spend'), ask('go'), ask('go')])
    expect(next.thread).not.toBe(spent.thread)
    expect(after.thread).toBe(next.thread)
  })

  it('ends a task that takes too long, and does the next one in a new thread', async () => {
    begin()
    const { thread } = await ask('go')
    const [late, next] = await Promise.allSettled([ask('spin', 0.2), ask('go')])
    expect(late).toMatchObject({ status: 'rejected', reason: expect.any(TookTooLong) })
    expect(next).toMatchObject({ status: 'fulfilled', value: { spent: false } })
    expect(next.status === 'fulfilled' && next.value.thread).not.toBe(thread)
  })

  it('says when a thread ended itself, and goes on with the next task', async () => {
    begin()
    const [ended, next] = await Promise.allSettled([ask('end'), ask('go')])
    expect(ended).toMatchObject({ status: 'rejected', reason: expect.any(ThreadEnded) })
    expect(next.status).toBe('fulfilled')
  })

  it('says what is wrong with a module that does not load, and blames no task for it', async () => {
    lane = createLane<Answer>(join(folder, 'no-such-module.mjs'), () => false, 'go')
    const error: unknown = await ask('go').catch((reason: unknown) => reason)
    expect(error).not.toBeInstanceOf(ThreadEnded)
    expect((error as Error).message).toContain('no-such-module')
  })

  it('survives a thread that fails between tasks', async () => {
    begin()
    const { thread } = await ask('throw later')
    let next = await ask('go').catch(() => null)
    next ??= await ask('go')
    expect(next.thread).toBeGreaterThanOrEqual(thread)
  })

  it('ends a task whose caller no longer wants it, and never begins one that was given up while it waited', async () => {
    begin()
    const [running, waiting] = [new AbortController(), new AbortController()]
    const both = Promise.allSettled([ask('spin', 30, running.signal), ask('end', 30, waiting.signal), ask('go')])
    waiting.abort()
    running.abort()
    const [first, second, third] = await both
    expect(first.status === 'rejected' && (first.reason as Error).name).toBe('AbortError')
    expect(second.status === 'rejected' && (second.reason as Error).name).toBe('AbortError')
    expect(third.status).toBe('fulfilled')
  })
})
