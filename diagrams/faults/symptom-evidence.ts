import { restCondition } from '../document/condition-schema'
import type { ControlsSetting } from '../document/circuit-schema'
import { noAlteration } from '../solver/alteration'
import { drivingStudies } from '../solver/blown-fuses'
import { Case, coilVolts, elementVolts, type Settled } from '../solver/case'
import { inputSees, loadWorks } from '../solver/operating-point'
import { Study } from '../solver/study'
import type { FaultModel } from './fault-model'
import type { Posterior } from './posterior'
import { lookAtCells, nothingReported, type ReportEvidence } from './report-evidence'
import type { Symptom } from './symptom-schema'

/** One complaint in twenty is told wrong, or is another fault's (a guess). */
const toldWrong = 0.05
/** A lamp is seen to be dim, a motor heard to be slow, between these parts of the volts they should have (a guess). */
const weakFrom = 0.2
const weakTo = 0.9

export interface SymptomEvidence extends ReportEvidence {
  /** Per hypothesis and cell, a sign for each symptom: "1" it explains it, "0" it does not. */
  explains: string[][]
}

const kept = new WeakMap<FaultModel, Map<string, SymptomEvidence>>()
const mostKept = 20

/**
 * Complaints as evidence: a fault is the likelier for doing to the vehicle what is told of it, in some combination of
 * controls with everything plugged in. They are no readings: they move odds and clear nothing. Null where nothing is told.
 */
export function symptomEvidence(
  model: FaultModel,
  symptoms: readonly Symptom[] | undefined,
): SymptomEvidence | null {
  if (!symptoms || symptoms.length === 0) return null
  let known = kept.get(model)
  if (!known) kept.set(model, (known = new Map()))
  const key = JSON.stringify(symptoms)
  let found = known.get(key)
  if (!found) {
    if (known.size >= mostKept) known.clear()
    known.set(key, (found = weigh(model, symptoms)))
  }
  return found
}

/** Which symptoms the likeliest fault explains, a sign for each. */
export function explainedByLikeliest({ explains }: SymptomEvidence, { cells }: Posterior): string {
  let best = ''
  let most = -1
  cells.forEach((list, h) =>
    list.forEach((mass, c) => {
      if (mass <= most) return
      most = mass
      best = explains[h]![c]!
    }),
  )
  return best
}

/** One complaint, ready to be looked for: where, and whether a faulted vehicle shows it. */
interface Sought {
  studies: readonly Study[]
  /**
   * A "1" or a "0", then what more there is to see, so that severities that look alike are alike. Given the settled
   * cases in the order of `studies`; null where the vehicle does not come to rest.
   */
  look(shown: readonly (readonly [Case, Settled] | null)[]): string
}

function weigh(model: FaultModel, symptoms: readonly Symptom[]): SymptomEvidence {
  const { network } = model
  const driving = drivingStudies(network)
  const sought = symptoms.map((symptom) =>
    'node' in symptom ? seekDoing(model, driving, symptom.node, symptom.does) : seekStop(model, symptom.step),
  )
  // Told twice is told once; a step that changes nothing one could miss tells nothing.
  const counted = sought.map(
    (each, i) =>
      each !== null &&
      symptoms.findIndex((other) => JSON.stringify(other) === JSON.stringify(symptoms[i])) === i,
  )
  const studies = [...new Set(sought.flatMap((each) => each?.studies ?? []))]
  const numberOf = new Map(studies.map((study, i) => [study, i]))
  const explains = model.hypotheses.map((hypothesis) =>
    lookAtCells(network, studies, hypothesis, (cases, severity) => {
      const settled = cases.map((given) => {
        const point = given.settle(severity)
        return point && ([given, point] as const)
      })
      return sought
        .map((each) => each?.look(each.studies.map((s) => settled[numberOf.get(s)!]!)) ?? '0')
        .join(' ')
    }).map((shown) =>
      shown
        .split(' ')
        .map((look) => look[0])
        .join(''),
    ),
  )
  const found = nothingReported(model)
  counted.forEach((counts, i) => {
    if (!counts) return
    // A good vehicle shows none of it.
    found.good += Math.log(toldWrong)
    found.cells.forEach((cells, h) =>
      cells.forEach((_, c) => {
        cells[c]! += Math.log(explains[h]![c]![i] === '1' ? 1 - toldWrong : toldWrong)
      }),
    )
  })
  return { ...found, explains }
}

