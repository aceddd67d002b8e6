const steps = [1, 2, 5]

/** 1, 2, 5 of every decade between the two values, the ends taken outward to such a step. */
export function logTicks(min: number, max: number): number[] {
  const ticks: number[] = []
  for (let decade = Math.floor(Math.log10(min)) - 1; decade <= Math.ceil(Math.log10(max)); decade += 1) {
    for (const step of steps) ticks.push(Number((step * 10 ** decade).toPrecision(1)))
  }
  const from = Math.max(0, ticks.findLastIndex((tick) => tick <= min))
  const past = ticks.findIndex((tick) => tick >= max)
  return ticks.slice(from, past < 0 ? undefined : past + 1)
}

/** The ticks of one axis where there is room for `room` of them: all, else the decades, else first and last. */
export function thinnedLogTicks(ticks: readonly number[], room: number): number[] {
  if (ticks.length <= room) return [...ticks]
  const decades = ticks.filter((tick) => Number.isInteger(Number(Math.log10(tick).toFixed(6))))
  return decades.length > 1 && decades.length <= room ? decades : [ticks[0], ticks[ticks.length - 1]].filter((t) => t !== undefined)
}
