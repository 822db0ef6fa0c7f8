'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import { classNames } from '../ui/class-names'
import type { Operation } from './use-operation'
import { ampsWords } from './what-happens'

/** Less than this is shown as 0 A. */
const leastAmps = 0.00005

/** Amps of every wire, largest first, each with a bar; a row picks its wire on the sheet. */
export function WiresTable({
  circuit,
  operation,
  picked,
  onPick,
}: {
  circuit: Circuit
  operation: Operation
  picked: string | null
  onPick: (wire: string | null) => void
}) {
  const amps = operation.now.ok ? operation.now.value.wireAmps : new Map<string, number>()
  const rows = circuit.wires
    .map((wire) => ({ wire, amps: amps.get(wire.id) ?? 0 }))
    .toSorted((one, other) => Math.abs(other.amps) - Math.abs(one.amps))
  // A voltmeter's own current is no current: without any, no bar is drawn.
  const most = Math.abs(rows[0]?.amps ?? 0)
  const carries = most >= leastAmps
  return (
    <section aria-labelledby="wires-amps" className="flex min-h-0 flex-col">
      <div className="flex items-baseline gap-3 px-3 pt-3 pb-2 tablet:px-4">
        <h2 id="wires-amps" className="text-body font-bold">
          Wires, amps
        </h2>
        <span className="text-small text-ink-2">largest first</span>
      </div>
      <ul className="min-h-0 flex-1 overflow-y-auto border-t border-line">
        {rows.map(({ wire, amps: carried }) => {
          const [from, to] = carried < 0 ? [wire.to, wire.from] : [wire.from, wire.to]
          return (
            <li key={wire.id}>
              <button
                type="button"
                aria-pressed={picked === wire.id}
                onClick={() => onPick(picked === wire.id ? null : wire.id)}
                className={classNames(
                  'flex min-h-target w-full items-center gap-3 border-b border-line px-3 text-left tablet:px-4',
                  picked === wire.id ? 'bg-window' : 'hover:bg-panel',
                )}
              >
                <span className="min-w-0 flex-1 truncate text-dense">
                  {pointName(circuit, from)} to {pointName(circuit, to)}
                </span>
                <span aria-hidden="true" className="h-3 w-24 border-l border-ink">
                  <span
                    className="block h-3 bg-ink"
                    style={{ width: carries ? `${(Math.abs(carried) / most) * 100}%` : 0 }}
                  />
                </span>
                <span className="figures w-20 text-right text-body font-bold">
                  {ampsWords(Math.abs(carried))}
                </span>
              </button>
            </li>
          )
        })}
      </ul>
    </section>
  )
}
