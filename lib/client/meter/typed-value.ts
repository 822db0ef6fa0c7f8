import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { ReadingValue } from '@/diagrams/document/reading-schema'
import type { MeterKind, MeterState } from './meter-state'

/** What has been typed so far as a value; null while it is none ("", "-", "."). */
export function typedValue(
  state: Pick<MeterState, 'kind' | 'text' | 'works'> & { sees?: MeterState['sees'] },
): ReadingValue | null {
  if (state.kind === 'works') return state.works
  if (state.kind === 'sees') return state.sees ?? null
  return typedFigure(state.kind, state.text)
}

/** One typed figure; null while it is none. */
export function typedFigure(kind: MeterKind, text: string): number | 'OL' | null {
  if (text === 'OL') return kind === 'amps' ? null : 'OL'
  const number = Number(text)
  return /[0-9]/.test(text) && Number.isFinite(number) ? number : null
}

export interface Doubt {
  /** One sentence that says what cannot be and asks the obvious question. */
  message: string
  /** What was probably meant, as it would be typed. */
  meant: string | null
}

/** Refuses what no meter can show on this circuit, such as a slipped decimal point. */
export function doubtTyped(circuit: Circuit, kind: MeterKind, value: ReadingValue): Doubt | null {
  if (typeof value !== 'number') return null
  if (kind === 'ohms' && value < 0)
    return { message: `Ohms: ${value} is below zero. Was it ${-value}?`, meant: String(-value) }
  if (kind !== 'volts') return null
  const most = mostVolts(circuit)
  if (most <= 0 || Math.abs(value) <= most * 1.5 + 1) return null
  const meant = slipped(value, most)
  return {
    message: `Volts: ${value} is above this circuit's ${most}.${meant === null ? '' : ` Was it ${meant}?`}`,
    meant,
  }
}

/** The highest source drawn in the circuit. */
export function mostVolts(circuit: Circuit): number {
  return Math.max(
    0,
    ...circuit.nodes.flatMap((node) => {
      if (node.kind === 'battery' || node.kind === 'feed') return [node.volts]
      if (node.kind !== 'module') return []
      return node.pins.map(({ circuit: inside }) =>
        inside.type === 'source' || inside.type === 'pull-up' ? inside.volts : 0,
      )
    }),
  )
}

/** The same digits with the point further left, once they fit under the source. */
function slipped(value: number, most: number): string | null {
  for (let by = 10; by <= 1_000_000; by *= 10)
    if (Math.abs(value / by) <= most * 1.2) return String(Number((value / by).toPrecision(12)))
  return null
}
