'use client'

import { Erase } from '../../ui/glyphs'
import { classNames } from '../../ui/class-names'

const digits = ['7', '8', '9', '4', '5', '6', '1', '2', '3', '0', '.'] as const
const places = [
  'col-start-1 row-start-1',
  'col-start-2 row-start-1',
  'col-start-3 row-start-1',
  'col-start-1 row-start-2',
  'col-start-2 row-start-2',
  'col-start-3 row-start-2',
  'col-start-1 row-start-3',
  'col-start-2 row-start-3',
  'col-start-3 row-start-3',
  'col-start-1 row-start-4',
  'col-start-2 row-start-4',
] as const

const key =
  'flex items-center justify-center rounded-field border-control border-edge font-bold select-none ' +
  'min-h-14 max-tablet:min-h-key transition-colors duration-press active:bg-ink active:text-on-ink hover:border-ink'

/** Digits, OL, sign, take back, and the key that logs the reading. */
export function Keypad({
  onPress,
  onEnter,
  enterLabel = 'Enter reading',
}: {
  onPress: (key: string) => void
  onEnter: () => void
  enterLabel?: string
}) {
  return (
    <div role="group" aria-label="Keys" className="grid flex-1 grid-cols-4 grid-rows-4 gap-2">
      {digits.map((digit, index) => (
        <button
          key={digit}
          type="button"
          aria-label={digit === '.' ? 'point' : digit}
          onClick={() => onPress(digit)}
          className={classNames(key, 'text-title bg-window', places[index])}
        >
          {digit}
        </button>
      ))}
      <button
        type="button"
        aria-label="Take the last digit back"
        onClick={() => onPress('erase')}
        className={classNames(key, 'col-start-3 row-start-4 bg-panel')}
      >
        <Erase size={28} />
      </button>
      <button
        type="button"
        aria-label="OL, out of range"
        onClick={() => onPress('OL')}
        className={classNames(key, 'col-start-4 row-start-1 bg-panel text-lead')}
      >
        OL
      </button>
      <button
        type="button"
        aria-label="Change the sign"
        onClick={() => onPress('sign')}
        className={classNames(key, 'col-start-4 row-start-2 bg-panel text-lead')}
      >
        +/-
      </button>
      <button
        type="button"
        onClick={onEnter}
        className={classNames(
          key,
          'col-start-4 row-span-2 row-start-3 border-ink bg-ink text-lead leading-tight text-on-ink hover:bg-ink-2',
        )}
      >
        {enterLabel}
      </button>
    </div>
  )
}
