import Link from 'next/link'
import type { ComponentProps } from 'react'
import { classNames } from './class-names'

export interface ButtonLook {
  /** Filled: the one thing to do here. Plain: everything else. Text: an underlined word in a row or a head. */
  look?: 'filled' | 'plain' | 'text'
  /** Control: 44 px. Bay: 52 px, for what is pressed with gloves on. */
  size?: 'control' | 'bay'
}

export function buttonClass({ look = 'plain', size = 'control' }: ButtonLook): string {
  return classNames(
    'inline-flex items-center justify-center gap-2 font-bold text-body no-underline select-none',
    'transition-colors duration-press disabled:text-ink-3 disabled:cursor-not-allowed',
    size === 'bay' ? 'min-h-bay min-w-bay' : 'min-h-target min-w-target',
    look === 'text'
      ? 'underline decoration-[1.5px] underline-offset-4 px-1'
      : 'rounded-field border-control px-4 py-1',
    look === 'filled' &&
      'border-ink bg-ink text-on-ink hover:bg-ink-2 hover:border-ink-2 disabled:border-edge disabled:bg-panel',
    look === 'plain' && 'border-edge bg-window text-ink hover:border-ink disabled:bg-panel',
  )
}

export function Button({
  look,
  size,
  className,
  type = 'button',
  ...rest
}: ComponentProps<'button'> & ButtonLook) {
  return <button type={type} className={classNames(buttonClass({ look, size }), className)} {...rest} />
}

/** A link that looks like the button it stands in for. */
export function ButtonLink({ look, size, className, ...rest }: ComponentProps<typeof Link> & ButtonLook) {
  return <Link className={classNames(buttonClass({ look, size }), className)} {...rest} />
}
