import { useCallback, useSyncExternalStore } from 'react'

function useMedia(query: string): boolean {
  const subscribe = useCallback(
    (listener: () => void) => {
      const list = window.matchMedia?.(query)
      list?.addEventListener('change', listener)
      return () => list?.removeEventListener('change', listener)
    },
    [query],
  )
  return useSyncExternalStore(subscribe, () => window.matchMedia?.(query).matches ?? true)
}

/** True from the width where a page is more than one column of a phone. */
export function useWide(): boolean {
  return useMedia('(min-width: 45rem)')
}

/** True at the width of a desk. */
export function useDesk(): boolean {
  return useMedia('(min-width: 73rem)')
}
