'use client'

import { type Ref, useState } from 'react'
import { Button } from '../ui/button'
import { classNames } from '../ui/class-names'
import { Field } from '../ui/field'
import { WireSwatch } from '../ui/wire-swatch'
import { ColourPalette } from './colour-palette'
import { anyFinder, cavityProblem, type Finders } from './finders'

interface FinderProps {
  finders: Finders
  onChange: (finders: Finders) => void
  onClear: () => void
}

/** Four finders in a row and the name above them; all that are filled must fit. */
export function FinderRow({
  finders,
  onChange,
  onClear,
  nameRef,
}: FinderProps & { nameRef?: Ref<HTMLInputElement> }) {
  const [paletteOpen, setPaletteOpen] = useState(false)
  const set = (name: keyof Finders) => (event: { target: { value: string } }) =>
    onChange({ ...finders, [name]: event.target.value })
  const big = 'text-[1.375rem] leading-tight placeholder:text-[1.375rem]'
  return (
    <div className="hidden tablet:block">
      <div className="flex flex-wrap items-center justify-between gap-x-5 gap-y-2">
        <h1 className="text-title">What have you got?</h1>
        <Field
          ref={nameRef}
          label="Name, part or signal"
          type="search"
          placeholder="any"
          className="w-80"
          used={finders.name !== ''}
          value={finders.name}
          onChange={set('name')}
        />
      </div>
      <div className="mt-3 grid grid-cols-[1.6fr_1.2fr_1fr_1.9fr_auto] items-start gap-2.5">
        <Field
          label="Trouble code"
          placeholder="any"
          autoCapitalize="characters"
          spellCheck={false}
          used={finders.code !== ''}
          tall
          inputClassName={big}
          value={finders.code}
          onChange={(event) => onChange({ ...finders, code: event.target.value.toUpperCase() })}
        />
        <Field
          label="Connector"
          placeholder="any"
          spellCheck={false}
          used={finders.connector !== ''}
          tall
          inputClassName={big}
          value={finders.connector}
          onChange={set('connector')}
        />
        <Field
          label="Cavity"
          placeholder="any"
          inputMode="numeric"
          used={finders.cavity !== ''}
          tall
          inputClassName={big}
          value={finders.cavity}
          error={cavityProblem(finders.cavity) ?? undefined}
          onChange={set('cavity')}
        />
        <ColourFinder
          colour={finders.colour}
          open={paletteOpen}
          onToggle={() => setPaletteOpen(!paletteOpen)}
        />
        <Button
          onClick={() => {
            onClear()
            setPaletteOpen(false)
          }}
          disabled={!anyFinder(finders)}
          className="m-px min-h-[3.875rem]!"
        >
          Clear
        </Button>
      </div>
      {(paletteOpen || finders.colour !== '') && (
        <div className="mt-2.5" id="colour-palette">
          <ColourPalette
            colour={finders.colour}
            onChange={(colour) => {
              onChange({ ...finders, colour })
              setPaletteOpen(true)
            }}
          />
        </div>
      )}
    </div>
  )
}

/** "BU" as "BU, any stripe", "BU/" as "BU, no stripe". */
export function colourWords(colour: string): string {
  if (colour === '') return 'any'
  if (colour.endsWith('/')) return `${colour.slice(0, -1)}, no stripe`
  return colour.includes('/') ? colour : `${colour}, any stripe`
}

export function ColourFinder({
  colour,
  open,
  onToggle,
}: {
  colour: string
  open: boolean
  onToggle: () => void
}) {
  return (
    <button
      type="button"
      aria-expanded={open || colour !== ''}
      aria-controls="colour-palette"
      onClick={onToggle}
      className={classNames(
        'flex min-h-[3.875rem] w-full flex-col justify-center rounded-field bg-window px-3 py-1.5 text-left transition-colors duration-press',
        colour !== '' ? 'border-area border-ink' : 'm-px border-control border-edge hover:border-ink',
      )}
    >
      <span className="text-note text-ink-2">Wire colour, base / stripe</span>
      <span className="flex min-w-0 items-center gap-3">
        {colour !== '' && <WireSwatch colour={colour.replace(/\/$/, '')} width={76} height={20} />}
        <span
          className={classNames(
            'truncate text-[1.375rem] leading-tight',
            colour === '' ? 'text-ink-3' : 'font-bold',
          )}
        >
          {colourWords(colour)}
        </span>
      </span>
    </button>
  )
}
