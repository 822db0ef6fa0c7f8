import { nodeName, pointName } from '../document/points'
import type { Reading, ReadingValue } from '../document/reading-schema'
import type { Circuit } from '../document/circuit-schema'
import { siteName } from '../document/sites'
import { noAlteration } from '../solver/alteration'
import { Case } from '../solver/case'
import { readMeter } from '../solver/meter'
import type { ReadingAnswer } from './answer'
import type { Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import { isAboveSources } from './misfit'

/** Each reading beside what the good circuit would show, with a sentence. */
export function judgeReadings(
  model: FaultModel,
  readings: readonly Reading[],
  evidence: Evidence,
): ReadingAnswer[] {
  return readings.map((reading, r) => {
    const settled = new Case(model.study(reading), noAlteration)
    const point = settled.settle(0)
    const expected = point ? readMeter(settled, point, reading) : null
    const agrees = evidence.good.fits[r]!.size > 0
    return { id: reading.id, expected, agrees, says: sentence(model, reading, expected, agrees) }
  })
}

function sentence(
  model: FaultModel,
  reading: Reading,
  expected: ReadingValue | null,
  agrees: boolean,
): string {
  const { circuit } = model
  const place = readingPlace(circuit, reading)
  const shown = valueWords(reading.kind, reading.value)
  if (isAboveSources(model, reading))
    return `${place}: ${shown} is above any source of this circuit. Check the leads and the range.`
  if (expected === null)
    return `${place}: ${shown}. The good circuit does not come to rest in this condition, so nothing follows.`
  const good = valueWords(reading.kind, expected)
  if (agrees) return `${place}: ${shown}, as in a good circuit (${good}).`
  if (reading.kind === 'works')
    return reading.value
      ? `${place}: works, though it should not.`
      : `${place}: does not work, though it should.`
  if (reading.kind === 'volts' && typeof reading.value === 'number' && typeof expected === 'number') {
    const [is, should] = [Math.abs(reading.value), Math.abs(expected)]
    if (is < 0.1 && should > 1)
      return `${place}: ${shown}, a good circuit has ${good}. No feed gets here, or it is held to ground.`
    if (is < should)
      return `${place}: ${shown}, a good circuit has ${good}. ${valueWords('volts', should - is)} is lost on the way.`
    return `${place}: ${shown}, a good circuit has ${good}. The way to ground is poor, or a supply gets in.`
  }
  if (reading.kind === 'ohms') {
    const more =
      reading.value === 'OL' ||
      (typeof reading.value === 'number' && typeof expected === 'number' && reading.value > expected)
    return `${place}: ${shown}, a good circuit has ${good}. ${more ? 'The way is open or poor.' : 'Something joins what should be apart.'}`
  }
  return `${place}: ${shown}, a good circuit has ${good}.`
}

/** Where a reading was taken, place first. */
export function readingPlace(circuit: Circuit, reading: Reading): string {
  switch (reading.kind) {
    case 'volts':
    case 'ohms':
      return reading.black === 'chassis'
        ? pointName(circuit, reading.red)
        : `${pointName(circuit, reading.red)} to ${pointName(circuit, reading.black)}`
    case 'amps':
      return siteName(circuit, `wire:${reading.wire}`)
    case 'works': {
      const node = circuit.nodes.find((n) => n.id === reading.node)
      return node ? nodeName(node) : reading.node
    }
    case 'sees':
      return pointName(circuit, reading.pin)
  }
}

/** "12.57 V", "OL", "4.70 kohm", "works", "high". */
export function valueWords(kind: Reading['kind'], value: ReadingValue): string {
  if (typeof value === 'boolean') return value ? 'works' : 'does not work'
  if (typeof value === 'string') return value
  if (kind === 'ohms') {
    if (value >= 1e6) return `${(value / 1e6).toFixed(2)} Mohm`
    if (value >= 1e3) return `${(value / 1e3).toFixed(2)} kohm`
    return `${value.toFixed(value < 100 ? 1 : 0)} ohm`
  }
  return `${value.toFixed(2)} ${kind === 'amps' ? 'A' : 'V'}`
}
