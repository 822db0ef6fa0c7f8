'use client'

import { type ReactNode, useEffect, useId, useRef } from 'react'
import { Button } from './button'
import { classNames } from './class-names'

/** A question that must be answered first. Escape and the button let go; focus comes back to where it was. */
export function Dialog({
  open,
  onClose,
  title,
  children,
  actions,
  closeLabel = 'Close',
  className,
}: {
  open: boolean
  onClose: () => void
  title: ReactNode
  children?: ReactNode
  /** Stand before the closing button. */
  actions?: ReactNode
  closeLabel?: string
  className?: string
}) {
  const ref = useRef<HTMLDialogElement>(null)
  const heading = useRef<HTMLHeadingElement>(null)
  const titleId = useId()
  useEffect(() => {
    const dialog = ref.current
    if (!dialog) return
    if (open && !dialog.open) {
      dialog.showModal()
      // Not into the first field: whoever is typing when a dialog comes up must not type into it.
      heading.current?.focus()
    }
    if (!open && dialog.open) dialog.close()
  }, [open])
  return (
    <dialog
      ref={ref}
      aria-labelledby={titleId}
      // A dialog opened from within this one tells of its closing here, too.
      onClose={(event) => event.target === event.currentTarget && onClose()}
      className={classNames(
        'm-auto w-[calc(100%-2rem)] max-w-xl border-area border-ink bg-panel p-5 text-ink shadow-menu z-dialog',
        'backdrop:bg-[var(--veil)] rounded-field',
        className,
      )}
    >
      {open && (
        <>
          <h2 ref={heading} id={titleId} tabIndex={-1} className="focus-quiet text-title">
            {title}
          </h2>
          <div className="mt-3 text-body">{children}</div>
          <div className="mt-5 flex flex-wrap justify-end gap-2">
            {actions}
            <Button onClick={onClose}>{closeLabel}</Button>
          </div>
        </>
      )}
    </dialog>
  )
}
