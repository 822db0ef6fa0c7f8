import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Condition } from '@/diagrams/document/condition-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Overlay, ReadingFlag, ShortTail } from '@/diagrams/drawing/overlay'
import type { Answer, NextReading } from '@/diagrams/faults/answer'
import { readingNumber } from '@/lib/client/evaluator/numbered-readings'
import { valueWords } from '@/lib/client/meter/reading-words'
import { likeliestMode } from './likeliest-mode'

/** What a trace shows on its sheet: verdicts once there is a reading, a flag for each reading, the next target. */
export function traceOverlay({
  circuit,
  readings,
  answer,
  condition,
  next,
}: {
  circuit: Circuit
  readings: readonly Reading[]
  answer: Answer | null
  condition: Condition | null
  next: NextReading | null
}): Overlay {
  const marked = readings.length > 0 && answer
  return {
    moment: {
      positions: condition?.controls ?? {},
      unplugged: condition?.unplugged ?? [],
      blown: marked ? blownFuses(answer) : [],
    },
    verdicts: new Map(marked ? answer.sites.map((site) => [site.site, site.verdict]) : []),
    ...(marked && answer.pairs ? { letters: lettersOf(answer) } : {}),
    flags: [...(next ? nextFlags(next) : []), ...readingFlagsOf(readings, answer)],
    tails: marked ? shortTailsOf(circuit, answer) : [],
  }
}

/** A and B for the two of the likeliest pair that are sure, and for what no reading tells from them. */
function lettersOf(answer: Answer): Map<string, string> {
  const letters = new Map<string, string>()
  answer.pairs?.[0]?.sites.forEach((site, which) => {
    const group = answer.inseparable.find((sites) => sites.includes(site)) ?? [site]
    for (const one of group)
      if (answer.sites.find((each) => each.site === one)?.verdict === 'faulty')
        letters.set(one, which === 0 ? 'A' : 'B')
  })
  return letters
}

/** One flag a spot, the newest reading there: older ones stand in the list. */
function readingFlagsOf(readings: readonly Reading[], answer: Answer | null): ReadingFlag[] {
  const byPlace = new Map<string, ReadingFlag>()
  readings.forEach((reading, index) => {
    const at = flagPlace(reading)
    if (at === null) return
    const number = readingNumber(index)
    const odd = answer?.outcome === 'cannot-be' && answer.reading === number
    byPlace.set(at, {
      at,
      number,
      value: valueWords(reading.kind, reading.value),
      style: odd ? 'odd' : 'taken',
    })
  })
  return [...byPlace.values()]
}

function flagPlace(reading: Reading): string | null {
  switch (reading.kind) {
    case 'volts':
    case 'ohms':
      return reading.red === 'chassis' ? reading.black : reading.red
    case 'amps':
      return `wire:${reading.wire}`
    case 'works':
      return `node:${reading.node}`
    case 'sees':
      return reading.pin
  }
}

function nextFlags(next: NextReading): ReadingFlag[] {
  const flag = (at: string | undefined, number: string): ReadingFlag[] =>
    at === undefined || at === 'chassis' ? [] : [{ at, number, value: '', style: 'next' }]
  switch (next.kind) {
    case 'volts':
    case 'ohms':
      return [...flag(next.red, 'Next: red lead'), ...flag(next.black, 'Next: black lead')]
    case 'amps':
      return flag(next.wire && `wire:${next.wire}`, 'Next: clamp here')
    case 'works':
      return flag(next.node && `node:${next.node}`, 'Next: does it work')
    case 'sees':
      return flag(next.pin, 'Next: live data')
  }
}

/** Fuses that the fault found has blown, so that the drawing shows the consequence, too. */
function blownFuses(answer: Answer): string[] {
  const blown = answer.sites
    .filter((site) => site.verdict === 'faulty')
    .flatMap((site) => likeliestMode(site)?.blows ?? [])
  return [...new Set(blown)]
}

/** One tail for places that cannot be told apart: it is one short, and three tails side by side would look like three. */
function shortTailsOf(circuit: Circuit, answer: Answer): ShortTail[] {
  const faulty = answer.sites.filter((site) => site.verdict === 'faulty' && site.site.startsWith('wire:'))
  const groupOf = (site: string) => answer.inseparable.find((group) => group.includes(site))
  return faulty
    .filter((site, at) => {
      const group = groupOf(site.site)
      return !group || faulty.findIndex((one) => group.includes(one.site)) === at
    })
    .flatMap((site): ShortTail[] => {
      const wire = site.site.slice('wire:'.length)
      const mode = likeliestMode(site)
      switch (mode?.mode) {
        case 'short-to-ground':
          return [{ wire, to: 'ground', label: 'touches ground' }]
        case 'short-to-supply':
          return [{ wire, to: 'supply', label: 'touches supply' }]
        case 'short-to-wire': {
          const other = circuit.wires.find((one) => one.id === mode.other)
          return other ? [{ wire, to: { wire: other.id }, label: `touches ${other.colour || other.id}` }] : []
        }
        default:
          return []
      }
    })
}
