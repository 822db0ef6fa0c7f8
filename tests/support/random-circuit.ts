import { openCircuit } from '@/diagrams/document/open-circuit'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { HarnessDraft, type NodeInput } from './harness-draft'
import { seededRandom, type Random } from './random'

/**
 * A made-up circuit that looks like a vehicle's: a tree from battery and feeds through fuses and
 * splices to consumers and shared grounds, an inline connector every few wires, few loops; every
 * node kind and pin circuit turns up. Valid by construction, the same for the same seed.
 */
export function randomCircuit(seed: number, consumers?: number): Circuit {
  const random = seededRandom(seed)
  const draft = new HarnessDraft(random)
  const harness = new RandomHarness(draft, random)
  harness.lay(consumers ?? random.whole(1, 6))
  const opened = openCircuit(draft.document)
  if (!opened.ok) throw new Error(`seed ${seed}: ${JSON.stringify(opened.problems.slice(0, 3))}`)
  return opened.value
}

class RandomHarness {
  /** Ends that are live, and ends that are ground, to hang more from. */
  private readonly fed: string[] = []
  private readonly grounds: string[] = []
  private diagnostic: { id: string; used: number } | null = null
  private readonly buses: string[] = []

  constructor(
    private readonly draft: HarnessDraft,
    private readonly random: Random,
  ) {}

  lay(consumers: number) {
    const { draft, random } = this
    for (let i = random.whole(1, 3); i > 0; i--) draft.control()
    const battery = draft.add({ kind: 'battery', id: 'bat', ohms: random.logUniform(0.005, 0.05) })
    if (random.chance(0.5)) {
      this.grounds.push(this.ground())
      draft.run(`${battery}.neg`, this.grounds[0]!)
    }
    this.fed.push(this.splice(`${battery}.pos`))
    if (random.chance(0.4)) this.fed.push(this.feed())
    const kinds = [this.load, this.relay, this.module, this.diodes, this.fan, this.load, this.parallel]
    const turn = random.whole(0, kinds.length - 1)
    for (let i = 0; i < consumers; i++) kinds[(turn + i) % kinds.length]!.call(this)
  }

  private splice(from: string): string {
    const id = this.draft.add({ kind: 'splice', id: this.draft.id('sp') })
    this.draft.run(from, `${id}.s`)
    return `${id}.s`
  }

  private feed(): string {
    const live = this.random.chance(0.7) ? this.draft.when() : 'never'
    return `${this.draft.add({ kind: 'feed', id: this.draft.id('fd'), live })}.out`
  }

  private ground(): string {
    return `${this.draft.add({ kind: 'ground', id: this.draft.id('g') })}.in`
  }

  /** A live end behind a fuse of its own, or a splice behind one already there. */
  private supply(): string {
    const { draft, random } = this
    const from = random.pick(this.fed)
    if (random.chance(0.3)) return from
    const fuse = draft.add({
      kind: 'fuse',
      id: draft.id('f'),
      amps: random.pick([3, 5, 7.5, 10, 15, 20, 30]),
      style: random.chance(0.2) ? 'link' : 'blade',
      ...this.connector(2),
    })
    draft.run(from, `${fuse}.in`)
    if (random.chance(0.5)) return `${fuse}.out`
    const end = this.splice(`${fuse}.out`)
    this.fed.push(end)
    return end
  }

  private earth(from: string) {
    if (this.grounds.length === 0 || this.random.chance(0.4)) this.grounds.push(this.ground())
    // Now and then through a splice, shared by those who come after.
    let end = this.random.pick(this.grounds)
    if (this.random.chance(0.3)) {
      end = this.splice(end)
      this.grounds.push(end)
    }
    this.draft.run(from, end)
  }

  private connector(cavities: number): { connector?: string; cavities?: Record<string, number> } {
    const connector = this.draft.partConnector(cavities)
    return connector === undefined ? {} : { connector }
  }

  private switched(from: string): string {
    const { draft } = this
    const id = draft.id('sw')
    const changeOver = this.random.chance(0.3)
    draft.add({
      kind: 'switch',
      id,
      contacts: [
        { id: 'x', a: 'in', b: 'out', closed: draft.when() },
        ...(changeOver ? [{ id: 'y', a: 'in', b: 'other', closed: draft.when() }] : []),
      ],
      ...this.connector(3),
    })
    draft.run(from, `${id}.in`)
    if (changeOver) this.loadAt(`${id}.other`)
    return `${id}.out`
  }

  private loadAt(from: string) {
    const { draft, random } = this
    const id = draft.id('ld')
    const ohms = random.logUniform(0.5, 100)
    draft.add({
      kind: 'load',
      id,
      ohms,
      style: random.pick(['lamp', 'motor', 'solenoid', 'heater', 'horn', 'other'] as const),
      ...(random.chance(0.4) ? { coldOhms: ohms / random.whole(2, 12) } : {}),
      ...this.connector(2),
    })
    draft.run(from, `${id}.a`)
    this.earth(`${id}.b`)
  }

  private load() {
    this.loadAt(this.switched(this.supply()))
  }

  /** Two loads joined at the far end, or two wires side by side: a loop. */
  private parallel() {
    const { draft } = this
    const from = this.supply()
    const one = this.splice(from)
    const two = this.splice(one)
    draft.run(one, two)
    this.loadAt(two)
    if (this.random.chance(0.5)) this.loadAt(one)
  }

