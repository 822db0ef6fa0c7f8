'use client'

import { classNames } from '../../ui/class-names'
import type { RuleCut } from './rule-cut'
import type { RuleLegLayout } from './rule-layout'

/** A bracket narrower than this would show one letter of its name; it keeps it as a tooltip. */
const leastNotePixels = 44

/** The notch and line where the next reading cuts. */
export function CutMark() {
  return (
    <svg
      width="18"
      height="70"
      viewBox="0 0 18 70"
      aria-hidden="true"
      focusable="false"
      className="pointer-events-none absolute -left-[9px] -top-[19px] z-marks"
    >
      <path d="M1 2h16L9 15z" style={{ fill: 'var(--ink)' }} />
      <path d="M9 12v58" style={{ stroke: 'var(--ink)', strokeWidth: 3.5 }} />
    </svg>
  )
}

/** What the next reading is, written on the side of the notch that has more room for it. */
export function CutTitle({ title, cutAt, width }: { title: string; cutAt: number | null; width: number }) {
  const besideNotch = 14
  const beyond = cutAt !== null && cutAt < width / 2
  const style =
    cutAt === null
      ? { left: 0, maxWidth: '100%' }
      : beyond
        ? { left: cutAt + besideNotch, maxWidth: width - cutAt - besideNotch }
        : { right: width - cutAt + besideNotch, maxWidth: cutAt - besideNotch }
  return (
    <p className="absolute top-0 truncate text-small leading-tight font-bold" style={style}>
      Next split: {title}
    </p>
  )
}

/** Under a leg: its name and how it stands, or what each side of the cut would mean. */
export function LegNote({
  leg,
  cut,
  cells,
  judged,
}: {
  leg: RuleLegLayout
  cut: RuleCut | null
  cells: readonly string[]
  judged: boolean
}) {
  const own = leg.entries.filter((entry) => entry.kind === 'cell')
  if (cut && own.length > 0) {
    const groups = [
      { outcome: cut.before, sites: cells.slice(0, cut.after) },
      { outcome: cut.beyond, sites: cells.slice(cut.after) },
    ]
    return (
      <div className="flex">
        {groupWidths(
          leg,
          groups.map(({ sites }) => new Set(sites)),
        ).map(({ width, group }, index) => {
          const found = group === null ? null : groups[group]
          return (
            <Bracket key={`${group} ${index}`} width={width} strong={group !== null}>
              {found
                ? `${found.outcome.about}: ${width > 210 ? 'fault is ' : ''}in these ${found.sites.length}`
                : ''}
            </Bracket>
          )
        })}
      </div>
    )
  }
  const words = !judged ? leg.name : leg.left === 0 ? `${leg.name}: proved good` : leg.name
  return (
    <Bracket width={leg.width} strong={leg.left > 0}>
      {words}
    </Bracket>
  )
}

function Bracket({ width, strong, children }: { width: number; strong: boolean; children: string }) {
  return (
    <div style={{ width }} className="flex-none overflow-hidden px-px pt-1">
      <div className={classNames('h-1.5 border-x-2 border-b-2', strong ? 'border-ink' : 'border-line')} />
      <p
        className={classNames(
          'truncate text-center text-note leading-tight',
          strong ? 'text-ink' : 'text-ink-3',
        )}
        title={children}
      >
        {width < leastNotePixels ? '' : children}
      </p>
    </div>
  )
}

/** Neighbouring entries of a leg that lie under the same outcome, as one width each. */
function groupWidths(
  leg: RuleLegLayout,
  groups: ReadonlySet<string>[],
): { width: number; group: number | null }[] {
  const out: { width: number; group: number | null }[] = []
  for (const entry of leg.entries) {
    const at = entry.kind === 'cell' ? groups.findIndex((sites) => sites.has(entry.site)) : -1
    const group = at < 0 ? null : at
    const last = out.at(-1)
    if (last && last.group === group) last.width += entry.width
    else out.push({ width: entry.width, group })
  }
  return out
}
