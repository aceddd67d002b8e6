const stepsMinutes = [1, 2, 5, 10, 20, 30, 60, 120, 300, 600, 900, 1800, 3600]

/** The smallest step, in minutes of arc, that takes at least `leastPx` on the screen. */
export function stepMinutes(pxPerDegree: number, leastPx: number): number {
  return stepsMinutes.find((step) => (step / 60) * pxPerDegree >= leastPx) ?? 3600
}

/** Multiples of a step within a span, in degrees, and whether each begins an inked segment. */
export function stepsWithin(from: number, to: number, minutes: number): { at: number; inked: boolean }[] {
  const step = minutes / 60
  const first = Math.floor(from / step)
  const last = Math.ceil(to / step)
  return Array.from({ length: Math.max(0, last - first) }, (_, k) => ({
    at: (first + k) * step,
    inked: (first + k) % 2 === 0,
  }))
}
