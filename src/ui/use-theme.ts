import { useSyncExternalStore } from 'react'

export type Theme = 'day' | 'dusk' | 'darkroom'
export type Level = 1 | 2 | 3
export type ThemeChoice = { theme: Theme; level: Level }

/** index.html reads the same key before the first paint. */
const storageKey = 'halfsilver-theme'
const listeners = new Set<() => void>()

function readFromDocument(): ThemeChoice {
  const { theme, level } = document.documentElement.dataset
  return {
    theme: theme === 'dusk' || theme === 'darkroom' ? theme : 'day',
    level: level === '1' ? 1 : level === '3' ? 3 : 2,
  }
}

let current: ThemeChoice | null = null

/** The choice as it stands; the same object until it changes, as useSyncExternalStore needs. */
function snapshot(): ThemeChoice {
  current ??= readFromDocument()
  return current
}

/** Sets the light of the screen now and for the next visit. Storage may be refused; then it holds for this page only. */
export function chooseTheme(choice: ThemeChoice): void {
  current = choice
  const root = document.documentElement
  root.dataset.theme = choice.theme
  root.dataset.level = String(choice.level)
  // The start-up script painted the ground by hand, before there was a style sheet.
  root.style.removeProperty('background-color')
  const ground = getComputedStyle(root).getPropertyValue('--hs-table').trim()
  if (ground) document.querySelector('meta[name=theme-color]')?.setAttribute('content', ground)
  try {
    localStorage.setItem(storageKey, JSON.stringify(choice))
  } catch {
    // Private windows may refuse storage; the choice still holds on this page.
  }
  for (const listener of listeners) listener()
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

/** The light of the screen: theme, dark-room level, and how to change them. */
export function useTheme(): ThemeChoice & {
  setTheme: (theme: Theme) => void
  setLevel: (level: Level) => void
} {
  const choice = useSyncExternalStore(subscribe, snapshot)
  return {
    ...choice,
    setTheme: (theme) => chooseTheme({ ...snapshot(), theme }),
    setLevel: (level) => chooseTheme({ ...snapshot(), level }),
  }
}
