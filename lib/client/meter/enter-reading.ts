import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { refuseReading } from '@/diagrams/solver/legal-reading'
import { type MeterState, probeOf } from './meter-state'
import { readingFrom } from './reading-from'
import { doubtTyped, typedValue } from './typed-value'

export type Entered =
  | { ok: true; reading: Reading }
  | { ok: false; message: string; meant: string | null; about: 'leads' | 'value' | 'condition' }

/** The reading as set and typed, or one sentence that says why it cannot be taken so. */
export function enterReading(circuit: Circuit, state: MeterState, id: string): Entered {
  const probe = probeOf(state)
  if (!probe) return { ok: false, message: missing[state.kind], meant: null, about: 'leads' }
  const refused = refuseReading(circuit, probe)
  if (refused) return { ok: false, message: refused.message, meant: null, about: 'condition' }
  const value = typedValue(state)
  if (value === null)
    return {
      ok: false,
      message: state.kind === 'works' ? 'Say whether it works.' : 'Type what the meter shows.',
      meant: null,
      about: 'value',
    }
  const doubt = doubtTyped(circuit, state.kind, value)
  if (doubt) return { ok: false, ...doubt, about: 'value' }
  const reading = readingFrom(id, probe, value)
  if (!reading)
    return { ok: false, message: `Amps: ${state.text} is no figure.`, meant: null, about: 'value' }
  return { ok: true, reading }
}

const missing: Record<MeterState['kind'], string> = {
  volts: 'Red lead: no point yet. Tap one on the sheet or pick it from the list.',
  ohms: 'Red lead: no point yet. Tap one on the sheet or pick it from the list.',
  amps: 'Clamp: no wire yet. Tap one on the sheet or pick it from the list.',
  works: 'Load: none yet. Tap one on the sheet or pick it from the list.',
}
