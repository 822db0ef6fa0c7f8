import type { Circuit } from '@/diagrams/document/circuit-schema'
import { figureOf, type Reading, readingSchema } from '@/diagrams/document/reading-schema'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { type Figure, type MeterState } from './meter-state'
import { probeOf } from './probe-of'
import { readingFrom } from './reading-from'
import { doubtTyped, typedFigure, typedValue } from './typed-value'

export type Entered =
  | { ok: true; reading: Reading }
  | { ok: false; message: string; meant: string | null; about: 'leads' | 'condition' | Figure }

/** The reading as set and typed, or one sentence that says why it cannot be taken so. */
export function enterReading(circuit: Circuit, state: MeterState, id: string): Entered {
  const probe = probeOf(state)
  if (!probe) return { ok: false, message: missing[state.kind], meant: null, about: 'leads' }
  const refused = refuseReading(circuit, probe)
  if (refused) return { ok: false, message: refused.message, meant: null, about: 'condition' }
  const value = typedValue(state)
  if (value === null) return refuseFigure('value', unsaid[state.kind])
  const doubt = doubtTyped(circuit, state.kind, value)
  if (doubt) return { ok: false, ...doubt, about: 'value' }
  const reading = readingFrom(id, probe, value)
  if (!reading) return refuseFigure('value', `Amps: ${state.text} is no figure.`)
  return state.moved ? moveReading(circuit, state, reading) : { ok: true, reading }
}

/** The same reading with what the meter showed at least and at most while the harness was moved. */
function moveReading(circuit: Circuit, state: MeterState, reading: Reading): Entered {
  const ends = { low: 0 as number | 'OL', high: 0 as number | 'OL' }
  for (const end of ['low', 'high'] as const) {
    const typed = typedFigure(state.kind, state.moved?.[end] ?? '')
    if (typed === null)
      return refuseFigure(end, `Type the ${endWords[end]} that the meter showed while the harness was moved.`)
    const doubt = doubtTyped(circuit, state.kind, typed)
    if (doubt) return { ok: false, ...doubt, about: end }
    ends[end] = typed
  }
  const parsed = readingSchema.safeParse({ ...reading, moved: true, ...ends })
  if (parsed.success) return { ok: true, reading: parsed.data }
  return figureOf(ends.low) > figureOf(ends.high)
    ? refuseFigure('low', `Least ${ends.low} is above most ${ends.high}. Swap the two.`)
    : refuseFigure('value', `Still ${state.text} lies outside ${ends.low} to ${ends.high}.`)
}

const endWords = { low: 'least', high: 'most' } as const

function refuseFigure(about: Figure, message: string): Entered {
  return { ok: false, message, meant: null, about }
}

const unsaid: Record<MeterState['kind'], string> = {
  volts: 'Type what the meter shows.',
  ohms: 'Type what the meter shows.',
  amps: 'Type what the meter shows.',
  works: 'Say whether it works.',
  sees: 'Say what the module sees.',
}

const missing: Record<MeterState['kind'], string> = {
  volts: 'Red lead: no point yet. Tap one on the sheet or pick it from the list.',
  ohms: 'Red lead: no point yet. Tap one on the sheet or pick it from the list.',
  amps: 'Clamp: no wire yet. Tap one on the sheet or pick it from the list.',
  works: 'Load: none yet. Tap one on the sheet or pick it from the list.',
  sees: 'Input: none yet. Tap its pin on the sheet or pick it from the list.',
}
