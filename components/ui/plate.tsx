import type { ComponentProps } from 'react'
import { classNames } from './class-names'

/** A small bordered plate: a code, a reading's number, a state. */
export function Plate({
  look = 'plain',
  figures = true,
  className,
  ...rest
}: ComponentProps<'span'> & {
  /** Inverted: a number or the next target. Dashed: provisional, such as offline. */
  look?: 'plain' | 'inverted' | 'dashed'
  /** Codes and values in the figures' face; words in the text face. */
  figures?: boolean
}) {
  return (
    <span
      className={classNames(
        'inline-flex items-center gap-2 rounded-plate px-2 py-0.5 text-dense font-bold whitespace-nowrap',
        figures && 'figures',
        look === 'inverted' ? 'bg-ink text-on-ink border-control border-ink' : 'bg-window text-ink',
        look === 'plain' && 'border-control border-edge',
        look === 'dashed' && 'border-control border-dashed border-ink',
        className,
      )}
      {...rest}
    />
  )
}
