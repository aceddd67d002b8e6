import type { Clock } from '../../server/clock'

/** A clock whose machine time a test may push forward, for sessions, links and retries. */
export interface TestClock extends Clock {
  pass(ms: number): void
}

export function createTestClock(at?: Date): TestClock {
  let passed = 0
  let offset = at ? at.getTime() - Date.now() : 0
  const system = () => Date.now() + passed
  return {
    system,
    now: () => system() + offset,
    moveTo: (instant) => {
      offset = instant - system()
    },
    offset: () => offset,
    setOffset: (ms) => {
      offset = ms
    },
    pass: (ms) => {
      passed += ms
    },
  }
}
