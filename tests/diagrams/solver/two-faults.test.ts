import { describe, expect, it } from 'vitest'
import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { samples } from '@/diagrams/samples/all-samples'
import { noAlteration } from '@/diagrams/solver/alteration'
import { at, Case, unitCurrentIn, voltsAt, type Settled } from '@/diagrams/solver/case'
import { openCase } from '@/diagrams/solver/faulted-case'
import { alterationOf } from '@/diagrams/solver/fault-alteration'
import { besides, faultHolder } from '@/diagrams/solver/held-fault'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { Study } from '@/diagrams/solver/study'
import { measureTwoFaults, openTwoFaultCase, type TwoFaults } from '@/diagrams/solver/two-fault-case'
import { buildNetwork } from '@/diagrams/solver/build-network'
import { documentDeck, type RestingStates } from '../../support/document-deck'
import { inCondition, madeCircuit, onOff, whenOn } from '../../support/made-circuit'
import { runNgspice, type Deck, type DeckElement } from '../../support/ngspice'
import { seededRandom, type Random } from '../../support/random'
import { randomCircuit } from '../../support/random-circuit'
import { randomFault } from '../../support/random-fault'

/** Two faults of different places that do not sit in the same branch. */
function randomPair(circuit: Circuit, random: Random): TwoFaults {
  for (;;) {
    const pair = [randomFault(circuit, random), randomFault(circuit, random)] as const
    if (pair[0].site === pair[1].site) continue
    const network = buildNetwork(circuit)
    const [a, b] = pair.map((fault) => alterationOf(network, fault))
    if (!a!.series.some((branch) => b!.series.includes(branch))) return pair
  }
}

function statesOf(given: Case, settled: Settled, blown: readonly string[]): RestingStates {
  const { relays, modules, diodes, branches } = given.study.network
  const { states } = settled
  return {
    relays: new Set(relays.filter((_, i) => states.relays[i]).map((relay) => relay.node)),
    modules: new Set(modules.filter((_, i) => states.modules[i]).map((module) => module.node)),
    diodes: new Set(
      diodes
        .filter((_, i) => states.diodes[i])
        .map((diode) => branches[diode.branch]!.name.replace(/^part:/, '').replace('.coil', '')),
    ),
    blown: new Set(blown),
  }
}

/** The deck with both faults, from those with none, one and the other: what one changes is changed, resistances in one place add. */
function bothChanges(good: DeckElement[], one: DeckElement[], other: DeckElement[]): DeckElement[] {
  const named = (deck: DeckElement[]) => new Map(deck.map((element) => [element.name, element]))
  const [a, b] = [named(one), named(other)]
  const both = good.flatMap((element) => {
    const [x, y] = [a.get(element.name), b.get(element.name)]
    if (!x || !y) return []
    const changed = x.a === element.a && x.b === element.b ? y : x
    const volts = x.volts === element.volts ? y.volts : x.volts
    return [
      {
        ...element,
        a: changed.a,
        b: changed.b,
        ohms: x.ohms + y.ohms - element.ohms,
        ...(volts ? { volts } : {}),
      },
    ]
  })
  const before = named(good)
  const added = (deck: DeckElement[], tag: string) =>
    deck.filter((e) => !before.has(e.name)).map((e) => ({ ...e, name: `${e.name} ${tag}` }))
  return [...both, ...added(one, 'A'), ...added(other, 'B')]
}

/**
 * Largest difference from ngspice of any point's volts, as a share of 1e-6 V and 1e-6 of the value; on a live
 * circuit, of its 12.6 V: two faults can leave battery and harness floating on nothing but the leak, where
 * both solvers are off the exact figure by a few microvolts.
 */
