import { describe, expect, it } from 'vitest'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { restCondition } from '@/diagrams/document/condition-schema'
import type { Probe, Reading } from '@/diagrams/document/reading-schema'
import { sitesOf, type Mode } from '@/diagrams/document/sites'
import type { Evidence } from '@/diagrams/faults/evidence'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { misfitOf, type Misfit } from '@/diagrams/faults/misfit'
import { pairOdds } from '@/diagrams/faults/pair-answer'
import { twoFaultsIn } from '@/diagrams/faults/pair-odds'
import type { PairSearch } from '@/diagrams/faults/pair-search'
import { posteriorOf } from '@/diagrams/faults/posterior'
import { modeWeight } from '@/diagrams/faults/priors'
import { runToEnd } from '@/diagrams/faults/steps'
import { planPairs } from '@/diagrams/planner/plan-pairs'
import { candidateReadings } from '@/diagrams/planner/candidates'
import { samples } from '@/diagrams/samples/all-samples'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import type { TwoFaults } from '@/diagrams/solver/two-fault-case'
import { perturbCircuit } from '../../support/perturbed-circuit'
import { plantFault } from '../../support/plant-fault'
import { seededRandom, type Random } from '../../support/random'
import { shows, takeReading } from '../../support/take-reading'
import { readTwoFaults } from '../../support/trace-two-faults'

/** How many of each kind are drawn; more of them with PAIR_ROUNDS. */
const rounds = Number(process.env.PAIR_ROUNDS ?? 1)

interface Judgement {
  misfit: Misfit | null
  pairs: PairSearch | null
}

/** What the evaluator makes of readings, before it plans and explains. */
function judge(circuit: Circuit, readings: Reading[]): Judgement {
  const model = faultModelOf(circuit)
  const full = weighReadings(model, readings)
  const misfit = misfitOf(model, readings, full, (evidence: Evidence) =>
    posteriorOf(model, evidence, 'trade'),
  )
  const weightOf = (site: string, mode: Mode) => modeWeight(circuit, site, mode, 'trade')
  return { misfit, pairs: misfit && runToEnd(twoFaultsIn(model, readings, full, misfit, weightOf)) }
}

function anyFault(circuit: Circuit, random: Random): PlantedFault {
  for (;;) {
    const site = random.pick(sitesOf(circuit))
    const fault = plantFault(circuit, site.id, random.pick(site.modes), random.next)
    if (shows(circuit, fault)) return fault
  }
}

/** Readings a person might take near these places: first those that a good vehicle would not show, then any. */
function readingsNear(
  circuit: Circuit,
  places: readonly string[],
  random: Random,
  count: number,
  take: (id: string, probe: Probe) => Reading | null,
): Reading[] {
  const sets = candidateReadings(circuit, places, restCondition, { limit: 16 })
  const odd: Reading[] = []
  const plain: Reading[] = []
  for (let i = 0; i < 12 * count && (odd.length < 0.7 * count || plain.length < 0.3 * count); i++) {
    const probe = random.pick(random.pick(sets).probes)
    const reading = take(`r${i}`, probe)
    const good = reading && takeReading('good', circuit, probe, undefined, () => 0.5)
    if (!reading || !good) continue
    if (differs(reading, good)) odd.push(reading)
    else plain.push(reading)
  }
  const chosen = odd.slice(0, Math.ceil(0.7 * count))
  return [...chosen, ...plain.slice(0, count - chosen.length)]
}

function differs(one: Reading, other: Reading): boolean {
  if (typeof one.value !== 'number' || typeof other.value !== 'number') return one.value !== other.value
  return Math.abs(one.value - other.value) > 0.3 + 0.15 * Math.abs(other.value)
}

