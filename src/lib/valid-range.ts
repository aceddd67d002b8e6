import { z } from 'zod'

/** An end of a valid range as typed; empty for none. */
export const rangeEnd = z.number('Give a number, or leave it empty.').nullable()

/** For a form's `register`: what is typed in a box of text as a number, null where it is empty. */
export function typedNumber(typed: unknown): number | null {
  const text = String(typed ?? '').trim()
  return text === '' ? null : Number(text.replace(',', '.'))
}

export function rangeTurned({ validMin, validMax }: { validMin: number | null; validMax: number | null }): boolean {
  return validMin !== null && validMax !== null && validMin > validMax
}
