import { describe, expect, it } from 'vitest'
import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition, type Condition } from '@/diagrams/document/condition-schema'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { samples } from '@/diagrams/samples/all-samples'
import { openCase } from '@/diagrams/solver/faulted-case'
import { solveOperatingPoint, type OperatingPoint } from '@/diagrams/solver/operating-point'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import example from '@/tests/fixtures/example-circuit.json'
import { documentDeck, type RestingStates } from '@/tests/support/document-deck'
import { runNgspice, type Deck } from '@/tests/support/ngspice'
import { seededRandom } from '@/tests/support/random'
import { randomCircuit } from '@/tests/support/random-circuit'
import { randomFault } from '@/tests/support/random-fault'

interface Subject {
  name: string
  circuit: Circuit
  condition: Condition
  fault?: PlantedFault
}
interface Solved extends Subject {
  point: OperatingPoint
  states: RestingStates
}

/** Solves here; null when it does not come to rest. Diodes are the one state an operating point does not tell. */
function solveHere(subject: Subject): Solved | null {
  const { circuit, condition, fault } = subject
  const solved = solveOperatingPoint(circuit, condition, fault)
  if (!solved.ok) return null
  const opened = openCase(circuit, condition, fault)
  if (!opened.ok) throw new Error(opened.problem.message)
  const { given, severity } = opened.value
  const settled = given.settle(severity)!
  const { network } = given.study
  const point = solved.value
  const on = (states: Map<string, boolean>) => new Set([...states].filter(([, yes]) => yes).map(([id]) => id))
  return {
    ...subject,
    point,
    states: {
      relays: on(point.relays),
      modules: on(point.modules),
      blown: new Set(point.blown),
      diodes: new Set(
        network.diodes
          .filter((_, i) => settled.states.diodes[i])
          .map((diode) => network.branches[diode.branch]!.name.slice('part:'.length)),
      ),
    },
  }
}

/** Points and wires whose figures differ, with both figures. */
function differences(solved: readonly Solved[]) {
  const decks: Deck[] = solved.map((s) => ({
    elements: documentDeck(s.circuit, s.condition, s.states, s.fault),
  }))
  const answers = runNgspice(decks)
  const wrong: string[] = []
  let worstVolts = 0
  let worstAmps = 0
  solved.forEach(({ name, circuit, point }, i) => {
    const answer = answers[i]!
    for (const [at, ours] of point.volts) {
      if (at === 'chassis') continue
      const theirs = answer.volts(netOf(circuit, at))
      worstVolts = Math.max(worstVolts, Math.abs(ours - theirs))
      if (!(Math.abs(ours - theirs) <= 1e-6 * Math.abs(theirs) + 1e-6))
        wrong.push(`${name}: ${at} ${ours} V, ${theirs} V`)
    }
    for (const [wire, ours] of point.wireAmps) {
      const theirs = answer.amps(`W:${wire}`)
      worstAmps = Math.max(worstAmps, Math.abs(ours - theirs))
      if (!(Math.abs(ours - theirs) <= 1e-6 * Math.abs(theirs) + 1e-6))
        wrong.push(`${name}: ${wire} ${ours} A, ${theirs} A`)
    }
  })
  return { wrong, worstVolts, worstAmps, answers }
}

function netOf(circuit: Circuit, point: string): string {
  const battery = circuit.nodes.find((n) => n.kind === 'battery')
  const neg = `${battery?.id}.neg`
  const bonded = !circuit.wires.some((w) => w.from === neg || w.to === neg)
  return bonded && (point === neg || point === `${neg}:part`) ? '0' : point
}

function conditions(circuit: Circuit): Condition[] {
  return controlCombinations(circuit, 200).map((controls) => ({ ...restCondition, controls }))
}

const opened = openCircuit(example)
if (!opened.ok) throw new Error('the example circuit does not open')

