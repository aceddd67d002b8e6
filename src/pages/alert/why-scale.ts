const steps = [1, 3]

/** A log range with a 1 or a 3 at each end that holds every figure with room for its words beside it; undefined without figures. */
export function whyRange(figures: readonly (number | null)[]): { from: number; to: number; labels: number[] } | undefined {
  const positive = figures.filter((figure): figure is number => figure !== null && figure > 0)
  if (positive.length === 0) return undefined
  const low = Math.min(...positive) / 1.6
  const high = Math.max(...positive) * 2.2
  const marks = marksBetween(Math.floor(Math.log10(low)) - 1, Math.ceil(Math.log10(high)) + 1)
  const from = marks.findLast((mark) => mark <= low) ?? low
  const to = marks.find((mark) => mark >= high) ?? high
  return { from, to, labels: marks.filter((mark) => mark >= from && mark <= to) }
}

/** 1-2-3 to 9 within each decade, inked and paper in turn. */
export function decadeSegments(from: number, to: number): { from: number; to: number; inked: boolean }[] {
  const segments: { from: number; to: number; inked: boolean }[] = []
  for (let power = Math.floor(Math.log10(from)); power <= Math.ceil(Math.log10(to)); power++) {
    for (let digit = 1; digit <= 9; digit++) {
      const start = Number(`${digit}e${power}`)
      const end = Number(`${digit + 1}e${power}`)
      if (end > from * 1.0001 && start < to * 0.9999) segments.push({ from: Math.max(from, start), to: Math.min(to, end), inked: digit % 2 === 1 })
    }
  }
  return segments
}

function marksBetween(first: number, last: number): number[] {
  return Array.from({ length: last - first + 1 }, (_, k) => first + k).flatMap((power) => steps.map((step) => Number(`${step}e${power}`)))
}
