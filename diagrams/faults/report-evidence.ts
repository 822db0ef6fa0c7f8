import type { Network } from '../solver/network'
import { Case } from '../solver/case'
import type { Study } from '../solver/study'
import type { FaultModel } from './fault-model'
import type { Cell, Hypothesis } from './hypothesis'

/**
 * What is told of a vehicle before anything is measured, a code or a complaint: ln of its probability without a
 * fault and under every cell. It moves odds and never clears a place. Cells in the order of the model's hypotheses.
 */
export interface ReportEvidence {
  good: number
  cells: Float64Array[]
}

export function nothingReported(model: FaultModel): ReportEvidence {
  return { good: 0, cells: model.hypotheses.map((h) => new Float64Array(h.cells.length)) }
}

/** Independent reports together; null where none says anything. */
export function allReports(reports: readonly (ReportEvidence | null)[]): ReportEvidence | null {
  const told = reports.filter((report) => report !== null)
  if (told.length < 2) return told[0] ?? null
  return {
    good: told.reduce((sum, report) => sum + report.good, 0),
    cells: told[0]!.cells.map((first, h) =>
      first.map((_, c) => told.reduce((sum, report) => sum + report.cells[h]![c]!, 0)),
    ),
  }
}

/** A severity that stands for a cell: the middle, on the scale its mode is spread over. */
export function middleSeverity({ low, high }: Cell, mode: Hypothesis['mode']): number {
  return mode === 'weak' || low === 0 ? (low + high) / 2 : Math.sqrt(low * high)
}

/**
 * What a look at the faulted vehicle shows, for every cell of a hypothesis. Where two severities show the same, so do
 * those between: the harsher a fault, the more it moves. That saves most of the solving.
 */
export function lookAtCells(
  network: Network,
  studies: readonly Study[],
  hypothesis: Hypothesis,
  look: (cases: readonly Case[], severity: number) => string,
): string[] {
  const alteration = hypothesis.alteration(network)
  const cases = studies.map((study) => new Case(study, alteration))
  const { cells, mode } = hypothesis
  const shown = new Array<string>(cells.length)
  const at = (c: number) => (shown[c] ??= look(cases, middleSeverity(cells[c]!, mode)))
  const fill = (from: number, to: number): void => {
    const [first, last] = [at(from), at(to)]
    if (to - from < 2) return
    if (first === last) shown.fill(first, from + 1, to)
    else {
      const middle = (from + to) >> 1
      fill(from, middle)
      fill(middle, to)
    }
  }
  if (cells.length > 0) fill(0, cells.length - 1)
  return shown
}
