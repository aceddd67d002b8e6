/** How old something is, in as few words as tell it: "14 min", "14 h", "9 d". */
export function ageWords(hours: number): string {
  if (hours < 0) return '0 min'
  if (hours < 1) return `${Math.floor(hours * 60)} min`
  if (hours < 48) return `${Math.floor(hours)} h`
  const days = Math.floor(hours / 24)
  return days < 1000 ? `${days} d` : `${Math.floor(days / 365.25)} y`
}

export function hoursSince(instant: string, now: number): number {
  return (now - Date.parse(instant)) / 3_600_000
}