describe('the list of branches agrees with the page of the circuit format, written out anew and solved by ngspice', () => {
  it('on every sample and 100 random harnesses in two conditions, without a fault', () => {
    const subjects: Subject[] = [...samples, opened.value].flatMap((circuit) =>
      conditions(circuit).map((condition) => ({ name: circuit.title, circuit, condition })),
    )
    for (let seed = 2001; seed <= 2100; seed++) {
      const circuit = randomCircuit(seed)
      const random = seededRandom(seed)
      const ids = [
        ...circuit.connectors.map((c) => c.id),
        ...circuit.nodes.filter((n) => n.kind === 'fuse' || n.kind === 'relay').map((n) => n.id),
      ]
      const condition = random.pick(conditions(circuit))
      const points = circuit.wires.flatMap((w) => [w.from, w.to])
      subjects.push(
        { name: `random ${seed}`, circuit, condition },
        {
          name: `random ${seed}, opened`,
          circuit,
          condition: {
            ...condition,
            charging: random.chance(0.5),
            unplugged: [random.pick(ids), random.pick(ids)],
            added: random.chance(0.5)
              ? [
                  {
                    from: random.pick(points),
                    to: random.chance(0.5) ? 'chassis' : random.pick(points),
                    ohms: 48,
                  },
                ]
              : [],
          },
        },
      )
    }
    const solved = subjects.map(solveHere).filter((s) => s !== null)
    const found = differences(solved)
    console.log(
      `written out anew: ${solved.length} good circuits, worst ${found.worstVolts.toExponential(2)} V, ${found.worstAmps.toExponential(2)} A`,
    )
    expect(found.wrong.slice(0, 5)).toEqual([])
    expect(solved.length).toBeGreaterThan(200)
    // The states themselves, judged on ngspice's volts by the page's words.
    solved.forEach((one, i) => expect(contradictions(one, found.answers[i]!.volts)).toEqual([]))
  }, 120_000)

  it('on 220 random harnesses with a fault of any kind and severity', () => {
    const subjects: Subject[] = []
    for (let seed = 3001; seed <= 3220; seed++) {
      const circuit = randomCircuit(seed, 4)
      const random = seededRandom(seed)
      const fault = randomFault(circuit, random)
      subjects.push({
        name: `random ${seed} ${JSON.stringify(fault)}`,
        circuit,
        condition: random.pick(conditions(circuit)),
        fault,
      })
    }
    const solved = subjects.map(solveHere).filter((s) => s !== null)
    const found = differences(solved)
    console.log(
      `written out anew: ${solved.length} faulty circuits, worst ${found.worstVolts.toExponential(2)} V, ${found.worstAmps.toExponential(2)} A, ` +
        `${solved.filter((s) => s.states.blown.size > 0).length} with a blown fuse`,
    )
    expect(found.wrong.slice(0, 5)).toEqual([])
    expect(solved.length).toBeGreaterThan(200)
  }, 120_000)
})

/** States of a good circuit that its own volts deny. Nearer than a microvolt to its limit either state will do. */
function contradictions(solved: Solved, volts: (net: string) => number): string[] {
  const { circuit, condition, states, point } = solved
  const wrong: string[] = []
  const claim = (what: string, over: number, limit: number, state: boolean) => {
    if (Math.abs(over - limit) > 1e-6 && over >= limit !== state)
      wrong.push(`${solved.name}: ${what} ${state}, but ${over} V against ${limit} V`)
  }
  const inside = (id: string, connector: string | undefined, port: string) =>
    volts(connector === undefined ? `${id}.${port}` : `${id}.${port}:part`)
  for (const node of circuit.nodes) {
    const at = (port: string) => inside(node.id, node.connector, port)
    if (node.kind === 'relay') {
      const pulled = condition.unplugged.includes(node.id)
      const coil = pulled ? 0 : Math.abs(at('85') - at('86'))
      if (!pulled) claim(`relay ${node.id}`, coil, node.pullIn, states.relays.has(node.id))
      if (node.suppression === 'diode' && !pulled)
        claim(`diode of ${node.id}`, at('85') - at('86'), 0.7, states.diodes.has(`${node.id}.suppression`))
    }
    if (node.kind === 'diode')
      claim(`diode ${node.id}`, at('anode') - at('cathode'), node.volts, states.diodes.has(node.id))
    if (node.kind === 'load')
      claim(
        `load ${node.id}`,
        Math.abs(at('a') - at('b')),
        12 * node.worksFrom,
        point.loads.get(node.id)!.works,
      )
    if (node.kind === 'module') {
      const drawn = node.pins.some((pin) => pin.circuit.type === 'ground')
      const ground = drawn ? volts(`G:${node.id}`) : 0
      const supplies = node.pins
        .filter((pin) => pin.circuit.type === 'supply')
        .map((pin) => volts(`I:${node.id}.${pin.pin}`) - ground)
      claim(`module ${node.id}`, Math.min(...supplies), node.runsFrom, states.modules.has(node.id))
      for (const pin of node.pins) {
        if (pin.circuit.type !== 'pull-up' && pin.circuit.type !== 'pull-down') continue
        const limit = pin.threshold ?? (pin.circuit.type === 'pull-up' ? pin.circuit.volts / 2 : 6)
        const seen = point.sees.get(`${node.id}.${pin.pin}`) === 'high'
        claim(`pin ${node.id}.${pin.pin}`, volts(`I:${node.id}.${pin.pin}`) - ground, limit, seen)
      }
    }
  }
  return wrong
}
