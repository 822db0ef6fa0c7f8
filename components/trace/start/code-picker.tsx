'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { classNames } from '../../ui/class-names'
import { Field } from '../../ui/field'
import { Tick } from '../../ui/glyphs'

/** The codes of the circuit to pick from, and a field for one that is not drawn there. */
export function CodePicker({
  circuit,
  codes,
  onChange,
  typed,
  onType,
  error,
}: {
  circuit: Circuit
  codes: readonly string[]
  onChange: (codes: string[]) => void
  typed: string
  onType: (text: string) => void
  error: string | null
}) {
  const known = circuit.codes.map((entry) => ({
    code: entry.failureType ? `${entry.code}-${entry.failureType}` : entry.code,
    text: entry.text,
  }))
  return (
    <fieldset className="grid gap-2">
      <legend className="mb-1 text-body font-bold">Trouble codes</legend>
      {known.map(({ code, text }) => {
        const picked = codes.includes(code)
        return (
          <button
            key={code}
            type="button"
            aria-pressed={picked}
            onClick={() => onChange(picked ? codes.filter((one) => one !== code) : [...codes, code])}
            className={classNames(
              'flex min-h-bay items-center gap-3 rounded-field bg-window px-3 text-left',
              picked ? 'border-area border-ink' : 'm-px border-control border-edge hover:border-ink',
            )}
          >
            <span className="figures font-bold">{code}</span>
            <span className="min-w-0 flex-1 text-dense text-ink-2">{text}</span>
            {picked && <Tick size={20} />}
          </button>
        )
      })}
      <Field
        label="Another code"
        figures
        placeholder="none"
        maxLength={8}
        autoCapitalize="characters"
        value={typed}
        error={error}
        onChange={(event) => onType(event.target.value)}
      />
    </fieldset>
  )
}
