/** Longest stretch, in days, over which two usable views are joined by a line. */
export const joinedWithinDays = 3

/** Index runs of values that lie no more than `within` steps apart. A missing value never starts or ends a run. */
export function joinedRuns(values: readonly (number | null)[], within = joinedWithinDays): number[][] {
  const runs: number[][] = []
  let run: number[] = []
  for (let i = 0; i < values.length; i += 1) {
    if (values[i] == null) continue
    const last = run[run.length - 1]
    if (last !== undefined && i - last > within) {
      runs.push(run)
      run = []
    }
    run.push(i)
  }
  if (run.length > 0) runs.push(run)
  return runs
}
