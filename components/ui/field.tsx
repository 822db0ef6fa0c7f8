'use client'

import { type ComponentProps, type ReactNode, useId } from 'react'
import { classNames } from './class-names'
import { Triangle } from './glyphs'

/** The box of a field: label above inside it, the value large, the unit outside the number. */
export function FieldBox({
  label,
  htmlFor,
  unit,
  used = false,
  wrong = false,
  tall = false,
  children,
}: {
  label: ReactNode
  htmlFor?: string
  unit?: ReactNode
  /** A finder in use: 2 px ink border. */
  used?: boolean
  wrong?: boolean
  /** For a large value, as in a finder: 62 px. */
  tall?: boolean
  children: ReactNode
}) {
  return (
    <div
      className={classNames(
        'focus-ring relative flex flex-col justify-center rounded-field bg-window px-3 py-1.5',
        tall ? 'min-h-[3.875rem]' : 'min-h-bay',
        used || wrong
          ? 'border-area border-ink'
          : 'border-control border-edge m-px hover:border-ink transition-colors duration-press',
      )}
    >
      <label htmlFor={htmlFor} className="text-note text-ink-2">
        {label}
      </label>
      <span className="flex items-baseline gap-2">
        {children}
        {unit && <span className="text-body font-bold text-ink-2">{unit}</span>}
      </span>
    </div>
  )
}

/** Stands under a field that was refused. */
export function FieldMessage({ id, children }: { id: string; children: ReactNode }) {
  return (
    <p id={id} className="mt-1.5 flex items-start gap-2 text-small font-semibold">
      <Triangle size={18} className="mt-px" />
      <span>{children}</span>
    </p>
  )
}

export const fieldValueClass =
  'w-full min-w-0 bg-transparent text-body font-bold text-ink outline-none placeholder:font-normal'

export function Field({
  label,
  hint,
  error,
  unit,
  used,
  tall,
  figures = false,
  className,
  inputClassName,
  id,
  ...rest
}: ComponentProps<'input'> & {
  label: ReactNode
  hint?: ReactNode
  error?: ReactNode
  unit?: ReactNode
  used?: boolean
  tall?: boolean
  figures?: boolean
  inputClassName?: string
}) {
  const own = useId()
  const inputId = id ?? own
  const describedBy = [error ? `${inputId}-error` : '', hint && !error ? `${inputId}-hint` : '']
    .filter(Boolean)
    .join(' ')
  return (
    <div className={className}>
      <FieldBox label={label} htmlFor={inputId} unit={unit} used={used} tall={tall} wrong={Boolean(error)}>
        <input
          id={inputId}
          aria-invalid={error ? true : undefined}
          aria-describedby={describedBy || undefined}
          className={classNames(fieldValueClass, figures && 'figures', inputClassName)}
          {...rest}
        />
      </FieldBox>
      {error && <FieldMessage id={`${inputId}-error`}>{error}</FieldMessage>}
      {hint && !error && (
        <p id={`${inputId}-hint`} className="mt-1.5 text-small text-ink-2">
          {hint}
        </p>
      )}
    </div>
  )
}

export function TextArea({
  label,
  hint,
  error,
  figures = false,
  className,
  id,
  ...rest
}: ComponentProps<'textarea'> & {
  label: ReactNode
  hint?: ReactNode
  error?: ReactNode
  figures?: boolean
}) {
  const own = useId()
  const inputId = id ?? own
  const describedBy = [error ? `${inputId}-error` : '', hint && !error ? `${inputId}-hint` : '']
    .filter(Boolean)
    .join(' ')
  return (
    <div className={className}>
      <FieldBox label={label} htmlFor={inputId} wrong={Boolean(error)}>
        <textarea
          id={inputId}
          aria-invalid={error ? true : undefined}
          aria-describedby={describedBy || undefined}
          className={classNames(fieldValueClass, 'resize-y', figures && 'figures font-normal')}
          {...rest}
        />
      </FieldBox>
      {error && <FieldMessage id={`${inputId}-error`}>{error}</FieldMessage>}
      {hint && !error && (
        <p id={`${inputId}-hint`} className="mt-1.5 text-small text-ink-2">
          {hint}
        </p>
      )}
    </div>
  )
}
