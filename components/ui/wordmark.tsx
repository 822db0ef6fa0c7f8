import { classNames } from './class-names'

/** A bar cut in two: left half proved, right half in question, a notch pointing into the cut. */
export function Mark({ size = 28, className }: { size?: number; className?: string }) {
  return (
    <svg
      viewBox="0 0 32 32"
      width={size}
      height={size}
      className={className}
      aria-hidden="true"
      focusable="false"
      style={{ flex: 'none' }}
    >
      <path fill="currentColor" d="M1 14h13.5v14H1z" />
      <path fill="none" stroke="currentColor" strokeWidth="2.5" d="M18.75 15.25h11v11.5h-11z" />
      <path fill="currentColor" d="M9 3h14l-7 8.5z" />
    </svg>
  )
}

/** "Half", an upright line, "split": one word to a screen reader. */
export function Wordmark({ withMark = true, className }: { withMark?: boolean; className?: string }) {
  return (
    <span className={classNames('inline-flex items-center gap-2.5', className)}>
      {withMark && <Mark />}
      <span className="sr-only">Halfsplit</span>
      <span aria-hidden="true" className="inline-flex items-center text-[1.3125rem] leading-none">
        <span className="font-extrabold">Half</span>
        {/* 1.25 times the cap height, 2.5 px wide at 21 px. */}
        <span className="mx-[0.1em] h-[1.2em] w-[0.12em] bg-current" />
        <span className="font-normal">split</span>
      </span>
    </span>
  )
}
