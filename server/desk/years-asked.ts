import { ApiError } from '../api-error'

/** "2016-2025" or "2016,2018,2020-2022" as a set of years. */
export function yearsAsked(text: string): Set<number> {
  const years = new Set<number>()
  for (const part of text.split(',').map((piece) => piece.trim())) {
    const found = /^(\d{4})(?:-(\d{4}))?$/.exec(part)
    const [from, to] = [Number(found?.[1]), Number(found?.[2] ?? found?.[1])]
    if (!found || to < from || to - from > 200) throw new ApiError('not-valid', `Years are written like 2016-2025 or 2016,2018; "${part}" is not.`)
    for (let year = from; year <= to; year++) years.add(year)
  }
  return years
}