function worstAgainstNgspice(subjects: { circuit: Circuit; condition: Condition; faults: TwoFaults }[]) {
  const decks: Deck[] = []
  const checks: ((answer: ReturnType<typeof runNgspice>[number]) => { share: number; told: string })[] = []
  let unstable = 0
  for (const { circuit, condition, faults } of subjects) {
    const { given, severity, blown } = openTwoFaultCase(circuit, condition, faults)
    const settled = given.settle(severity)
    if (!settled) {
      unstable++
      continue
    }
    const states = statesOf(given, settled, blown)
    const deckOf = (fault?: PlantedFault) => documentDeck(circuit, condition, states, fault)
    const deck: Deck = { elements: bothChanges(deckOf(), deckOf(faults[0]), deckOf(faults[1])) }
    const nets = new Set(deck.elements.flatMap((element) => [element.a, element.b]))
    const points = [...given.study.network.unknownOf].filter(([point, u]) => u >= 0 && nets.has(point))
    const amps = 1e-3
    if (!condition.battery) deck.injected = { into: points[0]![0], outOf: points.at(-1)![0], amps }
    const perAmp = condition.battery ? null : unitCurrentIn(settled, points[0]![1], points.at(-1)![1])
    decks.push(deck)
    checks.push((answer) => {
      let worst = { share: 0, told: '' }
      for (const [point, unknown] of points) {
        const ours = perAmp ? amps * at(perAmp, unknown) : voltsAt(settled, unknown)
        const theirs = answer.volts(point)
        const size = Math.max(Math.abs(ours), Math.abs(theirs), condition.battery ? 12.6 : 0)
        const share = Math.abs(ours - theirs) / (1e-6 + 1e-6 * size)
        if (!(share <= worst.share))
          worst = {
            share,
            told: `${circuit.title} ${JSON.stringify(faults)} ${point}: ${ours}, ngspice ${theirs}`,
          }
      }
      return worst
    })
  }
  const found = runNgspice(decks).map((answer, i) => checks[i]!(answer))
  return { compared: decks.length, unstable, worst: found.toSorted((x, y) => y.share - x.share)[0]! }
}

function anyCondition(circuit: Circuit, random: Random): Condition {
  const controls = random.pick(controlCombinations(circuit, 100))
  return { ...restCondition, controls, battery: random.chance(0.75) }
}

