'use client'

import { type ReactNode, useId } from 'react'
import { classNames } from './class-names'

export interface ChoiceOption<Value extends string> {
  value: Value
  label: ReactNode
  /** Spoken instead of the label where the label alone is not enough. */
  spoken?: string
  disabled?: boolean
}

/**
 * Two to four joined buttons, all visible; one is pressed. Native radio buttons underneath, so arrow keys
 * and screen readers work as everywhere.
 */
export function Choice<Value extends string>({
  label,
  showLabel = false,
  options,
  value,
  onChange,
  size = 'control',
  fill = false,
  tight = false,
  className,
}: {
  label: string
  showLabel?: boolean
  options: readonly ChoiceOption<Value>[]
  value: Value | null
  onChange: (value: Value) => void
  size?: 'control' | 'bay'
  /** Takes the width it is given, in equal parts. */
  fill?: boolean
  /** Little room beside the words, where five stand in a row. */
  tight?: boolean
  className?: string
}) {
  const name = useId()
  return (
    <fieldset className={classNames('flex items-center gap-3 min-w-0', fill && 'w-full', className)}>
      <legend className={showLabel ? 'contents' : 'sr-only'}>
        <span className="text-body font-bold">{label}</span>
      </legend>
      <div
        className={classNames(
          'flex rounded-field border-control border-edge bg-window overflow-clip has-[:focus-visible]:overflow-visible',
          fill && 'w-full',
        )}
      >
        {options.map((option, index) => (
          <label
            key={option.value}
            htmlFor={`${name}-${option.value}`}
            className={classNames(
              'focus-ring relative flex items-center justify-center font-bold text-body text-center select-none',
              'transition-colors duration-press has-[:focus-visible]:z-marks has-[:focus-visible]:rounded-field',
              tight ? 'px-2' : 'px-4',
              fill ? 'flex-1' : 'flex-auto whitespace-nowrap',
              size === 'bay' ? 'min-h-bay min-w-bay' : 'min-h-target min-w-target',
              index > 0 && 'border-l border-line',
              option.disabled && 'text-ink-3',
              value === option.value ? 'bg-ink text-on-ink' : !option.disabled && 'hover:bg-panel',
            )}
          >
            <input
              id={`${name}-${option.value}`}
              type="radio"
              name={name}
              value={option.value}
              checked={value === option.value}
              disabled={option.disabled}
              aria-label={option.spoken}
              onChange={() => onChange(option.value)}
              className="absolute inset-0 opacity-0 cursor-pointer disabled:cursor-not-allowed"
            />
            {option.label}
          </label>
        ))}
      </div>
    </fieldset>
  )
}
