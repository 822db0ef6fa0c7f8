import type { ReactNode } from 'react'
import { classNames } from './class-names'
import { Triangle } from './glyphs'

/**
 * A full-width band: what happened, what is safe, what to do. Errors and refusals interrupt a screen reader,
 * the other kinds wait their turn.
 */
export function Band({
  kind = 'error',
  title,
  children,
  actions,
  className,
}: {
  kind?: 'error' | 'caution' | 'conflict' | 'note'
  title: ReactNode
  children?: ReactNode
  actions?: ReactNode
  className?: string
}) {
  return (
    <div
      role={kind === 'error' ? 'alert' : 'status'}
      className={classNames(
        'flex flex-wrap items-start gap-x-4 gap-y-3 bg-window text-ink border-area border-ink p-3 tablet:px-4',
        kind === 'note' && 'border-dashed',
        className,
      )}
    >
      {kind !== 'note' && <Triangle size={24} className="mt-0.5" />}
      <div className="min-w-0 flex-1 basis-60">
        <p className="text-body font-bold">{title}</p>
        {children && <div className="mt-1 text-body text-ink-2">{children}</div>}
      </div>
      {actions && <div className="flex flex-wrap gap-2">{actions}</div>}
    </div>
  )
}
