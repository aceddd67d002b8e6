import { ageText } from '../../shared/figure-text'

/** How old something is, in as few words as tell it: "14 min", "14 h", "9 d". */
export function ageWords(hours: number): string {
  return ageText(Math.max(0, hours))
}

export function hoursSince(instant: string, now: number): number {
  return (now - Date.parse(instant)) / 3_600_000
}
