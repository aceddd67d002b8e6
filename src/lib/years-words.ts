/** "2016 to 2025" when they follow each other, else each run of them. */
export function yearsWords(years: readonly number[]): string {
  const sorted = [...years].sort((a, b) => a - b)
  const runs: [number, number][] = []
  for (const year of sorted) {
    const run = runs.at(-1)
    if (run && year - run[1] <= 1) run[1] = year
    else runs.push([year, year])
  }
  return runs.map(([first, last]) => (first === last ? String(first) : `${first} to ${last}`)).join(', ')
}
