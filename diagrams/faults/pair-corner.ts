import type { Reading } from '../document/reading-schema'
import type { States } from '../solver/study'
import { chargingRange, restingRange, type ScaleRange } from './battery-range'
import type { Evidence } from './evidence'
import type { FaultModel } from './fault-model'
import type { PairSolver, RestingPair, SolvedPair } from './pair-solver'
import type { Prediction } from './prediction'
import { windowsOf, type Windows } from './tolerance-rule'

/** A reading with what it allows, prepared for many boxes. */
export interface AskedReading {
  reading: Reading
  /** Its number, and that of its condition: equal conditions have the same. */
  number: number
  condition: number
  windows: Windows
  range: ScaleRange
}

/** Readings that a good circuit would not show come first: they refute the most. */
export function askedReadings(
  model: FaultModel,
  evidence: Evidence,
  readings: readonly Reading[],
): AskedReading[] {
  const asked = readings.map(
    (reading, number): AskedReading => ({
      reading,
      number,
      condition: evidence.conditions[number]!,
      windows: windowsOf(reading, { network: model.network }),
      range: reading.condition.charging ? chargingRange : restingRange,
    }),
  )
  const agrees = (r: number) => Number(evidence.fits(-1, 0, (one) => one === r))
  return asked.toSorted((x, y) => agrees(x.number) - agrees(y.number))
}

/** A pair at two definite severities, with what was solved of it so far. */
export class BoxCorner {
  private readonly rests: (RestingPair | null)[] = []
  private readonly predictions: { key: string; prediction: Prediction }[][] = []

  constructor(
    private readonly pair: SolvedPair,
    private readonly heldAt: number,
    private readonly sweptAt: number,
  ) {}

  /** Null when the circuit does not come to rest in the reading's condition. */
  settle(solver: PairSolver, { condition, reading }: AskedReading): RestingPair | null {
    let found = this.rests[condition]
    if (found === undefined) {
      found = solver.settle(this.pair, this.heldAt, this.sweptAt, reading)
      this.rests[condition] = found
    }
    return found
  }

  /** What the reading would show with the parts in a state; null when the circuit does not come to rest at all. */
  predict(solver: PairSolver, asked: AskedReading, key: string, states: States): Prediction | null {
    const known = (this.predictions[asked.number] ??= [])
    for (const one of known) if (one.key === key) return one.prediction
    const rests = this.settle(solver, asked)
    if (!rests) return null
    const prediction = solver.predict(rests, states, asked.reading)
    known.push({ key, prediction })
    return prediction
  }
}
