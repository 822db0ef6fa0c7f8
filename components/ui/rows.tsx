import type { ComponentProps } from 'react'
import { classNames } from './class-names'

/** Ruled table: 2 px rule under the head, 1 px under each row, no stripes and no boxes. */
export function Table({ className, ...rest }: ComponentProps<'table'>) {
  return <table className={classNames('w-full border-collapse text-dense', className)} {...rest} />
}

export function HeadCell({
  className,
  number = false,
  ...rest
}: ComponentProps<'th'> & { number?: boolean }) {
  return (
    <th
      scope="col"
      className={classNames(
        'border-b-2 border-ink py-2 pr-4 align-bottom text-[0.84375rem] font-bold text-ink-2',
        number ? 'text-right' : 'text-left',
        className,
      )}
      {...rest}
    />
  )
}

export function Row({ className, picked = false, ...rest }: ComponentProps<'tr'> & { picked?: boolean }) {
  return (
    <tr
      className={classNames('border-b border-line', picked && 'bg-ink text-on-ink', className)}
      aria-selected={picked || undefined}
      {...rest}
    />
  )
}

export function Cell({ className, number = false, ...rest }: ComponentProps<'td'> & { number?: boolean }) {
  return (
    <td className={classNames('h-target py-2 pr-4', number && 'figures text-right', className)} {...rest} />
  )
}
