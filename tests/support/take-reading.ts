import { controlCombinations } from '@/diagrams/document/condition'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Probe, Reading, ReadingValue } from '@/diagrams/document/reading-schema'
import { readingSchema } from '@/diagrams/document/reading-schema'
import { measure } from '@/diagrams/solver/meter'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'

/** Limits of the format's page: percent of the value and a floor. */
const limits = { volts: [0.005, 0.02], ohms: [0.005, 0.2], amps: [0.02, 0.05] } as const

/** A reading of a probe on a real vehicle, its error anywhere within the meter's limits; null when it cannot be taken. */
export function takeReading(
  id: string,
  vehicle: Circuit,
  probe: Probe,
  fault: PlantedFault | undefined,
  random: () => number,
): Reading | null {
  const measured = measure(vehicle, probe, fault)
  if (!measured.ok) return null
  return readingSchema.parse({ id, ...probe, value: shownBy(probe, measured.value, random) })
}

/** What a meter shows of a true value, its error anywhere within its limits. */
export function shownBy(probe: Probe, value: ReadingValue, random: () => number): ReadingValue {
  if (typeof value !== 'number' || (probe.kind !== 'volts' && probe.kind !== 'ohms' && probe.kind !== 'amps'))
    return value
  const [part, floor] = limits[probe.kind]
  const off = value + (2 * random() - 1) * (part * Math.abs(value) + floor)
  return probe.kind === 'ohms' ? Math.max(0, off) : off
}

/** Whether a fault counts: in some combination of controls it moves a point by over 0.4 V or changes a load or an input. */
export function shows(circuit: Circuit, fault: PlantedFault): boolean {
  return controlCombinations(circuit, 256).some((controls) => {
    const condition = { ...restCondition, controls }
    const good = solveOperatingPoint(circuit, condition)
    const bad = solveOperatingPoint(circuit, condition, fault)
    if (!good.ok || !bad.ok) return good.ok
    for (const [point, volts] of good.value.volts)
      if (Math.abs(volts - bad.value.volts.get(point)!) > 0.4) return true
    for (const [node, load] of good.value.loads)
      if (load.works !== bad.value.loads.get(node)!.works) return true
    for (const [pin, level] of good.value.sees) if (level !== bad.value.sees.get(pin)) return true
    return false
  })
}
