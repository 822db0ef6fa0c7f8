import Link from 'next/link'
import type { CircuitRow } from '@/lib/shared/api/circuits'
import { classNames } from '../ui/class-names'
import { Plate } from '../ui/plate'
import { WireColour } from '../ui/wire-swatch'

const columns = {
  place:
    'laptop:grid-cols-[7rem_12rem_minmax(12rem,1.4fr)_minmax(0,2fr)_8rem] tablet:grid-cols-[5.5rem_10.5rem_minmax(0,1.2fr)_minmax(0,1.3fr)_7.5rem]',
  circuit:
    'laptop:grid-cols-[minmax(13rem,1.3fr)_minmax(9rem,1fr)_minmax(0,2fr)_8rem] tablet:grid-cols-[minmax(0,1.3fr)_minmax(0,1fr)_minmax(0,1.4fr)_7.5rem]',
}
const heads = {
  place: ['Cavity', 'Wire, mm²', 'Circuit', 'Carries', 'Code'],
  circuit: ['Circuit', 'Vehicle', 'What for', 'Code'],
}

/** Ruled rows, the whole row the target; two lines on a phone. */
export function CircuitRows({ rows }: { rows: CircuitRow[] }) {
  const shape = rows.some((row) => row.kind !== 'circuit') ? 'place' : 'circuit'
  return (
    <div>
      <div
        aria-hidden="true"
        className={classNames(
          'hidden tablet:grid gap-x-4 border-b-2 border-ink pb-2 text-[0.84375rem] font-bold text-ink-2',
          columns[shape],
        )}
      >
        {heads[shape].map((head) => (
          <span key={head}>{head}</span>
        ))}
      </div>
      <ol>
        {rows.map((row) => (
          <li key={row.key} className="border-b border-line">
            <Link
              href={`/circuits/${row.circuitId}`}
              className={classNames(
                'group min-h-14 items-center gap-x-4 py-2.5 text-body no-underline hover:bg-panel',
                'flex flex-wrap gap-y-1 tablet:grid',
                columns[shape],
              )}
            >
              {shape === 'place' && <PlaceCells row={row} />}
              <span
                className={classNames(
                  'font-bold',
                  shape === 'circuit' ? 'min-w-0 flex-1' : 'w-full tablet:w-auto order-3 tablet:order-none',
                )}
              >
                {row.title}
                {shape === 'place' && row.vehicle && (
                  <span className="block text-small font-normal text-ink-2">{row.vehicle}</span>
                )}
              </span>
              {shape === 'circuit' && (
                <span className="order-3 w-full tablet:order-none tablet:w-auto text-small tablet:text-body text-ink-2">
                  {row.vehicle}
                </span>
              )}
              <span
                className={classNames(
                  'text-ink-2',
                  shape === 'circuit'
                    ? 'hidden tablet:block'
                    : 'order-4 w-full tablet:order-none tablet:w-auto',
                )}
              >
                {row.carries}
              </span>
              <span className={classNames(shape === 'place' && 'ml-auto tablet:ml-0')}>
                {row.code ? (
                  <>
                    <span className="sr-only">Code </span>
                    <Plate>{row.code}</Plate>
                  </>
                ) : (
                  <span className="text-ink-3">
                    none<span className="sr-only"> given as code</span>
                  </span>
                )}
              </span>
            </Link>
          </li>
        ))}
      </ol>
    </div>
  )
}

function PlaceCells({ row }: { row: CircuitRow }) {
  return (
    <>
      <span className="text-[1.1875rem] font-bold">
        {row.cavity ? (
          <>
            <span className="sr-only">Cavity </span>
            {row.cavity.connector}-{row.cavity.number}
          </>
        ) : (
          <span className="text-body font-normal text-ink-3">{row.kind === 'wire' ? 'no cavity' : ''}</span>
        )}
      </span>
      <span className="flex items-center gap-2.5">
        {row.wire && (
          <>
            <WireColour colour={row.wire.colour} />
            <span className="figures font-normal text-ink-2">{row.wire.mm2}</span>
          </>
        )}
      </span>
    </>
  )
}
