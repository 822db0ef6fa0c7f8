import { describe, expect, it } from 'vitest'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import type { Probe } from '@/diagrams/document/reading-schema'
import { weighReadings } from '@/diagrams/faults/weighed-readings'
import { faultModelOf } from '@/diagrams/faults/fault-model'
import { posteriorOf } from '@/diagrams/faults/posterior'
import { chooseNext } from '@/diagrams/planner/choose-next'
import { planNext } from '@/diagrams/planner/plan-next'
import type { WeighedReading } from '@/diagrams/planner/scales'
import { samples } from '@/diagrams/samples/all-samples'

const circuit = samples.find((sample) => sample.title.startsWith('Two-speed'))!
let number = 0

/** A reading of given worth; each parts the suspects in its own way unless told otherwise. */
function weighed(
  probe: Partial<Probe> & { kind: Probe['kind'] },
  bits: number,
  minutes: number,
  part = number++,
) {
  const bins = [
    { low: 0, high: 0, members: [part] },
    { low: 12, high: 12, members: [part + 1000] },
  ]
  const full = { condition: restCondition, ...probe } as Probe
  return {
    probe: full,
    bits,
    minutes,
    bins,
    row: new Float64Array(),
    rate: bits / minutes,
  } satisfies WeighedReading
}
const volts = (red: string, condition: Condition = restCondition) =>
  ({ kind: 'volts', red, black: 'chassis', condition }) as const

describe('the best reading and its alternatives', () => {
  it('has the best first, then what has fewer bits per minute', () => {
    const found = [0.3, 0.9, 0.6, 0.5].map((bits, i) => weighed(volts(`f2${i}.in`), bits, 2))
    expect(chooseNext(circuit, found).map(({ bits }) => bits)).toEqual([0.9, 0.6, 0.5, 0.3])
  })

  it('counts a reading as well as its minutes: one that tells twice as much wins over a quicker one', () => {
    const quick = weighed(volts('f20.in'), 0.4, 0.5)
    const telling = weighed(volts('f21.in'), 1.2, 3)
    expect(chooseNext(circuit, [quick, telling])[0]!.bits).toBe(1.2)
  })

  it('leaves out the same split at a higher price', () => {
    const found = [
      weighed(volts('f20.in'), 0.9, 2, 5),
      weighed(volts('f20.out'), 0.9, 3, 5),
      weighed(volts('f21.in'), 0.3, 2),
    ]
    expect(chooseNext(circuit, found).map(({ bits, minutes }) => [bits, minutes])).toEqual([
      [0.9, 2],
      [0.3, 2],
    ])
  })

  it('names another place, another way, one that opens nothing, and a quicker one before more of the same', () => {
    const opened = { ...restCondition, unplugged: ['k1'] }
    const best = weighed(volts('f20.in', opened), 2, 4)
    const same = [1.9, 1.8, 1.7, 1.6].map((bits) => weighed(volts('f20.in', opened), bits, 4))
    const elsewhere = weighed(volts('f21.in', opened), 1, 4)
    const otherWay = weighed({ kind: 'ohms', red: 'f20.in', black: 'chassis', condition: opened }, 0.9, 4)
    const nothingOpened = weighed(volts('f20.in'), 0.8, 4)
    const quicker = weighed(volts('f20.in', opened), 0.7, 2)
    const chosen = chooseNext(circuit, [best, ...same, elsewhere, otherWay, nothingOpened, quicker])
    expect(chosen.map(({ bits }) => bits)).toEqual([2, 0.7, 1, 0.9, 0.8])
  })

  it('offers at least three alternatives on every sample before any reading, none at more bits per minute than the best', () => {
    for (const sample of samples) {
      const model = faultModelOf(sample)
      const posterior = posteriorOf(model, weighReadings(model, []), 'trade')
      const { next } = planNext(model, posterior, [])
      const rates = next.map(({ bits, minutes }) => bits / minutes)
      expect(next.length, sample.title).toBeGreaterThanOrEqual(4)
      expect(rates, sample.title).toEqual(rates.toSorted((a, b) => b - a))
      expect(new Set(next.map(({ probe }) => JSON.stringify(probe))).size).toBe(next.length)
    }
  })
})
