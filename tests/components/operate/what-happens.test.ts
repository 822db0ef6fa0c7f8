import { describe, expect, it } from 'vitest'
import { pointRows, shownVolts } from '@/components/operate/shown-volts'
import { ampsWords, listed, whatHappens } from '@/components/operate/what-happens'
import { restCondition } from '@/diagrams/document/condition-schema'
import { nodeName } from '@/diagrams/document/points'
import { samples } from '@/diagrams/samples/all-samples'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import { controlCombinations } from '@/diagrams/document/condition'

const moments = samples.flatMap((circuit) =>
  controlCombinations(circuit, 64).flatMap((controls) => {
    const solved = solveOperatingPoint(circuit, { ...restCondition, controls })
    return solved.ok ? [{ circuit, point: solved.value }] : []
  }),
)

describe('what a circuit does, in words', () => {
  it('names every load that works, as far as four names go', () => {
    for (const { circuit, point } of moments) {
      const working = [...point.loads].filter(([, load]) => load.works).map(([id]) => id)
      if (working.length === 0 || working.length > 4) continue
      const { does } = whatHappens(circuit, point)
      for (const id of working) {
        const node = circuit.nodes.find((one) => one.id === id)
        expect(does).toContain(node ? nodeName(node) : id)
      }
    }
  })

  it('counts the current of the feeds as what the loads and modules take', () => {
    for (const { circuit, point } of moments) {
      const { draws } = whatHappens(circuit, point)
      if (draws) expect(draws).toMatch(/^-?[\d.]+ m?A from /)
    }
  })

  it('writes amps with as many figures as tell something', () => {
    expect([8.13, 0.142, 0.0023, 0.000001].map(ampsWords)).toEqual(['8.1 A', '0.14 A', '2.3 mA', '0 A'])
  })

  it('joins names as one says them', () => {
    expect(listed(['a'])).toBe('a')
    expect(listed(['a', 'b', 'c'])).toBe('a, b and c')
    expect(listed(['a', 'b', 'c', 'd', 'e'])).toBe('a, b, c and 2 more')
  })
})

describe('the volts that are shown', () => {
  it('put no plate on a joint, and none on an inline cavity that loses nothing', () => {
    for (const { circuit, point } of moments)
      for (const [at] of shownVolts(circuit, point.volts)) {
        const node = circuit.nodes.find((one) => at.startsWith(`${one.id}.`))
        expect(['splice', 'ground']).not.toContain(node?.kind)
      }
  })

  it('list what moved first and lose no point', () => {
    for (const { circuit, point } of moments) {
      const before = new Map(
        [...point.volts].map(([at, volts], index) => [at, index % 3 === 0 ? volts + 1 : volts]),
      )
      const rows = pointRows(circuit, [], point.volts, before)
      const firstStill = rows.findIndex((row) => !row.moved)
      expect(rows.slice(firstStill < 0 ? rows.length : firstStill).some((row) => row.moved)).toBe(false)
      expect(rows.length).toBe(pointRows(circuit, [], point.volts, null).length)
    }
  })
})
