import { useEffect, useRef } from 'react'

export type KeyCommands = Readonly<Record<string, (event: KeyboardEvent) => void>>

const lettersOffKey = 'halfsplit-letters-off'

export function readLettersOff(): boolean {
  try {
    return localStorage.getItem(lettersOffKey) === '1'
  } catch {
    return false
  }
}

export function setLettersOff(off: boolean): void {
  try {
    if (off) localStorage.setItem(lettersOffKey, '1')
    else localStorage.removeItem(lettersOffKey)
  } catch {
    // Storage refused: the choice holds for nothing, the letters stay on.
  }
}

/**
 * Runs the command of a key: "m", "Escape", "ctrl+z", "ctrl+shift+z". Not while something else has a use for the
 * key: a field, a list of choices, an open dialog. Single letters can be switched off; digits are typing.
 */
export function useKeyCommands(commands: KeyCommands, { enabled = true }: { enabled?: boolean } = {}): void {
  const latest = useRef(commands)
  useEffect(() => {
    latest.current = commands
  })
  useEffect(() => {
    if (!enabled) return
    const run = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.altKey || isTaken(event)) return
      const name = keyName(event)
      if (/^[a-z?[\]/+-]$/i.test(name) && readLettersOff()) return
      const command = latest.current[name]
      if (!command) return
      event.preventDefault()
      command(event)
    }
    document.addEventListener('keydown', run)
    return () => document.removeEventListener('keydown', run)
  }, [enabled])
}

/** Letters in lower case, so that a caps lock changes nothing. */
export function keyName(event: Pick<KeyboardEvent, 'key' | 'ctrlKey' | 'metaKey' | 'shiftKey'>): string {
  const key = event.key.length === 1 ? event.key.toLowerCase() : event.key
  if (!event.ctrlKey && !event.metaKey) return key
  return `ctrl+${event.shiftKey ? 'shift+' : ''}${key}`
}

function isTaken(event: KeyboardEvent): boolean {
  const target = event.target
  if (!(target instanceof HTMLElement)) return false
  if (document.querySelector('dialog[open]')) return true
  if (target.closest('textarea, select, [contenteditable="true"]')) return true
  const field = target.closest('input')
  if (!field) {
    // A focused button is pressed by Enter and the space bar.
    return Boolean(target.closest('button, a, summary')) && (event.key === 'Enter' || event.key === ' ')
  }
  if (field.type === 'radio' || field.type === 'checkbox')
    return event.key.startsWith('Arrow') || event.key === ' '
  // The meter's window holds figures and stays in focus from reading to reading; empty, it has nothing to undo.
  if (field.hasAttribute('data-meter-window'))
    return !(keyName(event) === 'n' || (field.value === '' && /^ctrl[+](shift[+])?z$/.test(keyName(event))))
  return true
}
