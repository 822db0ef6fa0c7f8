import Link from 'next/link'
import { classNames } from '../ui/class-names'

/** What one does with a circuit, as joined links. */
export function ModeSwitch({
  modes,
  current,
}: {
  modes: readonly { id: string; label: string; href: string }[]
  current: string
}) {
  return (
    <nav
      aria-label="What to do with this circuit"
      className="flex rounded-field border-control border-edge bg-window"
    >
      {modes.map((mode, index) => (
        <Link
          key={mode.id}
          href={mode.href}
          aria-current={mode.id === current ? 'page' : undefined}
          className={classNames(
            'flex min-h-target laptop:min-w-24 flex-1 items-center justify-center px-5 text-body font-bold no-underline',
            'transition-colors duration-press focus-visible:z-marks',
            index > 0 && 'border-l border-line',
            index === 0 && 'rounded-l-[2.5px]',
            index === modes.length - 1 && 'rounded-r-[2.5px]',
            mode.id === current ? 'bg-ink text-on-ink' : 'hover:bg-panel',
          )}
        >
          {mode.label}
        </Link>
      ))}
    </nav>
  )
}
