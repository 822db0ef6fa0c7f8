import type { FaultModel } from './fault-model'

/** Where a fault is while it is absent: the good circuit, or the fuses that it has blown before. */
export type Absent = { cells: readonly (readonly [number, number])[] } | 'anything'

/** Per hypothesis. Two fuses blown and nothing else, or a fuse that the model does not suspect: nothing is foretold of that. */
export function absentCells(model: FaultModel): Absent[] {
  return model.hypotheses.map(({ blows }) => {
    if (blows.length === 0) return { cells: [] }
    if (blows.length > 1) return 'anything'
    const h = model.hypotheses.findIndex(
      (other) => other.site === `part:${blows[0]}` && other.mode === 'blown',
    )
    return h < 0 ? 'anything' : { cells: model.hypotheses[h]!.cells.map((_, c) => [h, c] as const) }
  })
}
