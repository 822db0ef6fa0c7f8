'use client'

import { useState } from 'react'
import { Button } from '../ui/button'
import { classNames } from '../ui/class-names'
import { Dialog } from '../ui/dialog'
import { Chevron } from '../ui/glyphs'

export interface ThumbIndexProps {
  systems: { system: string; circuits: number }[]
  circuits: number
  picked: string
  onPick: (system: string) => void
}

const nameOf = (system: string) => system || 'No system'

/** Circuits without a system cannot be asked for by one, so they stand under All only. */
function entries({ systems, circuits }: ThumbIndexProps) {
  return [
    { system: '', label: 'All', circuits },
    ...systems
      .filter((entry) => entry.system !== '')
      .map((entry) => ({ ...entry, label: nameOf(entry.system) })),
  ]
}

/** Down the right edge at 1280: tabs as of a handbook's thumb index. */
export function ThumbIndex(props: ThumbIndexProps) {
  return (
    <nav aria-label="Systems" className="hidden laptop:flex flex-col gap-2 pt-4 pl-3">
      {entries(props).map((entry) => {
        const picked = entry.system === props.picked
        return (
          <button
            key={entry.system}
            type="button"
            aria-pressed={picked}
            onClick={() => props.onPick(entry.system)}
            className={classNames(
              'flex min-h-[3.75rem] items-center justify-between gap-2 rounded-l-field border-control border-r-0 px-3 text-left text-body font-bold transition-colors duration-press',
              picked ? '-ml-3 border-ink bg-ink pl-6 text-on-ink' : 'border-edge bg-panel hover:border-ink',
            )}
          >
            <span className="min-w-0">{entry.label}</span>
            <span className="tabular-nums font-semibold">{entry.circuits}</span>
          </button>
        )
      })}
    </nav>
  )
}

/** Under the finders at 820: the same tabs in a row. */
export function ThumbRow(props: ThumbIndexProps) {
  return (
    <nav
      aria-label="Systems"
      className="hidden tablet:flex laptop:hidden mt-3 -mb-4 flex-nowrap items-end gap-1.5 overflow-x-auto pt-1"
    >
      {entries(props).map((entry) => {
        const picked = entry.system === props.picked
        return (
          <button
            key={entry.system}
            type="button"
            aria-pressed={picked}
            onClick={() => props.onPick(entry.system)}
            className={classNames(
              'flex min-h-12 flex-none items-center gap-2.5 rounded-t-field border-control border-b-0 px-3.5 text-body font-bold',
              picked ? 'border-ink bg-ink text-on-ink' : 'border-edge bg-panel',
            )}
          >
            {entry.label}
            <span className="tabular-nums font-semibold">{entry.circuits}</span>
          </button>
        )
      })}
    </nav>
  )
}

/** On a phone: one button, the index in a sheet of its own. */
export function ThumbSheet(props: ThumbIndexProps) {
  const [open, setOpen] = useState(false)
  return (
    <div className="tablet:hidden mt-2">
      <Button className="w-full justify-between!" onClick={() => setOpen(true)}>
        <span>
          <span className="font-semibold text-ink-2">System </span>
          {props.picked || 'All'}
        </span>
        <Chevron direction="down" size={14} />
      </Button>
      <Dialog open={open} onClose={() => setOpen(false)} title="Systems">
        <ul>
          {entries(props).map((entry) => (
            <li key={entry.system} className="border-b border-line">
              <button
                type="button"
                aria-pressed={entry.system === props.picked}
                onClick={() => {
                  props.onPick(entry.system)
                  setOpen(false)
                }}
                className={classNames(
                  'flex min-h-bay w-full items-center justify-between px-3 text-body font-bold',
                  entry.system === props.picked && 'bg-ink text-on-ink',
                )}
              >
                {entry.label}
                <span className="tabular-nums">{entry.circuits}</span>
              </button>
            </li>
          ))}
        </ul>
      </Dialog>
    </div>
  )
}
