import { useState } from 'react'

/** The first value given, however often newer ones come. */
export function useKept<T>(value: T): T {
  const [kept] = useState(value)
  return kept
}