  /** A motor at two speeds through a resistor. */
  private fan() {
    const { draft, random } = this
    const from = this.switched(this.supply())
    const end = this.splice(this.switched(this.supply()))
    const id = draft.add({
      kind: 'resistor',
      id: draft.id('r'),
      ohms: random.logUniform(0.2, 5000),
      ...this.connector(2),
    })
    draft.run(from, `${id}.a`)
    draft.run(`${id}.b`, end)
    this.loadAt(end)
  }

  private diodes() {
    const { draft, random } = this
    const end = this.splice(this.diodeFrom(this.switched(this.supply())))
    if (random.chance(0.6)) draft.run(this.diodeFrom(this.switched(this.supply())), end)
    this.loadAt(end)
  }

  private diodeFrom(from: string): string {
    const { draft, random } = this
    const backwards = random.chance(0.2)
    const id = draft.add({
      kind: 'diode',
      id: draft.id('d'),
      volts: random.pick([0.3, 0.7]),
      ...this.connector(2),
    })
    draft.run(from, `${id}.${backwards ? 'cathode' : 'anode'}`)
    return `${id}.${backwards ? 'anode' : 'cathode'}`
  }

  private relayNode(): string {
    const { draft, random } = this
    return draft.add({
      kind: 'relay',
      id: draft.id('k'),
      coilOhms: random.whole(60, 120),
      suppression: random.pick(['none', 'resistor', 'diode'] as const),
      ...this.connector(5),
    })
  }

  private relay() {
    const { draft, random } = this
    const id = this.relayNode()
    draft.run(random.chance(0.7) ? this.switched(this.supply()) : this.supply(), `${id}.86`)
    this.earth(`${id}.85`)
    this.relayContacts(id)
  }

  private relayContacts(id: string) {
    this.draft.run(this.supply(), `${id}.30`)
    this.loadAt(`${id}.87`)
    if (this.random.chance(0.3)) this.loadAt(`${id}.87a`)
  }

  private module() {
    const { draft, random } = this
    const id = draft.id('m')
    type Pin = Extract<NodeInput, { kind: 'module' }>['pins'][number]
    const pins: Pin[] = []
    const after: (() => void)[] = []
    const pin = (circuit: Pin['circuit'], wiring?: (end: string) => void) => {
      const name = String(pins.length + 1)
      pins.push({ pin: name, circuit })
      if (wiring) after.push(() => wiring(`${id}.${name}`))
      return name
    }
    const supplies: string[] = []
    for (let i = random.whole(0, 2); i > 0; i--)
      supplies.push(
        pin({ type: 'supply', ohms: random.logUniform(50, 2000) }, (end) =>
          draft.run(random.chance(0.6) ? this.supply() : this.switched(this.supply()), end),
        ),
      )
    for (let i = random.whole(0, 2); i > 0; i--) pin({ type: 'ground' }, (end) => this.earth(end))
    pin({ type: 'pull-up', volts: random.pick([5, 12]), ohms: random.logUniform(500, 20_000) }, (end) =>
      this.earth(this.switched(end)),
    )
    if (random.chance(0.6))
      pin({ type: 'pull-down', ohms: random.logUniform(1000, 50_000) }, (end) =>
        draft.run(this.switched(this.supply()), end),
      )
    if (supplies.length > 0 && random.chance(0.8))
      pin(
        {
          type: 'high-side',
          on: draft.when(),
          ...(random.chance(0.5) ? { from: supplies.at(-1)! } : {}),
        },
        (end) => this.loadAt(end),
      )
    if (random.chance(0.8))
      pin({ type: 'low-side', on: draft.when() }, (end) => {
        const relay = this.relayNode()
        draft.run(this.supply(), `${relay}.86`)
        draft.run(`${relay}.85`, end)
        this.relayContacts(relay)
      })
    if (random.chance(0.5)) {
      const sensor = draft.id('sn')
      pin({ type: 'source', volts: 5, ohms: random.logUniform(0.5, 10), on: draft.when() }, (end) => {
        draft.add({ kind: 'resistor', id: sensor, ohms: random.logUniform(100, 5000) })
        draft.run(end, `${sensor}.a`)
        this.earth(`${sensor}.b`)
      })
    }
    if (random.chance(0.5)) {
      const low = pin({ type: 'pull-down', ohms: 20_000 }, (end) => this.bus(end, 'low'))
      pin({ type: 'bridge', to: low, ohms: 120 }, (end) => this.bus(end, 'high'))
    }
    if (random.chance(0.3)) pin({ type: 'none' }, (end) => this.earth(end))
    const connector = draft.partConnector(pins.length)
    draft.add({
      kind: 'module',
      id,
      pins,
      ...(connector === undefined ? {} : { connector }),
      ...(random.chance(0.3) ? { runsFrom: random.pick([4, 9]) } : {}),
    })
    for (const wiring of after) wiring()
  }

  /** Joins a bus line to the one before it, and the first of each to the diagnostic connector. */
  private bus(end: string, line: 'low' | 'high') {
    const { draft } = this
    if (this.diagnostic === null) {
      const connector = draft.id('dc')
      draft.document.connectors.push({ id: connector, cavities: 16, rows: 2 })
      const id = draft.add({ kind: 'dlc', id: draft.id('dlc'), connector })
      this.diagnostic = { id, used: 0 }
      this.earth(`${id}.4`)
    }
    const at = line === 'low' ? 1 : 0
    if (!this.buses[at])
      draft.run(end, (this.buses[at] = this.splice(`${this.diagnostic.id}.${at === 0 ? 6 : 14}`)))
    else draft.run(end, this.buses[at])
  }
}
