import type { Store } from './kept-changes'

/** `localStorage`, or memory where the browser refuses it (then a reload may lose what was not sent). */
export function tabletStore(): Store {
  try {
    const probe = 'halfsplit.probe'
    localStorage.setItem(probe, '1')
    localStorage.removeItem(probe)
    return localStorage
  } catch {
    const kept = new Map<string, string>()
    return {
      getItem: (key) => kept.get(key) ?? null,
      setItem: (key, value) => void kept.set(key, value),
      removeItem: (key) => void kept.delete(key),
    }
  }
}
