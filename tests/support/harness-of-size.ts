import { controlCombinations } from '@/diagrams/document/condition'
import { restCondition } from '@/diagrams/document/condition-schema'
import { openCircuit } from '@/diagrams/document/open-circuit'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import { HarnessDraft, type NodeInput } from './harness-draft'
import { Loom } from './loom'
import { seededRandom } from './random'

type Pin = Extract<NodeInput, { kind: 'module' }>['pins'][number]

/**
 * A made-up vehicle harness of about so many nodes (50 to 400): from the battery through links and
 * fuses to zones, each behind an inline connector of its own, with splices to the zone's consumers
 * and ground points of its own. A tree but for a few doubled wires and feedbacks through shared
 * grounds. Two controls with six combinations, whatever the size. The same for the same seed.
 */
export function harnessOfSize(seed: number, nodes: number): Circuit {
  for (let again = 0; ; again++) {
    const circuit = drawHarness(seed + 1_000_000 * again, nodes)
    if (again === 20 || comesToRest(circuit))
      return { ...circuit, title: `harness of ${nodes}, seed ${seed}` }
  }
}

function drawHarness(seed: number, nodes: number): Circuit {
  const random = seededRandom(seed)
  const draft = new HarnessDraft(random)
  draft.control(3)
  draft.control(2)
  new Harness(draft, random).lay(nodes)
  const opened = openCircuit(draft.document)
  if (!opened.ok) throw new Error(`seed ${seed}: ${JSON.stringify(opened.problems.slice(0, 3))}`)
  return opened.value
}

/** One in a hundred draws too much through too thin a wire and keeps switching itself; nobody would build that. */
function comesToRest(circuit: Circuit): boolean {
  return controlCombinations(circuit, 8).every(
    (controls) => solveOperatingPoint(circuit, { ...restCondition, controls }).ok,
  )
}

const consumersPerZone = 4

class Harness extends Loom {
  private bus: [string, string] | null = null

  lay(size: number) {
    const { nodes } = this.draft.document
    this.layTrunk()
    const kinds = [
      this.module,
      this.relay,
      this.load,
      this.diodes,
      this.twoSpeed,
      this.load,
      this.relay,
      this.doubled,
    ]
    const turn = this.random.whole(0, kinds.length - 1)
    for (let i = 0; nodes.length < size - 20; i++) {
      if (i % consumersPerZone === 0) this.openZone()
      kinds[(turn + i) % kinds.length]!.call(this)
    }
    // What is left is filled with the smallest consumers, so that the size is met.
    if (!this.zone) this.openZone()
    for (const end of this.danglingSplices()) this.loadAt(end)
    while (nodes.length < size - 3) this.loadAt(this.supply())
  }

  private load() {
    this.loadAt(this.switched(this.supply()))
  }

  /** Two wires side by side between two splices: one of the few loops. */
  private doubled() {
    const one = this.spliceFrom(this.switched(this.supply()))
    const two = this.spliceFrom(one)
    this.draft.wire(one, two)
    this.loadAt(two)
  }

  private twoSpeed() {
    const { draft, random } = this
    const end = this.spliceFrom(this.switched(this.supply()))
    const ohms = random.logUniform(2, 50)
    const id = draft.add({ kind: 'resistor', id: draft.id('r'), ohms, ...this.connector(2) })
    this.run(this.switched(this.supply()), `${id}.a`)
    draft.wire(`${id}.b`, end)
    this.loadAt(end)
  }

  private diodes() {
    const { draft } = this
    const end = draft.add({ kind: 'splice', id: draft.id('sp') })
    for (let i = 0; i < 2; i++) {
      const id = draft.add({ kind: 'diode', id: draft.id('d'), ...this.connector(2) })
      this.run(this.switched(this.supply()), `${id}.anode`)
      draft.wire(`${id}.cathode`, `${end}.s`)
    }
    this.loadAt(`${end}.s`)
  }

  private relayWith(plus: string): string {
    const { draft, random } = this
    const id = draft.add({
      kind: 'relay',
      id: draft.id('k'),
      coilOhms: random.whole(60, 120),
      suppression: random.pick(['none', 'resistor', 'diode'] as const),
      ...this.connector(5),
    })
    this.run(plus, `${id}.86`)
    draft.wire(this.supply(), `${id}.30`)
    this.loadAt(`${id}.87`)
    if (random.chance(0.2)) this.loadAt(`${id}.87a`)
    return `${id}.85`
  }

  private relay() {
    this.earth(this.relayWith(this.switched(this.supply())))
  }

  private module() {
    const { draft, random } = this
    const id = draft.id('m')
    const pins: Pin[] = []
    const after: (() => void)[] = []
    const pin = (circuit: Pin['circuit'], wiring: (end: string) => void): string => {
      const name = String(pins.length + 1)
      pins.push({ pin: name, circuit })
      after.push(() => wiring(`${id}.${name}`))
      return name
    }
    pin({ type: 'supply', ohms: random.logUniform(50, 2000) }, (end) => this.run(this.supply(), end))
    pin({ type: 'ground' }, (end) => this.earth(end))
    pin({ type: 'pull-up', volts: random.pick([5, 12]), ohms: random.logUniform(500, 20_000) }, (end) =>
      this.earth(this.switched(end)),
    )
    const more = [
      () =>
        pin({ type: 'pull-down', ohms: random.logUniform(1000, 50_000) }, (end) =>
          this.run(this.switched(this.supply()), end),
        ),
      () => pin({ type: 'high-side', on: draft.when() }, (end) => this.loadAt(end)),
      () =>
        pin({ type: 'low-side', on: draft.when() }, (end) => draft.wire(this.relayWith(this.supply()), end)),
      () => pin({ type: 'source', volts: 5, ohms: random.logUniform(0.5, 10) }, (end) => this.sensor(end)),
    ]
    const first = random.whole(0, 3)
    for (let i = random.whole(1, 3); i >= 0; i--) more[(first + i) % 4]!()
    if (random.chance(0.7)) {
      const low = pin({ type: 'pull-down', ohms: 20_000 }, (end) => this.run(end, this.busLine(1)))
      pin({ type: 'bridge', to: low, ohms: 120 }, (end) => this.run(end, this.busLine(0)))
    }
    if (random.chance(0.6)) pin({ type: 'none' }, (end) => this.earth(end))
    draft.document.connectors.push({ id: draft.id('pc'), cavities: pins.length })
    const connector = draft.document.connectors.at(-1)!.id
    draft.add({ kind: 'module', id, pins, connector })
    for (const wiring of after) wiring()
  }

  private sensor(from: string) {
    const id = this.draft.add({
      kind: 'resistor',
      id: this.draft.id('sn'),
      ohms: this.random.logUniform(100, 5000),
    })
    this.run(from, `${id}.a`)
    this.earth(`${id}.b`)
  }

  /** A bus's two lines are splices behind the diagnostic connector. */
  private busLine(line: 0 | 1): string {
    if (!this.bus) {
      const connector = this.draft.id('dc')
      this.draft.document.connectors.push({ id: connector, cavities: 16, rows: 2 })
      const id = this.draft.add({ kind: 'dlc', id: this.draft.id('dlc'), connector })
      this.earth(`${id}.4`)
      this.bus = [this.spliceFrom(`${id}.6`), this.spliceFrom(`${id}.14`)]
    }
    return this.bus[line]
  }
}
