import { describe, expect, it } from 'vitest'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { connectorName, nodeName, pointName, pointsOf } from '@/diagrams/document/points'
import type { Reading } from '@/diagrams/document/reading-schema'
import { siteName, sitesOf } from '@/diagrams/document/sites'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { highestVolts } from '@/diagrams/faults/highest-volts'
import { aboutOhms, percentWords, valueWords } from '@/diagrams/faults/value-words'
import { samples } from '@/diagrams/samples/all-samples'
import { plantFault } from '@/tests/support/plant-fault'
import { seededRandom } from '@/tests/support/random'
import { shows, takeReading } from '@/tests/support/take-reading'
import { probeOf } from '@/tests/support/trace-fault'

/** A sentence without the names in it: places, points, parts, connectors, controls and their positions. */
function withoutNames(circuit: Circuit, sentence: string): string {
  const names = [
    ...sitesOf(circuit).map((site) => siteName(circuit, site.id)),
    ...['chassis', ...pointsOf(circuit)].map((point) => pointName(circuit, point)),
    ...pointsOf(circuit).map((point) => pointName(circuit, point).replace(/,.*/, '')),
    ...circuit.nodes.map(nodeName),
    ...circuit.connectors.map(connectorName),
    ...circuit.controls.flatMap((control) => [control.label, ...control.positions]),
  ].flatMap((name) => [name, name.charAt(0).toUpperCase() + name.slice(1)])
  const longestFirst = [...new Set(names.filter((name) => /\d/.test(name)))].toSorted(
    (a, b) => b.length - a.length,
  )
  let rest = sentence
  for (const name of longestFirst) rest = rest.replaceAll(name, '#')
  // Pins of a module are named without it where the module's own name stands before.
  return rest.replaceAll(/pins? [\w+-]+((, | and )[\w+-]+)*( and \d+ more)?/g, '#')
}

/** Every figure that the answer and what it was asked hold, as sentences write figures. */
function figuresOf(circuit: Circuit, readings: readonly Reading[], answer: Answer): Set<string> {
  const found = new Set<string>()
  const add = (text: string) => {
    for (const figure of text.match(/-?\d+(\.\d+)?/g) ?? []) found.add(figure).add(figure.replace('-', ''))
  }
  readings.forEach((reading, index) => {
    add(String(index + 1))
    add(valueWords(reading.kind, reading.value))
    // The same digits on another scale, where a slip is asked about.
    if (typeof reading.value === 'number')
      for (const scale of [-1, 0.1, 0.01, 1e-3, 1e-6, 10, 100, 1000, 1e6])
        add(valueWords(reading.kind, reading.value * scale))
    for (const end of [reading.low, reading.high]) if (end !== undefined) add(valueWords(reading.kind, end))
    const { expected } = answer.readings[index]!
    if (expected === null) return
    add(valueWords(reading.kind, expected))
    // What is lost on the way is the difference of two figures that stand beside it.
    if (typeof expected === 'number' && typeof reading.value === 'number')
      add(valueWords('volts', Math.abs(Math.abs(expected) - Math.abs(reading.value))))
    for (const lead of reading.condition.added) add(String(Number(lead.ohms.toPrecision(3))))
  })
  for (const site of answer.sites) {
    add(percentWords(site.probability))
    for (const mode of site.modes) {
      add(percentWords(mode.probability))
      if (mode.ohms !== null) add(aboutOhms(mode.ohms))
    }
  }
  const left = answer.sites.filter((site) => site.verdict !== 'proved-good').length
  for (const count of [left, answer.sites.length, ...answer.inseparable.map((group) => group.length)])
    for (const less of [0, 2, 4]) add(String(count - less))
  add(String(answer.readings.filter((reading) => reading.agrees).length))
  add(percentWords(answer.noFault))
  for (const charging of [false, true]) add(valueWords('volts', highestVolts(circuit, charging)))
  for (const next of answer.next) {
    add(String(Math.max(1, Math.round(next.minutes))))
    for (const lead of next.condition.added) add(String(Number(lead.ohms.toPrecision(3))))
    for (const outcome of next.outcomes) add(`${outcome.about} ${outcome.leaves.length}`)
  }
  return found
}

function strangers(circuit: Circuit, readings: readonly Reading[], answer: Answer): string[] {
  const known = figuresOf(circuit, readings, answer)
  const sentences = [
    answer.says,
    ...answer.sites.map((site) => site.says),
    ...answer.readings.map((reading) => reading.says),
    ...answer.next.map((next) => next.says),
  ]
  return sentences.flatMap((sentence) =>
    (withoutNames(circuit, sentence).match(/(?<![\w.#])-?\d+(\.\d+)?/g) ?? [])
      .filter((figure) => !known.has(figure))
      .map((figure) => `${figure} in "${sentence}"`),
  )
}

describe('every number in a sentence', () => {
  it.each(samples.map((circuit) => [circuit.title, circuit] as const))(
    'is in the answer or in what was asked: %s',
    (_, circuit) => {
      const random = seededRandom(71)
      const sites = sitesOf(circuit)
      for (let told = 0; told < 2; ) {
        const site = random.pick(sites)
        const fault = plantFault(circuit, site.id, random.pick(site.modes), random.next)
        if (!shows(circuit, fault)) continue
        told++
        const readings: Reading[] = []
        for (let taken = 0; taken < 6; taken++) {
          const answer = evaluate({ circuit, readings, codes: [], priors: 'trade' })
          expect(strangers(circuit, readings, answer)).toEqual([])
          // Now and then a figure slips.
          const next = answer.next[0]
          if (!next) break
          const reading = takeReading(`r${taken}`, circuit, probeOf(next), fault, random.next)
          if (!reading) break
          if (taken === 4 && typeof reading.value === 'number') reading.value = Math.abs(reading.value * 10)
          readings.push(reading)
        }
      }
    },
    120_000,
  )

  it('would be missed if it were invented', () => {
    const circuit = samples[0]!
    const answer = evaluate({ circuit, readings: [], codes: [], priors: 'trade' })
    expect(strangers(circuit, [], { ...answer, says: 'About 77.7 V are lost.' })).toHaveLength(1)
  })
})

describe('every sentence', () => {
  it('is plain: no exclamation, no we, no please, no figure without its unit, no doubled space', () => {
    const circuit = samples[1]!
    const answer = evaluate({ circuit, readings: [], codes: [], priors: 'trade' })
    for (const says of [
      answer.says,
      ...answer.sites.map((site) => site.says),
      ...answer.next.map((next) => next.says),
    ]) {
      expect(says).toMatch(/^[A-Z0-9].*\.$/)
      expect(says).not.toMatch(/!|\bwe\b|\bplease\b|\bnode\b|\bsite\b| {2}|NaN|undefined|Infinity|Ω/i)
    }
  })
})
