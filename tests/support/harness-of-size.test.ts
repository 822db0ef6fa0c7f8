import { describe, expect, it } from 'vitest'
import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition } from '@/diagrams/document/condition-schema'
import { checkCircuit } from '@/diagrams/document/check-circuit'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import { harnessOfSize } from './harness-of-size'
import { shapeOf } from './harness-shape'
import { madeCircuit } from './made-circuit'

const sizes = [50, 100, 200, 400]
const seeds = Array.from({ length: 8 }, (_, i) => i + 1)
const made = sizes.flatMap((size) => seeds.map((seed) => ({ size, circuit: harnessOfSize(seed, size) })))
const mean = (list: readonly number[]) => list.reduce((sum, x) => sum + x, 0) / list.length
const nodeKinds = 'battery feed ground fuse switch relay load resistor diode splice cavity module dlc'.split(
  ' ',
)
const pinKinds = 'supply ground pull-up pull-down low-side high-side source bridge none'.split(' ')

describe('the figures that make a harness', () => {
  it('are right for one counted by hand', () => {
    const circuit = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        { id: 's1', kind: 'splice' },
        { id: 's2', kind: 'splice' },
        { id: 'cv', kind: 'cavity', connector: 'c1', number: 1 },
        { id: 'lamp', kind: 'load', ohms: 6 },
        { id: 'g', kind: 'ground' },
      ],
      ['bat.pos > s1.s', 's1.s > s2.s', 's1.s > s2.s', 's2.s > cv.a', 'cv.b > lamp.a', 'lamp.b > g.in'],
      { connectors: [{ id: 'c1', cavities: 2 }] },
    )
    const shape = shapeOf(circuit)
    // Six wires, two of them side by side; one loop over six nodes; behind the splices four wires to the cavity.
    expect(shape.bridges).toBeCloseTo(4 / 6, 12)
    expect(shape.copperLoops).toBeCloseTo(1 / 6, 12)
    expect(shape.partLoops).toBeCloseTo(1 / 6, 12)
    expect(shape.spliceWires).toEqual([3, 3])
    expect(shape.wiresPerPiece.toSorted((a, b) => b - a)).toEqual([4, 1, 1])
    // From the battery three wires to the cavity, from the lamp one; past the lamp there is none.
    expect(shape.wiresToContact).toEqual([3, 1, Infinity, Infinity])
  })
})

describe('a harness of a given size', () => {
  it('is valid, within a tenth of its size, and the same for the same seed', () => {
    for (const { size, circuit } of made) {
      expect(checkCircuit(circuit)).toEqual([])
      expect(Math.abs(circuit.nodes.length / size - 1), circuit.title).toBeLessThanOrEqual(0.1)
    }
    expect(harnessOfSize(3, 100)).toEqual(harnessOfSize(3, 100))
    expect(harnessOfSize(3, 100)).not.toEqual(harnessOfSize(4, 100))
  })

  it('is a tree but for a few loops', () => {
    for (const { circuit } of made) {
      const shape = shapeOf(circuit)
      expect(shape.bridges, circuit.title).toBeGreaterThan(0.94)
      expect(shape.copperLoops, circuit.title).toBeLessThan(0.03)
      // Consumers that share a fuse and a ground make a loop through their parts.
      expect(shape.partLoops, circuit.title).toBeLessThan(0.35)
    }
  })

  it('has splices of three to seven wires and a connector every few wires', () => {
    const shapes = made.map(({ circuit }) => shapeOf(circuit))
    const splices = shapes.flatMap((shape) => shape.spliceWires)
    const share = (what: (wires: number) => boolean) => splices.filter(what).length / splices.length
    expect(Math.min(...splices)).toBeGreaterThanOrEqual(2)
    expect(share((wires) => wires >= 3)).toBeGreaterThan(0.6)
    expect(share((wires) => wires <= 7)).toBeGreaterThan(0.95)
    expect(mean(splices)).toBeGreaterThan(3)
    expect(mean(splices)).toBeLessThan(4.5)
    for (const shape of shapes) {
      expect(mean(shape.wiresPerPiece)).toBeGreaterThan(1)
      expect(mean(shape.wiresPerPiece)).toBeLessThan(3)
      const near = shape.wiresToContact.filter((wires) => wires <= 3).length
      expect(near / shape.wiresToContact.length).toBeGreaterThan(0.6)
    }
  })

  it('holds every node kind and pin circuit, all of them in one from 200 nodes on', () => {
    const kindsIn = (list: typeof made) => {
      const nodes = list.flatMap(({ circuit }) => circuit.nodes)
      const pins = nodes.flatMap((node) => (node.kind === 'module' ? node.pins : []))
      return [new Set(nodes.map((n) => n.kind)), new Set(pins.map((pin) => pin.circuit.type))] as const
    }
    for (const size of sizes) {
      const [nodes, pins] = kindsIn(made.filter((one) => one.size === size))
      expect([...nodes].toSorted()).toEqual(nodeKinds.toSorted())
      expect([...pins].toSorted()).toEqual(pinKinds.toSorted())
    }
    for (const one of made.filter(({ size }) => size >= 200))
      expect(kindsIn([one])[0].size).toBe(nodeKinds.length)
  })

  it('has six combinations of controls, and comes to rest in them', () => {
    for (const { circuit } of made) {
      const combinations = controlCombinations(circuit, 100)
      expect(combinations).toHaveLength(6)
      for (const controls of combinations)
        expect(solveOperatingPoint(circuit, { ...restCondition, controls }).ok, circuit.title).toBe(true)
    }
  })
})
