import { firstDayOf, yearOf, type EpochDay } from '../../../shared/science/local-day'

/** The full calendar years from the first layer to now: from the first 1 January on which there was a feed to the last 31 December gone by. */
export function fullYears(oldest: EpochDay, today: EpochDay): { fromDay: EpochDay; toDay: EpochDay } | null {
  const first = firstDayOf(yearOf(oldest)) === oldest ? yearOf(oldest) : yearOf(oldest) + 1
  const end = yearOf(today)
  return first < end ? { fromDay: firstDayOf(first), toDay: firstDayOf(end) - 1 } : null
}