/** How a load does in one condition, beside how it should. */
type Manner = 'unknown' | 'always' | 'idle' | 'dead' | 'nearly-dead' | 'weak' | 'whole'

const mannersOf: Readonly<Record<'not-work' | 'always' | 'weakly', readonly Manner[]>> = {
  'not-work': ['dead', 'nearly-dead'],
  always: ['always'],
  weakly: ['weak', 'nearly-dead'],
}

function seekDoing(
  { network }: FaultModel,
  studies: readonly Study[],
  node: string,
  does: 'not-work' | 'always' | 'weakly',
): Sought {
  const load = network.loads.findIndex((each) => each.node === node)
  const { branch } = network.loads[load]!
  const doing = (given: Case, settled: Settled) => ({
    works: loadWorks(given, settled, load),
    volts: Math.abs(elementVolts(given, settled, branch)),
  })
  const good = studies.map((study) => {
    const given = new Case(study, noAlteration)
    const settled = given.settle(0)
    return settled && doing(given, settled)
  })
  return {
    studies,
    look: (shown) => {
      const seen = shown.map((each, s): Manner => {
        const before = good[s]
        if (!each || !before) return 'unknown'
        const now = doing(...each)
        if (!before.works) return now.works ? 'always' : 'idle'
        if (now.volts < weakFrom * before.volts) return 'dead'
        if (now.volts > weakTo * before.volts) return now.works ? 'whole' : 'dead'
        return now.works ? 'weak' : 'nearly-dead'
      })
      return `${seen.some((manner) => mannersOf[does].includes(manner)) ? '1' : '0'}${seen.join()}`
    },
  }
}

/** Null where the step changes nothing that could fail to happen. */
function seekStop({ network }: FaultModel, step: string): Sought | null {
  const { sequence } = network.circuit
  const at = sequence.findIndex((each) => each.id === step)
  // Before the first step the vehicle stands as one finds it.
  const settings: ControlsSetting[] = [{}, ...sequence.slice(0, at + 1).map((each) => each.controls)]
  const studies = settings.map((controls) => new Study(network, { ...restCondition, controls }))
  const good = studies.map((study) => {
    const given = new Case(study, noAlteration)
    const settled = given.settle(0)
    return settled && happening(given, settled)
  })
  const [before, then] = [good.at(-2), good.at(-1)]
  if (!before || !then) return null
  const changes = [...then].flatMap((sign, i) => (sign === before[i] ? [] : [i]))
  if (changes.length === 0) return null
  return {
    studies,
    look: (shown) => {
      const now = shown.map((each) => each && happening(...each))
      const last = now.at(-1)
      const asBefore = now.slice(0, -1).every((state, s) => state === good[s])
      const stops = last && asBefore && changes.some((i) => last[i] !== then[i])
      return `${stops ? '1' : '0'}${now.join()}`
    },
  }
}

/** What can be seen, heard or read off a tester: loads that work, relays that pull in, levels at inputs. A sign for each. */
function happening(given: Case, settled: Settled): string {
  const { network } = given.study
  return [
    ...network.loads.map((_, i) => loadWorks(given, settled, i)),
    ...network.relays.map((relay, i) => coilVolts(given, settled, i) >= relay.pullIn),
    ...network.inputs.map((_, i) => inputSees(given, settled, i) === 'high'),
  ]
    .map((on) => (on ? '1' : '0'))
    .join('')
}
