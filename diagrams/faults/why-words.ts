import type { Circuit } from '../document/circuit-schema'
import { pointName } from '../document/points'
import { portsOf } from '../document/ports'
import type { Reading } from '../document/reading-schema'
import type { Mode } from '../document/sites'
import type { ReadingAnswer } from './answer'
import { readingPlace } from './reading-sentence'
import { hopsFrom, siteEnds } from './site-points'
import { valueWords } from './value-words'

/** Faults that stand in the way of the current, so that volts are lost over them. */
const inTheWay: readonly Mode[] = ['open', 'resistive', 'blown', 'stuck-open']
/** Volts between two readings that are worth speaking of. */
const tellingVolts = 0.3

type VoltsReading = Extract<Reading, { kind: 'volts' }> & { value: number }

/** Why a place is held to be at fault: the figures that say so, nearest to it, or nothing. */
export function whyWords(
  circuit: Circuit,
  readings: readonly Reading[],
  judged: readonly ReadingAnswer[],
  site: string,
  mode: Mode,
): string {
  const hops = hopsFrom(circuit, site)
  if (!inTheWay.includes(mode)) return telling(circuit, readings, judged, hops, true)
  return lossWords(circuit, readings, hops, site, mode) || telling(circuit, readings, judged, hops, false)
}

/** Volts across the place, or what goes in and what comes out on its two sides. */
function lossWords(
  circuit: Circuit,
  readings: readonly Reading[],
  hops: ReadonlyMap<string, number>,
  site: string,
  mode: Mode,
): string {
  const ends = siteEnds(circuit, site)
  const volts = readings.filter(
    (reading): reading is VoltsReading => reading.kind === 'volts' && typeof reading.value === 'number',
  )
  const across = volts.find(
    ({ red, black, value }) =>
      Math.abs(value) >= tellingVolts && ends?.includes(red) && ends.includes(black) && red !== black,
  )
  if (across) {
    const lost = valueWords('volts', Math.abs(across.value))
    return mode === 'resistive' ? `${lost} is lost there under load.` : `${lost} stands across it.`
  }
  const pair = contrast(volts, hops)
  if (!pair) return ''
  const [high, low] = pair
  const enclosing = ends?.includes(high.red) && ends.includes(low.red)
  const [whereIn, whereOut] = enclosing ? sideWords(circuit, high.red, low.red) : [null, null]
  const into = valueWords('volts', high.value)
  const out = valueWords('volts', low.value)
  if (whereIn !== null) return `${into} goes in ${whereIn}, ${out} comes out ${whereOut}.`
  return `${into} at ${pointName(circuit, high.red)}, ${out} at ${pointName(circuit, low.red)}.`
}

/** The two readings to chassis of one condition that differ most; of those that differ nearly as much, the nearest to the place. */
function contrast(
  volts: readonly VoltsReading[],
  hops: ReadonlyMap<string, number>,
): [VoltsReading, VoltsReading] | null {
  const toChassis = volts.filter((reading) => reading.black === 'chassis' && hops.has(reading.red))
  const pairs = toChassis.flatMap((high) =>
    toChassis
      .filter(
        (low) =>
          high.value - low.value > tellingVolts &&
          JSON.stringify(high.condition) === JSON.stringify(low.condition),
      )
      .map((low) => ({
        high,
        low,
        by: high.value - low.value,
        far: hops.get(high.red)! + hops.get(low.red)!,
      })),
  )
  const most = Math.max(0, ...pairs.map((pair) => pair.by))
  const near = pairs.filter((pair) => pair.by > 0.9 * most).toSorted((x, y) => x.far - y.far)[0]
  return near ? [near.high, near.low] : null
}

/** "on side a" for the two sides of a connector, "at F12 in" for a part and for a wire. */
function sideWords(circuit: Circuit, high: string, low: string): [string, string] {
  const side = (point: string) => {
    const node = circuit.nodes.find((n) => portsOf(n).some((port) => `${n.id}.${port.name}` === point))
    if (node?.kind !== 'cavity') return `at ${pointName(circuit, point)}`
    const letter = point.endsWith('.a') ? 'a' : 'b'
    const sides = circuit.connectors.find((c) => c.id === node.connector)?.sides
    return `on ${sides?.[letter] ? `the ${sides[letter]}` : `side ${letter}`}`
  }
  const [onHigh, onLow] = [side(high), side(low)]
  const bothSides = onHigh.startsWith('on ') && onLow.startsWith('on ')
  // Two wires' ends in two connectors are points, not sides.
  return bothSides && high.split('.')[0] === low.split('.')[0]
    ? [onHigh, onLow]
    : [`at ${pointName(circuit, high)}`, `at ${pointName(circuit, low)}`]
}

/** The reading nearest to the place that is not as in a good circuit; where something touches, ohms speak first. */
function telling(
  circuit: Circuit,
  readings: readonly Reading[],
  judged: readonly ReadingAnswer[],
  hops: ReadonlyMap<string, number>,
  ohmsFirst: boolean,
): string {
  let nearest: { reading: Reading; told: ReadingAnswer; far: number } | null = null
  readings.forEach((reading, r) => {
    const told = judged[r]!
    if (told.agrees || told.expected === null) return
    const low = ohmsFirst && reading.kind === 'ohms' && Number(reading.value) < Number(told.expected)
    const far =
      Math.min(...pointsRead(circuit, reading).map((point) => hops.get(point) ?? Infinity)) - (low ? 1000 : 0)
    if (!nearest || far < nearest.far) nearest = { reading, told, far }
  })
  if (!nearest) return ''
  const { reading, told } = nearest as { reading: Reading; told: ReadingAnswer }
  const place = readingPlace(circuit, reading)
  switch (reading.kind) {
    case 'works':
      return `${place} ${reading.value ? 'works, though it should not' : 'does not work, though it should'}.`
    case 'sees':
      return `${place}: the module sees ${reading.value}, it should see ${told.expected}.`
    default:
      return `${valueWords(reading.kind, reading.value)} ${reading.kind === 'amps' ? 'in' : 'at'} ${place}, a good circuit has ${valueWords(reading.kind, told.expected!)}.`
  }
}

function pointsRead(circuit: Circuit, reading: Reading): string[] {
  switch (reading.kind) {
    case 'volts':
    case 'ohms':
      return [reading.red, reading.black].map((point) => point.replace(':part', ''))
    case 'amps': {
      const wire = circuit.wires.find((w) => w.id === reading.wire)
      return wire ? [wire.from, wire.to] : []
    }
    case 'works': {
      const node = circuit.nodes.find((n) => n.id === reading.node)
      return node ? portsOf(node).map((port) => `${node.id}.${port.name}`) : []
    }
    case 'sees':
      return [reading.pin]
  }
}
