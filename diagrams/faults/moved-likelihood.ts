import type { Reading } from '../document/reading-schema'
import { nominalBatteryVolts } from '../solver/constants'
import { chargingRange, restingRange } from './battery-range'
import type { FaultModel } from './fault-model'
import { likelihoodOf, type LikelihoodAt } from './likelihood'
import { logSum } from './log-sum'
import type { Absent } from './moved-absent'
import { atEnd, isMoved } from './moved-reading'
import type { CellPrediction, PredictionTable } from './prediction-table'
import type { ReadingScope } from './reading-scope'
import { accuracyOf } from './tolerance-rule'

/** A fault that comes and goes is there for half of the readings, for all one knows. */
const present = 0.5
/** It comes back as severe as it was this often, else as severe as it may be (a guess). */
const asBefore = 0.8
/** A meter too slow for the fault shows something between this often (a guess). */
const between = 0.2
/** Moving the harness leaves the fault as it is this often (a guess). */
const unprovoked = 0.3
/** Places of the battery over which the probability is averaged. */
const steps = 7

/**
 * ln of the probability of the readings under every cell, the fault there or not there for each of them, and under no
 * fault. Moved readings count three times: at rest, and at each end, where one end has the fault and the other has not.
 */
export function movedLikelihoods(
  model: FaultModel,
  readings: readonly Reading[],
  tables: readonly PredictionTable[],
  absent: readonly Absent[],
): { good: number; cells: number[][] } {
  const scope = { network: model.network }
  const good = readings.map((reading, r) => endsOf(reading, tables[r]!.good, scope))
  const [withoutFault] = averages(readings, 1, (r, scale) => {
    const { rest, low, high } = good[r]!
    return [rest(scale) * low(scale) * high(scale)]
  })
  return {
    good: withoutFault!,
    cells: model.hypotheses.map(({ cells, mode }, h) => {
      const own = readings.map((reading, r) =>
        tables[r]!.cells[h]!.map((cell) => endsOf(reading, cell, scope)),
      )
      const without = readings.map((reading, r) => {
        const gone = absent[h]!
        const [first] = gone === 'anything' ? [] : gone.cells
        return first ? endsOf(reading, tables[r]!.cells[first[0]]![first[1]]!, scope) : good[r]!
      })
      return averages(readings, cells.length, (r, scale) => {
        const gone = without[r]!
        const there = (c: number) =>
          mode === 'weak' ? (cells[c]!.low + cells[c]!.high) / 2 / nominalBatteryVolts : scale
        // As severe as the cell, or as severe as this way to fail may be.
        const likely = (end: 'rest' | 'low' | 'high') => {
          const each = own[r]!.map((ends, c) => ends[end](there(c)))
          const any = each.reduce((sum, one) => sum + one, 0) / each.length
          return each.map((one) => asBefore * one + (1 - asBefore) * any)
        }
        const rest = likely('rest')
        const either = rest.map((one) => present * one + (1 - present) * gone.rest(scale))
        if (!gone.isMoved) return either
        const [low, high] = [likely('low'), likely('high')]
        const stays = gone.rest(scale) * gone.low(scale) * gone.high(scale)
        return either.map((one, c) => {
          const passing = (end: 'low' | 'high', figure: number) =>
            (1 - between) * figure + between * gone.passing(own[r]![c]!.typical(there(c)), end, scale)
          const swing =
            (one *
              (passing('low', low[c]!) * gone.high(scale) + gone.low(scale) * passing('high', high[c]!))) /
            2
          const same = present * rest[c]! * low[c]! * high[c]! + (1 - present) * stays
          return (1 - unprovoked) * swing + unprovoked * same
        })
      })
    }),
  }
}

/** Probabilities of a reading at rest and at both ends of its swing, as functions of the battery. */
interface Ends {
  isMoved: boolean
  rest: LikelihoodAt
  low: LikelihoodAt
  high: LikelihoodAt
  /** The figure this cell shows; NaN where it foretells none. */
  typical: LikelihoodAt
  /** Density at an end when the meter shows something between this cell's figure and the given one. */
  passing(figure: number, end: 'low' | 'high', scale: number): number
}

const certain: LikelihoodAt = () => 1

function endsOf(reading: Reading, cell: CellPrediction, scope: ReadingScope): Ends {
  const ends = cell.ends?.[0] ?? null
  const typical = (scale: number) =>
    ends ? (scale * (ends[0].battery + ends[1].battery) + ends[0].fixed + ends[1].fixed) / 2 : Number.NaN
  const at = (each: Reading) => likelihoodOf(each, ends, scope)
  const moved = isMoved(reading)
  return {
    isMoved: moved,
    rest: at(reading),
    low: moved ? at(atEnd(reading, 'low')) : certain,
    high: moved ? at(atEnd(reading, 'high')) : certain,
    typical,
    passing: (figure, end, scale) => {
      const value = moved ? reading[end] : 'OL'
      const { percent, floor } = accuracyOf(reading)
      const limit = 2 * ((percent / 100) * Math.abs(figure) + floor) + 1e-6
      const width = Math.abs(figure - typical(scale))
      // Between two figures that the meter cannot tell apart lies nothing.
      if (typeof value !== 'number' || !(width > limit) || !Number.isFinite(width)) return 0
      const inside = (value - figure) * (value - typical(scale)) <= 0
      return inside ? 1 / width : 0
    },
  }
}

/**
 * ln of the mean over where the battery may stand, resting and charging apart, of the product over readings; for `count`
 * cells at once. `likelihoods` gives one reading's for all of them.
 */
function averages(
  readings: readonly Reading[],
  count: number,
  likelihoods: (r: number, scale: number) => readonly number[],
): number[] {
  const found = new Array<number>(count).fill(0)
  for (const charging of [false, true]) {
    const used = [...readings.keys()].filter((r) => readings[r]!.condition.charging === charging)
    if (used.length === 0) continue
    const { low, high } = charging ? chargingRange : restingRange
    const logs = found.map(() => new Float64Array(steps))
    for (let i = 0; i < steps; i++)
      for (const r of used)
        likelihoods(r, low + ((i + 0.5) / steps) * (high - low)).forEach((one, c) => {
          logs[c]![i]! += Math.log(one)
        })
    logs.forEach((list, c) => {
      found[c]! += logSum([...list]) - Math.log(steps)
    })
  }
  return found
}
