import type { Limits } from '@/diagrams/distance/measured'
import { measuredBy } from '@/diagrams/distance/measured'
import { distanceProbes, distanceToFault, type FoundDistance } from '@/diagrams/distance-to-fault'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'

export type DistanceBy = 'ohms' | 'millivolts'

/** What stands in the fields, as it was typed. */
export interface TypedDistance {
  by: DistanceBy
  nearOhms: string
  farOhms: string
  wholeOhms: string
  ohmsGoodTo: string
  leads: 'zeroed' | 'in-them'
  nearMillivolts: string
  nearAmps: string
  farMillivolts: string
  farAmps: string
  millivoltsGoodTo: string
  celsius: string
}

/** Test leads of a hand-held meter: common practice, no source. */
const leadsNotZeroed: Limits = { low: 0.1, high: 0.5 }
const ohmsPercent = 0.5
const voltsPercent = 0.5
const ampsAccuracy = { percent: 2, floor: 0.05 }

export const untyped: TypedDistance = {
  by: 'ohms',
  nearOhms: '',
  farOhms: '',
  wholeOhms: '',
  ohmsGoodTo: '0.2',
  leads: 'zeroed',
  nearMillivolts: '',
  nearAmps: '',
  farMillivolts: '',
  farAmps: '',
  millivoltsGoodTo: '0.5',
  celsius: '20',
}

/** A figure above or at zero; null for what is none yet, or none at all. */
export function typedFigure(text: string): number | null {
  const plain = text.trim().replace(',', '.')
  const figure = Number(plain)
  return plain !== '' && Number.isFinite(figure) && figure >= 0 ? figure : null
}

/** What the fields say of the place of the short; null while nothing to go by has been typed. */
export function distanceTyped(
  circuit: Circuit,
  wire: string,
  other: string | null,
  typed: TypedDistance,
): FoundDistance | null {
  const celsius = typed.celsius.trim().startsWith('-')
    ? -(typedFigure(typed.celsius.trim().slice(1)) ?? Number.NaN)
    : (typedFigure(typed.celsius) ?? Number.NaN)
  if (typed.by === 'millivolts') {
    const drops = (['near', 'far'] as const).flatMap((side) => {
      const [millivolts, amps] = [typedFigure(typed[`${side}Millivolts`]), typedFigure(typed[`${side}Amps`])]
      if (millivolts === null || amps === null) return []
      const floor = (typedFigure(typed.millivoltsGoodTo) ?? 0.5) / 1000
      return [
        {
          end: side === 'near' ? ('from' as const) : ('to' as const),
          volts: measuredBy(millivolts / 1000, { percent: voltsPercent, floor }),
          amps: measuredBy(amps, ampsAccuracy),
        },
      ]
    })
    return drops.length === 0 ? null : distanceToFault({ circuit, wire, readings: [], drops, celsius })
  }
  const accuracy = { percent: ohmsPercent, floor: typedFigure(typed.ohmsGoodTo) ?? 0.2 }
  const figures = [typed.nearOhms, typed.farOhms, typed.wholeOhms]
  const readings = distanceProbes(circuit, wire, other).flatMap((probe, i): Reading[] => {
    const value = typedFigure(figures[i] ?? '')
    return value === null || probe.kind !== 'ohms'
      ? []
      : [{ id: `R${i + 1}`, ...probe, kind: 'ohms', value, accuracy }]
  })
  if (readings.length === 0) return null
  const leads = typed.leads === 'zeroed' ? { low: 0, high: 0 } : leadsNotZeroed
  return distanceToFault({ circuit, wire, readings, leads, celsius })
}