describe('two faults planted in the samples', () => {
  it('are named first more often than not, wherever no single fault explains the readings', () => {
    const count = { drawn: 0, single: 0, again: 0, two: 0, first: 0, five: 0, one: 0 }
    const times: number[] = []
    for (let seed = 1; seed <= 16 * rounds; seed++) {
      const random = seededRandom(7000 + seed)
      const circuit = samples[seed % samples.length]!
      const faults: TwoFaults = [anyFault(circuit, random), anyFault(circuit, random)]
      if (faults[0].site === faults[1].site) continue
      const places = faults.map((fault) => fault.site)
      const vehicle = perturbCircuit(circuit, 11.8 + random.next(), random.next)
      const readings = readingsNear(circuit, places, random, random.whole(8, 12), (id, probe) =>
        readTwoFaults(id, vehicle, probe, faults, random.next),
      )
      count.drawn++
      const before = process.cpuUsage()
      const { misfit, pairs } = judge(circuit, readings)
      if (misfit) times.push(process.cpuUsage(before).user / 1000)
      if (!misfit) count.single++
      else if (!pairs) count.again++
      else {
        count.two++
        const { inseparable } = runToEnd(planPairs(pairs, readings))
        const alike = (x: string, y: string) =>
          x === y || inseparable.some((group) => group.includes(x) && group.includes(y))
        const named = pairOdds(pairs).map(
          ({ sites: [x, y] }) =>
            (alike(x, places[0]!) && alike(y, places[1]!)) || (alike(x, places[1]!) && alike(y, places[0]!)),
        )
        const [x, y] = pairOdds(pairs)[0]!.sites
        if (named[0]) count.first++
        if (named.slice(0, 5).includes(true)) count.five++
        if (places.some((place) => alike(x, place) || alike(y, place))) count.one++
      }
    }
    times.sort((x, y) => x - y)
    console.log(
      `${count.drawn} pairs planted, 8 to 12 readings each: ${count.single} explained by a single fault, ${count.again} taken for one fault and a slip, ` +
        `${count.two} for two faults: of these the true pair first in ${count.first}, among five in ${count.five}, one of the two places in the first pair in ${count.one}; ` +
        `processor time median ${Math.round(times[times.length >> 1] ?? 0)} ms, longest ${Math.round(times.at(-1) ?? 0)} ms`,
    )
    expect(count.two).toBeGreaterThan(2 * rounds)
    expect(count.first).toBeGreaterThan(0.5 * count.two)
    expect(count.one).toBeGreaterThan(0.85 * count.two)
  }, 600_000)
})

describe('one fault', () => {
  it('is never taken for two, whatever is read of it within its limits', () => {
    let judged = 0
    for (let seed = 1; seed <= 60 * rounds; seed++) {
      const random = seededRandom(9000 + seed)
      const circuit = samples[seed % samples.length]!
      const fault = anyFault(circuit, random)
      const vehicle = perturbCircuit(circuit, 11.8 + random.next(), random.next)
      if (!shows(vehicle, fault)) continue
      const readings = readingsNear(circuit, [fault.site], random, random.whole(3, 12), (id, probe) =>
        takeReading(id, vehicle, probe, fault, random.next),
      )
      judged++
      expect(judge(circuit, readings).pairs, `${circuit.title} ${JSON.stringify(fault)}`).toBeNull()
    }
    expect(judged).toBeGreaterThan(50 * rounds)
  }, 600_000)

  it('with one slipped reading has that reading taken again, rarely another, hardly ever a second fault', () => {
    const count = { drawn: 0, unnoticed: 0, named: 0, other: 0, two: 0 }
    for (let seed = 1; seed <= 32 * rounds; seed++) {
      const random = seededRandom(11_000 + seed)
      const circuit = samples[seed % samples.length]!
      const fault = anyFault(circuit, random)
      const vehicle = perturbCircuit(circuit, 11.8 + random.next(), random.next)
      const take = (id: string, probe: Probe) => takeReading(id, vehicle, probe, fault, random.next)
      const readings = readingsNear(circuit, [fault.site], random, random.whole(8, 12), take)
      const slipped = slipOne(circuit, readings, random, take)
      if (!slipped) continue
      count.drawn++
      const { misfit, pairs } = judge(circuit, slipped.readings)
      if (!misfit) count.unnoticed++
      else if (pairs) count.two++
      else if (misfit.reading === slipped.at) count.named++
      else count.other++
    }
    const noticed = count.drawn - count.unnoticed
    console.log(
      `${count.drawn} faults with one slipped reading: ${count.unnoticed} explained by some single fault, ${count.named} slipped readings named, ` +
        `${count.other} times another one, ${count.two} taken for two faults`,
    )
    expect(noticed).toBeGreaterThan(5 * rounds)
    expect(count.named).toBeGreaterThan(0.7 * noticed)
    expect(count.two).toBeLessThan(0.2 * noticed)
  }, 600_000)
})

/** Puts in place of one reading what another point shows in the same condition; null when that is the same. */
function slipOne(
  circuit: Circuit,
  readings: Reading[],
  random: Random,
  take: (id: string, probe: Probe) => Reading | null,
): { readings: Reading[]; at: number } | null {
  for (let tries = 0; tries < 20; tries++) {
    const at = random.whole(0, readings.length - 1)
    const reading = readings[at]!
    const sets = candidateReadings(circuit, [], reading.condition, { limit: 1 })
    const probes = sets.flatMap((set) => set.probes).filter((probe) => probe.kind === reading.kind)
    if (probes.length === 0) continue
    const elsewhere = take(reading.id, { ...random.pick(probes), condition: reading.condition })
    if (!elsewhere || !differs(elsewhere, reading)) continue
    return {
      readings: readings.map((one, r) => (r === at ? ({ ...one, value: elsewhere.value } as Reading) : one)),
      at,
    }
  }
  return null
}
