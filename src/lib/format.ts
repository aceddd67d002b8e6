import { compassPoint } from '../../shared/compass'
import { figureText, percentText, timesText } from '../../shared/figure-text'

/** Three significant digits, as in the letters, with the thousands apart. */
export function threeDigits(value: number): string {
  return Math.abs(value) < 1000 ? figureText(value).replace('-', '−') : grouped(Number(value.toPrecision(3)))
}

/** Two significant digits. */
export function timesUsual(value: number): string {
  return timesText(value)
}

/** A share 0..1 as whole per cent. */
export function percent(share: number): string {
  return percentText(share)
}

/** A chlorophyll or other value with the digits it deserves; undefined where it is missing. */
export function figure(value: number | null | undefined): string | undefined {
  return value == null ? undefined : threeDigits(value)
}

export function grouped(whole: number): string {
  return String(whole).replace(/\B(?=(\d{3})+(?!\d))/g, '\u202f')
}

export function megabytes(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`
  if (bytes < 999_500) return `${figureText(bytes / 1000)} kB`
  return `${figureText(bytes / 1e6)} MB`
}

/** A checksum short enough to compare by eye: "9f2c 41d0 … 77ab". */
export function shortChecksum(checksum: string): string {
  return `${checksum.slice(0, 4)} ${checksum.slice(4, 8)} … ${checksum.slice(-4)}`
}

export function degrees(value: number, axis: 'latitude' | 'longitude'): string {
  const minutes = Math.round(Math.abs(axis === 'longitude' ? wrapLongitude(value) : value) * 60)
  const whole = Math.floor(minutes / 60)
  const rest = minutes % 60
  const half = minutes === 0 || whole === 180 ? '' : halfWord(value, axis)
  return `${whole}°${rest ? `${String(rest).padStart(2, '0')}′` : ''}${half}`
}

/** "256° WSW": three digits and the compass point. */
export function bearing(degreesFromNorth: number): string {
  const turned = ((degreesFromNorth % 360) + 360) % 360
  const whole = Math.round(turned) % 360
  return `${String(whole).padStart(3, '0')}° ${compassPoint(turned)}`
}

export function countWords(count: number, one: string, many = `${one}s`): string {
  return `${grouped(count)} ${count === 1 ? one : many}`
}

const words = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine', 'Ten', 'Eleven', 'Twelve']

/** A count that begins a sentence: in words up to twelve. */
export function countAtHead(count: number): string {
  return words[count] ?? grouped(count)
}

function wrapLongitude(value: number): number {
  return ((((value + 180) % 360) + 360) % 360) - 180
}

function halfWord(value: number, axis: 'latitude' | 'longitude'): string {
  if (axis === 'latitude') return value < 0 ? 'S' : 'N'
  return wrapLongitude(value) < 0 ? 'W' : 'E'
}
