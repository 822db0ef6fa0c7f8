/** What a person chose: always light, always dark, or as the device says. */
export const themeChoices = ['device', 'light', 'dark'] as const
export type ThemeChoice = (typeof themeChoices)[number]

export const themeKey = 'halfsplit-theme'

/**
 * Runs in the head, before anything is painted, so that a dark screen never flashes white. Written as text:
 * it must not wait for the bundle. Storage may be refused (private windows); then the device decides.
 */
export const themeScript = `(function(){var m=matchMedia('(prefers-color-scheme: dark)');
function set(){var c=null;try{c=localStorage.getItem('${themeKey}')}catch(e){}
document.documentElement.dataset.theme=c==='light'||c==='dark'?c:m.matches?'dark':'light'}
set();m.addEventListener('change',set);addEventListener('storage',set);addEventListener('${themeKey}',set)})()`

export function readTheme(): ThemeChoice {
  try {
    const stored = localStorage.getItem(themeKey)
    return stored === 'light' || stored === 'dark' ? stored : 'device'
  } catch {
    return 'device'
  }
}

export function chooseTheme(choice: ThemeChoice): void {
  try {
    if (choice === 'device') localStorage.removeItem(themeKey)
    else localStorage.setItem(themeKey, choice)
  } catch {
    // Storage refused: the choice cannot be kept.
  }
  dispatchEvent(new Event(themeKey))
}

export function watchTheme(onChange: () => void): () => void {
  addEventListener('storage', onChange)
  addEventListener(themeKey, onChange)
  return () => {
    removeEventListener('storage', onChange)
    removeEventListener(themeKey, onChange)
  }
}
