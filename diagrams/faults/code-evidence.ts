import type { CodeEntry } from '../document/circuit-schema'
import { noAlteration } from '../solver/alteration'
import { drivingStudies } from '../solver/blown-fuses'
import { Case } from '../solver/case'
import { inputSees } from '../solver/operating-point'
import type { FaultModel } from './fault-model'

/** About one code in fifty points wrong (engine's page; no published figure found). */
const pointsWrong = 0.02
/** Where the module's own view of the circuit says nothing, its document's list of places is a softer hint. */
const unlisted = 0.1

/** ln of the probability of the codes that are set. Cells in the order of the model's hypotheses. */
export interface CodeEvidence {
  good: number
  cells: Float64Array[]
}

/**
 * Codes as evidence through the module's own view: a fault sets a code when it changes an input's
 * level, in some driving condition, in a way that a fault of the places listed with the code does,
 * and that its failure type names. Evidence, not a filter: nothing is cleared by a code. Null when
 * none of the codes is described in the circuit.
 */
export function codeEvidence(model: FaultModel, codes: readonly string[]): CodeEvidence | null {
  const entries = model.circuit.codes.filter(
    (entry) => entry.sites.length > 0 && codes.some((code) => names(code, entry)),
  )
  if (entries.length === 0) return null
  const changes = model.inputChanges(() => findInputChanges(model))
  const found: CodeEvidence = {
    good: 0,
    cells: model.hypotheses.map((h) => new Float64Array(h.cells.length)),
  }
  for (const entry of entries) {
    const watched = new Set<string>()
    model.hypotheses.forEach((hypothesis, h) => {
      if (!entry.sites.includes(hypothesis.site)) return
      for (const cell of changes[h]!)
        for (const change of cell) if (isOfType(change, entry.failureType)) watched.add(change)
    })
    found.good += Math.log(pointsWrong)
    model.hypotheses.forEach((hypothesis, h) => {
      const listed = entry.sites.includes(hypothesis.site)
      hypothesis.cells.forEach((_, c) => {
        const sets = watched.size > 0 ? changes[h]![c]!.some((change) => watched.has(change)) : listed
        found.cells[h]![c]! += Math.log(sets ? 1 - pointsWrong : watched.size > 0 ? pointsWrong : unlisted)
      })
    })
  }
  return found
}

/** "B1042" names every entry of that code, "B1042-13" the one with its failure type, or one without any. */
function names(code: string, entry: CodeEntry): boolean {
  const [plain, type] = code.split('-')
  return (
    entry.code === plain &&
    (type === undefined || entry.failureType === undefined || entry.failureType === type)
  )
}

/**
 * Failure types of SAE J2012, electrical group: 11 and 14 speak of a line held low (14 also of an open
 * one), 12 and 15 of one held high (15 also of an open one); the others may be either.
 */
function isOfType(change: string, failureType: string | undefined): boolean {
  if (failureType === '11' || failureType === '14') return change.endsWith('low')
  if (failureType === '12' || failureType === '15') return change.endsWith('high')
  return true
}

/** Per hypothesis and cell: "condition input level" for every input whose level differs from the good circuit's. */
function findInputChanges(model: FaultModel): string[][][] {
  const { network } = model
  if (network.inputs.length === 0) return model.hypotheses.map((h) => h.cells.map(() => []))
  const studies = drivingStudies(network)
  const good = studies.map((study) => {
    const given = new Case(study, noAlteration)
    const settled = given.settle(0)
    return settled && network.inputs.map((_, i) => inputSees(given, settled, i))
  })
  return model.hypotheses.map((hypothesis) => {
    const alteration = hypothesis.alteration(network)
    const cases = studies.map((study) => new Case(study, alteration))
    return hypothesis.cells.map(({ low, high }) => {
      const severity = hypothesis.mode === 'weak' || low === 0 ? (low + high) / 2 : Math.sqrt(low * high)
      return cases.flatMap((given, s) => {
        const before = good[s]
        const settled = before && given.settle(severity)
        if (!settled) return []
        return network.inputs.flatMap((_, i) => {
          const level = inputSees(given, settled, i)
          return level === before[i] ? [] : [`${s} ${i} ${level}`]
        })
      })
    })
  })
}
