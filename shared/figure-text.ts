/** A figure with three significant digits, no more: 4.89, 12.3, 0.0512, 130. */
export function figureText(value: number): string {
  if (value === 0) return '0'
  const digits = Math.max(0, 2 - Math.floor(Math.log10(Math.abs(value))))
  const rounded = Number(value.toPrecision(3))
  return Math.abs(rounded) >= 100 ? String(Math.round(rounded)) : String(Number(rounded.toFixed(Math.min(digits, 8))))
}

/** Times usual, two significant digits: 3.4, 12, 0.85. */
export function timesText(value: number): string {
  if (value === 0) return '0'
  const digits = Math.max(0, 1 - Math.floor(Math.log10(Math.abs(value))))
  return Number(value.toPrecision(2)).toFixed(Math.min(digits, 4))
}

/** A share as whole per cent. A little is never shown as nothing, nor nearly all as all. */
export function percentText(share: number): string {
  const percent = share * 100
  if (percent > 0 && percent < 1) return 'under 1 %'
  if (percent < 100 && percent > 99) return '99 %'
  return `${Math.round(percent)} %`
}

/** An age in hours as words: 40 min, 14 h, 9 d. */
export function ageText(hours: number): string {
  if (hours < 0) return 'dated ahead'
  if (hours < 1) return `${Math.max(1, Math.round(hours * 60))} min`
  return hours < 48 ? `${Math.round(hours)} h` : `${Math.round(hours / 24)} d`
}

/** "mg m-3" as people write it: mg m⁻³. */
export function unitWords(unit: string | null | undefined): string {
  if (!unit) return ''
  return unit.replace(/([a-zA-Z])\^?([-−]?\d+)/g, (_, letter: string, power: string) => letter + superscript(power))
}

function superscript(power: string): string {
  return [...power].map((c) => (c === '-' || c === '−' ? '⁻' : '⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(c)] ?? c)).join('')
}
