import { ThemeSwitch } from '../shell/theme-switch'
import { Mark } from '../ui/wordmark'

export function PublicFoot() {
  return (
    <footer className="flex flex-wrap items-center gap-x-5 gap-y-3 border-t-2 border-ink bg-panel px-4 tablet:px-5 py-3">
      <p className="flex min-w-0 flex-1 basis-72 items-center gap-3 text-small text-ink-2">
        <Mark size={20} className="text-ink" />
        The vehicle maker's service information and local rules come first. Halfsplit advises; the person with
        the meter decides.
      </p>
      <ThemeSwitch />
    </footer>
  )
}
