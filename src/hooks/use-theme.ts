import { useSyncExternalStore } from 'react'

export type Theme = 'light' | 'night'
export type ThemeChoice = Theme | 'system'

const key = 'offing.theme'
const listeners = new Set<() => void>()

function chosen(): ThemeChoice {
  const stored = localStorage.getItem(key)
  return stored === 'light' || stored === 'night' ? stored : 'system'
}

function systemTheme(): Theme {
  return window.matchMedia?.('(prefers-color-scheme: dark)').matches ? 'night' : 'light'
}

function current(): Theme {
  const choice = chosen()
  return choice === 'system' ? systemTheme() : choice
}

function apply(): void {
  document.documentElement.dataset['theme'] = current()
  listeners.forEach((listener) => listener())
}

/** Called once before the first screen is drawn. */
export function startTheme(): void {
  apply()
  window.matchMedia?.('(prefers-color-scheme: dark)').addEventListener('change', apply)
  window.addEventListener('storage', apply)
}

export function chooseTheme(choice: ThemeChoice): void {
  if (choice === 'system') localStorage.removeItem(key)
  else localStorage.setItem(key, choice)
  apply()
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

/** The theme on screen: canvases and map tiles need to know it, everything else reads CSS variables. */
export function useTheme(): Theme {
  return useSyncExternalStore(subscribe, current)
}

export function useThemeChoice(): ThemeChoice {
  return useSyncExternalStore(subscribe, chosen)
}
