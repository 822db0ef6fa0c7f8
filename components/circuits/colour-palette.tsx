'use client'

import { wireColours } from '@/diagrams/tables/wire-colours'
import { classNames } from '../ui/class-names'
import { WireSwatch } from '../ui/wire-swatch'

/** Base first, then stripe: "BU" is any blue wire, "BU/" plain blue, "BU/WH" blue with a white stripe. */
export function ColourPalette({ colour, onChange }: { colour: string; onChange: (colour: string) => void }) {
  const [base = '', stripe] = colour.split('/')
  return (
    <div className="flex flex-wrap items-center gap-2">
      {base === '' ? (
        <>
          <span className="mr-1 text-dense font-bold text-ink-2">Base</span>
          {wireColours.map(({ code, name }) => (
            <Swatch key={code} code={code} spoken={`Base ${name}`} onPick={() => onChange(code)} />
          ))}
        </>
      ) : (
        <>
          <button
            type="button"
            onClick={() => onChange('')}
            className={classNames(swatchClass, plainClass, 'border-edge gap-2.5 px-3 text-body')}
            aria-label={`Base ${base}, change it`}
          >
            Base <WireSwatch colour={base} width={32} height={14} /> {base}
          </button>
          <span className="mx-1 text-dense font-bold text-ink-2">Stripe</span>
          {wireColours
            .filter(({ code }) => code !== base)
            .map(({ code, name }) => (
              <Swatch
                key={code}
                code={code}
                spoken={`Stripe ${name}`}
                picked={stripe === code}
                onPick={() => onChange(stripe === code ? base : `${base}/${code}`)}
              />
            ))}
          <button
            type="button"
            aria-pressed={stripe === ''}
            onClick={() => onChange(stripe === '' ? base : `${base}/`)}
            className={classNames(
              swatchClass,
              'px-4 text-body',
              stripe === '' ? pickedClass : `${plainClass} border-edge`,
            )}
          >
            None
          </button>
        </>
      )}
    </div>
  )
}

const swatchClass =
  'inline-flex min-h-12 min-w-target items-center justify-center rounded-field bg-window font-bold transition-colors duration-press hover:border-ink'
const plainClass = 'border-control'
const pickedClass = 'border-area border-ink'

function Swatch({
  code,
  spoken,
  picked,
  onPick,
}: {
  code: string
  spoken: string
  picked?: boolean
  onPick: () => void
}) {
  return (
    <button
      type="button"
      aria-label={spoken}
      aria-pressed={picked}
      onClick={onPick}
      className={classNames(
        swatchClass,
        'flex-col gap-0.5 text-note',
        picked ? pickedClass : `${plainClass} border-line`,
      )}
    >
      <WireSwatch colour={code} width={28} height={15} />
      {code}
    </button>
  )
}
