import type { ReactNode } from 'react'
import { Wordmark } from '../ui/wordmark'

/** A page that has only something to say: not found, failed, offline. */
export function MessagePage({
  title,
  children,
  actions,
}: {
  title: string
  children: ReactNode
  actions?: ReactNode
}) {
  return (
    <div className="flex min-h-dvh flex-col bg-tray">
      <header className="double-rule flex min-h-[3.25rem] items-center bg-panel px-5">
        <Wordmark />
      </header>
      <main className="flex flex-1 items-center bg-sheet px-5 py-10">
        <div className="mx-auto w-full max-w-xl">
          <CutLine />
          <h1 className="mt-6 text-title">{title}</h1>
          <div className="mt-3 text-body text-ink-2">{children}</div>
          {actions && <div className="mt-5 flex flex-wrap gap-2">{actions}</div>}
        </div>
      </main>
    </div>
  )
}

/** A wire that ends in the open. */
function CutLine() {
  return (
    <svg
      viewBox="0 0 400 60"
      aria-hidden="true"
      className="w-full"
      fill="none"
      style={{ stroke: 'var(--ink)' }}
    >
      <circle cx="14" cy="30" r="7" style={{ fill: 'var(--ink)' }} />
      <path d="M14 30h150" strokeWidth="6" />
      <path d="M236 30h150" strokeWidth="6" />
      <circle cx="386" cy="30" r="7" style={{ fill: 'var(--sheet)' }} strokeWidth="2.2" />
      <path d="M176 20v20M224 20v20" strokeWidth="2.2" />
      <path d="M184 30h32" strokeWidth="2.2" strokeDasharray="4 4" />
    </svg>
  )
}
