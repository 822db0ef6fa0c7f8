import type { Circuit } from '@/diagrams/document/circuit-schema'
import { readingSchema, type Probe, type Reading } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer, SiteAnswer } from '@/diagrams/faults/answer'
import { shownBy } from '../../support/take-reading'
import { probeOf } from '../../support/trace-fault'
import type { Random } from '../../support/random'
import type { Patient } from './draw-fault'

export interface Step {
  /** Probability of the most probable site or inseparable group, and whether the true site is in it. */
  top: number
  right: boolean
}

export interface Trace {
  answer: Answer
  readings: Reading[]
  minutes: number
  slips: number
  steps: Step[]
  /** What is said of the true site. */
  truth: SiteAnswer
  /** Rank of the true site among sites and groups, 0 first. */
  rank: number
  /** Probability given to the true site or its group at the end. */
  probability: number
  /** Bits of entropy over sites, before and after. */
  bitsBefore: number
  bitsAfter: number
}

const mostReadings = 25
const mostRepeats = 3

/** Takes the readings the planner asks for, repeats one that cannot be, until there is an answer or nothing left to read. */
export function traceRun(
  circuit: Circuit,
  patient: Patient,
  pool: readonly Probe[],
  random: Random,
  slipShare: number,
): Trace {
  const readings: Reading[] = []
  const steps: Step[] = []
  let minutes = 0
  let slips = 0
  let repeats = 0
  let taken = 0
  let bitsBefore = 0
  const read = (id: string, probe: Probe, mayslip: boolean): Reading => {
    const slip = mayslip && random.chance(slipShare)
    if (slip) slips++
    const elsewhere = () => random.pick(pool.filter((other) => other.kind === probe.kind))
    const truth = (slip ? patient.vehicle.read(elsewhere()) : null) ?? patient.vehicle.read(probe)
    if (truth === null) throw new Error(`nothing to read at ${JSON.stringify(probe)}`)
    taken++
    return readingSchema.parse({ id, ...probe, value: shownBy(probe, truth, random.next) })
  }
  for (;;) {
    const answer = evaluate({ circuit, readings, codes: [], priors: 'trade' } as Parameters<
      typeof evaluate
    >[0])
    const units = unitsOf(answer)
    if (readings.length === 0) bitsBefore = entropyOf(units)
    const right = (unit: Unit) => unit.sites.some((site) => patient.sites.includes(site))
    steps.push({ top: units[0]!.probability, right: right(units[0]!) })
    const repeat = answer.outcome === 'cannot-be' && repeats < mostRepeats
    const at = repeat ? readings.findIndex((reading) => reading.id === answer.reading) : -1
    const next = answer.next[0]
    if (at >= 0) {
      repeats++
      const { id, value: _, ...probe } = readings[at]!
      readings[at] = read(id, probe as Probe, true)
      minutes += 0.5
      continue
    }
    if (answer.outcome === 'narrowed' && next && taken < mostReadings) {
      const probe = probeOf(next)
      if (patient.vehicle.read(probe) !== null) {
        readings.push(read(`r${taken + 1}`, probe, true))
        minutes += next.minutes
        continue
      }
    }
    return {
      answer,
      readings,
      minutes,
      slips,
      steps,
      truth: answer.sites.find(({ site }) => site === patient.sites[0])!,
      rank: units.findIndex(right),
      probability: units.find(right)?.probability ?? 0,
      bitsBefore,
      bitsAfter: entropyOf(units),
    }
  }
}

interface Unit {
  sites: string[]
  probability: number
}

/** Sites, those that cannot be told apart as one, and no fault; most probable first. */
function unitsOf(answer: Answer): Unit[] {
  const groupOf = new Map(answer.inseparable.flatMap((group) => group.map((site) => [site, group] as const)))
  const units = new Map<unknown, Unit>([['', { sites: [], probability: answer.noFault }]])
  for (const { site, probability } of answer.sites) {
    const key = groupOf.get(site) ?? site
    const unit = units.get(key) ?? { sites: [], probability: 0 }
    units.set(key, unit)
    unit.sites.push(site)
    unit.probability += probability
  }
  return [...units.values()].toSorted((a, b) => b.probability - a.probability)
}

function entropyOf(units: readonly Unit[]): number {
  return units.reduce((sum, { probability: p }) => sum - (p > 0 ? p * Math.log2(p) : 0), 0)
}

/** Mean distance between the probability claimed and the share that was right, over ten bins of claims. */
export function calibrationError(steps: readonly Step[]): number {
  const bins = Array.from({ length: 10 }, () => ({ claimed: 0, right: 0 }))
  for (const { top, right } of steps) {
    const bin = bins[Math.min(9, Math.floor(10 * top))]!
    bin.claimed += top
    if (right) bin.right++
  }
  return bins.reduce((sum, { claimed, right }) => sum + Math.abs(claimed - right), 0) / steps.length
}

/** The error that chance alone would give claims that are exactly right: so many traces can show no less. */
export function calibrationByChance(steps: readonly Step[], random: Random): number {
  const rounds = 100
  let sum = 0
  for (let i = 0; i < rounds; i++)
    sum += calibrationError(steps.map(({ top }) => ({ top, right: random.chance(top) })))
  return sum / rounds
}
