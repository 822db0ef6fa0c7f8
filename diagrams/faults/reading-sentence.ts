import type { Circuit } from '../document/circuit-schema'
import { nodeName, pointName } from '../document/points'
import type { Reading, ReadingValue } from '../document/reading-schema'
import { siteName } from '../document/sites'
import { noAlteration } from '../solver/alteration'
import { Case } from '../solver/case'
import { readMeter } from '../solver/meter'
import type { ReadingAnswer } from './answer'
import type { Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import { isAboveSources } from './misfit'
import { capital, valueWords } from './value-words'

/** Below this a point counts as carrying nothing, in volts and in amperes; above the other as carrying something. */
const nothing = 0.1
const something = 1

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
    const above = isAboveSources(model, reading)
    return {
      id: reading.id,
      expected,
      agrees,
      says: readingSentence(model.circuit, reading, expected, agrees, above),
    }
  })
}

/** Place first, then what is shown, then what a good circuit shows and what follows from the difference. */
export function readingSentence(
  circuit: Circuit,
  reading: Reading,
  expected: ReadingValue | null,
  agrees: boolean,
  above: boolean,
): string {
  const place = capital(readingPlace(circuit, reading))
  const shown = valueWords(reading.kind, reading.value)
  if (above) return `${place}: ${shown} is above any source of this circuit. Check the leads and the range.`
  if (expected === null)
    return `${place}: ${shown}. The good circuit does not come to rest in this condition, so nothing follows.`
  const good = valueWords(reading.kind, expected)
  if (reading.kind === 'works') return `${place}: ${worksWords(reading.value, agrees)}.`
  if (reading.kind === 'sees')
    return `${place}: the module sees ${shown}, ${agrees ? 'as it should' : `it should see ${good}`}.`
  if (agrees)
    return `${place}: ${shown}, ${isClose(reading.value, expected) ? 'as in a good circuit' : 'within the limits of a good circuit'} (${good}).`
  return `${place}: ${shown}, a good circuit has ${good}. ${differenceWords(reading, expected)}.`
}

/** Within a few hundredths; what lies further off is good by the tolerances of the parts and the battery. */
function isClose(value: ReadingValue, expected: ReadingValue): boolean {
  if (typeof value !== 'number' || typeof expected !== 'number') return value === expected
  return Math.abs(value - expected) <= 0.02 * Math.abs(expected) + 0.2
}

function worksWords(works: boolean, agrees: boolean): string {
  if (agrees) return works ? 'works, as it should' : 'does not work, as it should not'
  return works ? 'works, though it should not' : 'does not work, though it should'
}

/** What a figure that is off says by itself. */
function differenceWords(reading: Reading, expected: ReadingValue): string {
  const is = typeof reading.value === 'number' ? reading.value : Infinity
  const should = typeof expected === 'number' ? expected : Infinity
  if (reading.kind === 'ohms')
    return is > should ? 'The way is open or poor' : 'Something joins what should be apart'
  if (is * should < 0 && Math.min(Math.abs(is), Math.abs(should)) > nothing)
    return reading.kind === 'amps'
      ? 'The current runs the other way'
      : 'The leads are swapped, or the current runs the other way'
  const [size, good] = [Math.abs(is), Math.abs(should)]
  if (reading.kind === 'amps') {
    if (size > good) return 'More is drawn than should be'
    return size < nothing && good > nothing ? 'The way is open' : 'The way is poor, or part of it is open'
  }
  const lost = valueWords('volts', Math.abs(good - size))
  const toChassis = reading.kind === 'volts' && (reading.black === 'chassis' || reading.red === 'chassis')
  if (size < good) {
    if (size < nothing && good > something)
      return toChassis
        ? 'No feed gets here, or it is held to ground'
        : 'No current runs here, or the two are joined'
    return toChassis ? `${lost} is lost on the way` : `${lost} is missing between the two`
  }
  if (toChassis)
    return good > size / 2
      ? 'Less is drawn than should be, or a supply gets in'
      : 'The way to ground is poor, or a supply gets in'
  return good < something ? 'That is lost between the two' : `${lost} too much stands between the two`
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
