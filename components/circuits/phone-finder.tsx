'use client'

import { useState } from 'react'
import { Button } from '../ui/button'
import { classNames } from '../ui/class-names'
import { Field } from '../ui/field'
import { ColourPalette } from './colour-palette'
import { ColourFinder } from './finder-row'
import { anyFinder, cavityProblem, type Finders } from './finders'

const kinds = [
  { name: 'code', label: 'Code', field: 'Trouble code' },
  { name: 'connector', label: 'Connector', field: 'Connector' },
  { name: 'cavity', label: 'Cavity', field: 'Cavity' },
  { name: 'colour', label: 'Wire', field: 'Wire colour' },
  { name: 'name', label: 'Name', field: 'Name, part or signal' },
] as const

/** One finder with a switch for its kind; what the other kinds hold still counts and says so. */
export function PhoneFinder({
  finders,
  onChange,
  onClear,
}: {
  finders: Finders
  onChange: (finders: Finders) => void
  onClear: () => void
}) {
  const firstUsed = kinds.find((kind) => finders[kind.name] !== '')
  const [kind, setKind] = useState<(typeof kinds)[number]['name']>(firstUsed?.name ?? 'code')
  const current = kinds.find((entry) => entry.name === kind) ?? kinds[0]
  return (
    <div className="tablet:hidden">
      <h1 className="text-title">What have you got?</h1>
      <fieldset className="mt-2 flex rounded-field border-control border-edge bg-window">
        <legend className="sr-only">Find by</legend>
        {kinds.map((entry, index) => (
          <button
            key={entry.name}
            type="button"
            aria-pressed={entry.name === kind}
            onClick={() => setKind(entry.name)}
            className={classNames(
              'relative min-h-target min-w-0 flex-auto px-1.5 text-small font-bold focus-visible:z-marks',
              index > 0 && 'border-l border-line',
              entry.name === kind && 'bg-ink text-on-ink',
            )}
          >
            {entry.label}
            {finders[entry.name] !== '' && (
              <>
                <span aria-hidden="true" className="absolute inset-x-2 bottom-1 h-[3px] bg-current" />
                <span className="sr-only">, in use</span>
              </>
            )}
          </button>
        ))}
      </fieldset>
      <div className="mt-2 flex items-start gap-2">
        <div className="min-w-0 flex-1">
          {kind === 'colour' ? (
            <ColourFinder colour={finders.colour} open onToggle={() => undefined} />
          ) : (
            <Field
              label={current.field}
              placeholder="any"
              inputMode={kind === 'cavity' ? 'numeric' : undefined}
              autoCapitalize={kind === 'code' ? 'characters' : undefined}
              used={finders[kind] !== ''}
              tall
              inputClassName="text-[1.375rem] leading-tight placeholder:text-[1.375rem]"
              value={finders[kind]}
              error={kind === 'cavity' ? (cavityProblem(finders.cavity) ?? undefined) : undefined}
              onChange={(event) =>
                onChange({
                  ...finders,
                  [kind]: kind === 'code' ? event.target.value.toUpperCase() : event.target.value,
                })
              }
            />
          )}
        </div>
        <Button onClick={onClear} disabled={!anyFinder(finders)} className="m-px min-h-[3.875rem]!">
          Clear
        </Button>
      </div>
      {kind === 'colour' && (
        <div className="mt-2" id="colour-palette">
          <ColourPalette colour={finders.colour} onChange={(colour) => onChange({ ...finders, colour })} />
        </div>
      )}
    </div>
  )
}