describe('two faults at once', () => {
  it('agree with ngspice on the samples and on random harnesses, written from the document alone', () => {
    const subjects = Array.from({ length: 260 }, (_, i) => {
      const random = seededRandom(500 + i)
      const circuit = i < 100 ? samples[i % samples.length]! : randomCircuit(500 + i)
      return { circuit, condition: anyCondition(circuit, random), faults: randomPair(circuit, random) }
    })
    const { compared, unstable, worst } = worstAgainstNgspice(subjects)
    console.log(
      `two faults: ${compared} compared with ngspice (${unstable} do not come to rest); nearest to the limit ${worst.share.toExponential(1)} of it: ${worst.told}`,
    )
    expect(compared).toBeGreaterThan(200)
    expect(worst.share).toBeLessThanOrEqual(1)
  }, 120_000)

  it('are the same whichever of them is held', () => {
    let compared = 0
    for (let seed = 1; seed <= 120; seed++) {
      const random = seededRandom(900 + seed)
      const circuit = randomCircuit(900 + seed)
      const [a, b] = randomPair(circuit, random)
      if (a.mode === 'weak' || b.mode === 'weak') continue
      const condition = anyCondition(circuit, random)
      const network = buildNetwork(circuit)
      const volts = ([held, swept]: TwoFaults) => {
        const first = faultHolder(network, alterationOf(network, held))(held.ohms ?? 0)
        const study = new Study(first.network, condition)
        const settled = new Case(study, besides(first, alterationOf(network, swept))).settle(swept.ohms ?? 0)
        return settled && [...network.unknownOf.values()].map((unknown) => voltsAt(settled, unknown))
      }
      const [one, other] = [volts([a, b]), volts([b, a])]
      expect(one === null).toBe(other === null)
      if (!one || !other) continue
      compared++
      one.forEach((value, i) => expect(Math.abs(value - other[i]!)).toBeLessThan(1e-4))
    }
    expect(compared).toBeGreaterThan(80)
  })

  it('are what the first one makes of a circuit with the second drawn into it', () => {
    const nodes = (second: boolean) => [
      { kind: 'battery' as const, id: 'bat', label: 'B', x: 0, y: 0 },
      { kind: 'fuse' as const, id: 'f', label: 'F', x: 0, y: 0, amps: 10 },
      { kind: 'load' as const, id: 'lamp', label: 'L', x: 0, y: 0, ohms: 6 },
      { kind: 'load' as const, id: 'heater', label: 'H', x: 0, y: 0, ohms: 3 },
      { kind: 'splice' as const, id: 's', label: 'S', x: 0, y: 0 },
      { kind: 'ground' as const, id: 'g', label: 'G', x: 0, y: 0 },
      { kind: 'ground' as const, id: 'g2', label: 'G2', x: 0, y: 0 },
      ...(second ? [{ kind: 'resistor' as const, id: 'bad', label: 'R', x: 0, y: 0, ohms: 1.8 }] : []),
    ]
    const common = ['bat.pos > f.in', 'f.out > s.s', 's.s > lamp.a', 's.s > heater.a', 'heater.b > g2.in']
    const plain = madeCircuit(nodes(false), [...common, 'lamp.b > g.in'])
    const drawn = madeCircuit(nodes(true), [...common, 'lamp.b > bad.a', 'bad.b > g.in'])
    const first: PlantedFault = { site: 'wire:w2', mode: 'resistive', ohms: 0.7 }
    const second: PlantedFault = { site: 'part:g', mode: 'resistive', ohms: 1.8 }
    for (const red of ['s.s', 'lamp.b', 'heater.a', 'f.out']) {
      const probe = { kind: 'volts' as const, red, black: 'chassis', condition: inCondition() }
      const opened = openCase(drawn, probe.condition, first)
      if (!opened.ok) throw new Error(opened.problem.message)
      const settled = opened.value.given.settle(0.7)!
      const both = measureTwoFaults(plain, probe, [first, second])
      // The drawn resistor brings two wire halves of half a milliohm of its own.
      expect(both).toBeCloseTo(voltsAt(settled, opened.value.given.study.network.unknownOf.get(red)!), 2)
    }
  })

  it('leave a fuse whole when the short lies behind an open, and blow it when it does not', () => {
    const circuit = madeCircuit(
      [
        { kind: 'battery', id: 'bat', label: 'B', x: 0, y: 0 },
        { kind: 'fuse', id: 'f', label: 'F', x: 0, y: 0, amps: 10 },
        { kind: 'load', id: 'lamp', label: 'L', x: 0, y: 0, ohms: 6 },
        {
          kind: 'switch',
          id: 'sw',
          label: 'SW',
          x: 0,
          y: 0,
          contacts: [{ id: 'c', a: 'in', b: 'out', closed: whenOn('key') }],
        },
        { kind: 'ground', id: 'g', label: 'G', x: 0, y: 0 },
      ],
      ['bat.pos > f.in', 'f.out > sw.in', 'sw.out > lamp.a', 'lamp.b > g.in'],
      { controls: [onOff('key')] },
    )
    const short: PlantedFault = { site: 'wire:w3', mode: 'short-to-ground', ohms: 0.05 }
    const blownBy = (other: PlantedFault, order: 'first' | 'last' = 'first') =>
      openTwoFaultCase(circuit, inCondition(), order === 'first' ? [other, short] : [short, other]).blown
    for (const order of ['first', 'last'] as const) {
      expect(blownBy({ site: 'wire:w2', mode: 'open', ohms: 1e10 }, order)).toEqual([])
      expect(blownBy({ site: 'wire:w2', mode: 'resistive', ohms: 50 }, order)).toEqual([])
      expect(blownBy({ site: 'wire:w4', mode: 'open', ohms: 1e10 }, order)).toEqual(['f'])
    }
  })

  it('judge a part by its own element: a coil does not pull in behind a bad joint of its own', () => {
    const circuit = madeCircuit(
      [
        { kind: 'battery', id: 'bat', label: 'B', x: 0, y: 0 },
        { kind: 'load', id: 'lamp', label: 'L', x: 0, y: 0, ohms: 6 },
        { kind: 'ground', id: 'g', label: 'G', x: 0, y: 0 },
      ],
      ['bat.pos > lamp.a', 'lamp.b > g.in'],
    )
    const network = buildNetwork(circuit)
    const held = faultHolder(network, alterationOf(network, { site: 'part:lamp', mode: 'resistive' }))(6)
    const given = new Case(new Study(held.network, inCondition()), besides(held, noAlteration))
    const settled = given.settle(0)!
    const works = (faults: TwoFaults) =>
      measureTwoFaults(circuit, { kind: 'works', node: 'lamp', condition: inCondition() }, faults)
    expect(voltsAt(settled, network.unknownOf.get('lamp.a')!)).toBeCloseTo(12.58, 1)
    const small: PlantedFault = { site: 'wire:w1', mode: 'resistive', ohms: 0.5 }
    expect(works([{ site: 'part:lamp', mode: 'resistive', ohms: 6 }, small])).toBe(false)
    expect(works([{ site: 'part:lamp', mode: 'resistive', ohms: 0.5 }, small])).toBe(true)
  })
})
