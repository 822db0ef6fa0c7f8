import fc from 'fast-check'
import { expect, it } from 'vitest'
import type { NodeInput } from '@/tests/support/harness-draft'
import { madeCircuit, operate } from '@/tests/support/made-circuit'
import { seededRandom } from '@/tests/support/random'

/** Diodes, resistors and feeds between a few splices, any way round, loops and all. */
function diodeNetwork(seed: number) {
  const random = seededRandom(seed)
  const joints = Array.from({ length: random.whole(3, 7) }, (_, i) => `s${i}.s`)
  const nodes: NodeInput[] = [
    ...joints.map((end) => ({ id: end.slice(0, -2), kind: 'splice' as const })),
    { id: 'g', kind: 'ground' },
  ]
  const wires: string[] = []
  const between = (id: string, a: string, b: string) =>
    wires.push(`${random.pick(joints)} > ${id}.${a}`, `${id}.${b} > ${random.pick([...joints, 'g.in'])}`)
  for (let i = random.whole(1, 3); i > 0; i--) {
    nodes.push({
      id: `fd${i}`,
      kind: 'feed',
      volts: random.pick([5, 12, 12.6, 14]),
      ohms: random.logUniform(0.01, 10),
    })
    wires.push(`fd${i}.out > ${random.pick(joints)}`)
  }
  for (let i = random.whole(2, 10); i > 0; i--) {
    nodes.push({ id: `d${i}`, kind: 'diode', volts: random.pick([0, 0.3, 0.7]) })
    between(`d${i}`, 'anode', 'cathode')
  }
  for (let i = random.whole(2, 8); i > 0; i--) {
    nodes.push({ id: `r${i}`, kind: 'resistor', ohms: random.logUniform(0.1, 1e6) })
    between(`r${i}`, 'a', 'b')
  }
  return madeCircuit(nodes, wires)
}

it('a network of diodes always comes to rest, each conducting forwards or blocking below its volts', () => {
  let conducting = 0
  let blocking = 0
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 1e9 }), (seed) => {
      const circuit = diodeNetwork(seed)
      const { volts, wireAmps } = operate(circuit)
      for (const node of circuit.nodes) {
        if (node.kind !== 'diode') continue
        const across = volts.get(`${node.id}.anode`)! - volts.get(`${node.id}.cathode`)!
        const amps = wireAmps.get(circuit.wires.find((w) => w.to === `${node.id}.anode`)!.id)!
        // Forwards: its volts and 0.01 ohm. Else nothing but what leaks.
        if (across > node.volts + 1e-6) {
          conducting++
          expect(Math.abs(amps - (across - node.volts) / 0.01)).toBeLessThan(1e-6 + 1e-8 * amps)
        } else {
          blocking++
          expect(Math.abs(amps)).toBeLessThan(1.1e-4)
          expect(amps).toBeGreaterThan(-1e-6)
        }
      }
    }),
    { numRuns: 400, seed: 20_261_201 },
  )
  expect(Math.min(conducting, blocking)).toBeGreaterThan(100)
})
