/** The only place that asks the machine for the time. Business time may be moved (demo, tests); system time may not. */
export interface Clock {
  /** Business time, epoch milliseconds. */
  now(): number
  /** Machine time, for leases, sessions and timeouts. */
  system(): number
  /** Moves business time so that it reads `instant` now and runs on from there. */
  moveTo(instant: number): void
  offset(): number
  setOffset(ms: number): void
}

export function createClock(initialOffset = 0): Clock {
  let offset = initialOffset
  return {
    now: () => Date.now() + offset,
    system: () => Date.now(),
    moveTo: (instant) => {
      offset = instant - Date.now()
    },
    offset: () => offset,
    setOffset: (ms) => {
      offset = ms
    },
  }
}
