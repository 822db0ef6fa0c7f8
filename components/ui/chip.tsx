import type { ComponentProps, ReactNode } from 'react'
import { classNames } from './class-names'

/** A condition as a chip that says name and position: "Key on". Pressing it changes the position. */
export function Chip({
  name,
  position,
  className,
  ...rest
}: Omit<ComponentProps<'button'>, 'name'> & { name: ReactNode; position: ReactNode }) {
  return (
    <button
      type="button"
      className={classNames(
        'inline-flex min-h-target tablet:min-h-12 items-center gap-2 rounded-full border-control border-edge bg-window px-4',
        'text-body font-semibold text-ink transition-colors duration-press hover:border-ink disabled:text-ink-3',
        className,
      )}
      {...rest}
    >
      <span>{name}</span> <span className="font-extrabold">{position}</span>
    </button>
  )
}
