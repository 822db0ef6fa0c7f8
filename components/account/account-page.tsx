import type { ReactNode } from 'react'
import { PublicFoot } from '../public/public-foot'
import { PublicHead } from '../public/public-head'

/** Sheet, rule and tray as everywhere: a line to be split above, its name on the rule, the form in the tray. */
export function AccountPage({
  at,
  title,
  caption,
  children,
}: {
  at: 'sign-in' | 'sign-up'
  title: string
  caption: ReactNode
  children: ReactNode
}) {
  return (
    <div className="flex min-h-dvh flex-col">
      <PublicHead at={at} />
      <div aria-hidden="true" className="overflow-hidden bg-sheet">
        <LineDrawing />
      </div>
      <main className="flex flex-1 flex-col">
        <div className="border-y-2 border-ink bg-panel px-4 tablet:px-5 py-3">
          <div className="mx-auto w-full max-w-md">
            <h1 className="text-title">{title}</h1>
            <p className="mt-1 text-body text-ink-2">{caption}</p>
          </div>
        </div>
        <div className="flex-1 bg-tray px-4 tablet:px-5 py-6">
          <div className="mx-auto w-full max-w-md">{children}</div>
        </div>
      </main>
      <PublicFoot />
    </div>
  )
}

/** Feed, fuse, a joint, a lamp and ground, in symbols only. */
function LineDrawing() {
  return (
    <svg
      viewBox="0 0 760 120"
      className="mx-auto h-28 w-[47.5rem] max-w-none tablet:h-36 tablet:w-[60rem]"
      fill="none"
      style={{ stroke: 'var(--line)' }}
      strokeWidth="2.6"
    >
      <path d="M40 40h56l24 20-24 20H40z" />
      <path d="M120 60h80M200 46h74v28h-74zM200 60h160M404 60h96M588 60h92M680 60v20M662 80h36M668 88h24M674 96h12" />
      <rect x="360" y="44" width="44" height="32" rx="16" />
      <path d="M376 44c8 8 8 24 0 32" />
      <path d="M500 60h44" />
      <circle cx="566" cy="60" r="22" />
      <path d="m550.4 44.4 31.2 31.2m0-31.2-31.2 31.2" />
      <circle cx="320" cy="60" r="6" style={{ fill: 'var(--line)' }} />
    </svg>
  )
}
