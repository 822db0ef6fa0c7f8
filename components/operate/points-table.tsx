'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import { valueWords } from '@/lib/client/meter/reading-words'
import { classNames } from '../ui/class-names'
import { LeadGlyph } from '../ui/lead-glyph'
import { pointRows } from './shown-volts'
import type { Operation } from './use-operation'

/** Volts of every point, now and before the last control was moved, and the meter between any two of them. */
export function PointsTable({ circuit, operation }: { circuit: Circuit; operation: Operation }) {
  const { now, before, beforeWords, state, readout, act } = operation
  const rows = now.ok
    ? pointRows(circuit, operation.condition.unplugged, now.value.volts, before?.volts ?? null)
    : []
  return (
    <section aria-labelledby="points-volts" className="flex min-h-0 flex-col">
      <div className="flex items-baseline gap-3 px-3 pt-3 tablet:px-4">
        <h2 id="points-volts" className="flex-1 text-body font-bold">
          Points, volts
        </h2>
        <span className="w-20 text-right text-small text-ink-2">now</span>
        {before && (
          <span className="w-28 truncate text-right text-small text-ink-2" title={beforeWords}>
            {beforeWords}
          </span>
        )}
      </div>
      <Readout circuit={circuit} state={state} readout={readout} act={act} />
      <ul className="min-h-0 flex-1 overflow-y-auto border-t border-line">
        {rows.map((row) => {
          const lead = state.red === row.point ? 'red' : state.black === row.point ? 'black' : null
          return (
            <li key={row.point}>
              <button
                type="button"
                onClick={() => act({ do: 'tap-point', point: row.point })}
                className={classNames(
                  'flex min-h-target w-full items-center gap-3 border-b border-line px-3 text-left tablet:px-4',
                  lead ? 'bg-window' : 'hover:bg-panel',
                )}
              >
                <LeadGlyph lead={lead ?? 'red'} size={20} className={lead ? '' : 'opacity-0'} />
                <span className={classNames('min-w-0 flex-1 truncate', row.moved && 'font-bold')}>
                  {pointName(circuit, row.point)}
                </span>
                <span className="figures w-20 text-right text-lead">{row.volts.toFixed(1)}</span>
                {before && (
                  <span className="figures w-28 text-right text-ink-2">
                    {row.before === null ? '' : row.before.toFixed(1)}
                  </span>
                )}
              </button>
            </li>
          )
        })}
      </ul>
    </section>
  )
}

function Readout({
  circuit,
  state,
  readout,
  act,
}: {
  circuit: Circuit
  state: Operation['state']
  readout: Operation['readout']
  act: Operation['act']
}) {
  if (state.red === null)
    return (
      <p className="px-3 py-1.5 text-small text-ink-2 tablet:px-4">
        Tap two points to put a meter between them.
      </p>
    )
  return (
    <div className="flex items-center gap-3 px-3 py-1 tablet:px-4">
      <p className="min-w-0 flex-1 text-small">
        <span className="font-bold">{pointName(circuit, state.red)}</span> to{' '}
        <span className="font-bold">{pointName(circuit, state.black)}</span>
      </p>
      <output className="figures text-lead">
        {readout?.ok ? valueWords('volts', readout.value) : (readout?.problem.message ?? '')}
      </output>
      {state.black !== 'chassis' && (
        <button
          type="button"
          className="min-h-target px-1 text-small font-bold underline underline-offset-4"
          onClick={() => act({ do: 'put-lead', lead: 'black', point: 'chassis' })}
        >
          Black to chassis
        </button>
      )}
    </div>
  )
}
