import type { HarnessDraft } from './harness-draft'
import type { Random } from './random'

interface Zone {
  /** The inline connector between the fuse box and this zone; another is begun when it is full. */
  connector: string
  used: number
  cavities: number
  /** Splices of the zone that are fed, each behind its fuse, and how many wires they carry. */
  fed: { end: string; wires: number }[]
  grounds: { end: string; wires: number }[]
}

/** A splice is crimped on so many wires at most. */
const wiresPerSplice = 6
/** The body of a harness: fuse box, zones behind their connectors, splices, ground points, and the plainest parts. */
export class Loom {
  protected zone!: Zone
  private box: string[] = []

  constructor(
    protected readonly draft: HarnessDraft,
    protected readonly random: Random,
  ) {}

  /** Battery, its strap, the first junction of the box, and a feed that the controls switch. */
  protected layTrunk() {
    const { draft, random } = this
    draft.add({ kind: 'battery', id: 'bat', ohms: random.logUniform(0.004, 0.02) })
    this.trunk('bat.neg', this.groundNode())
    const first = draft.add({ kind: 'splice', id: draft.id('sp') })
    this.trunk('bat.pos', `${first}.s`)
    this.box = [`${first}.s`]
    draft.add({ kind: 'feed', id: 'ign', live: draft.when() })
  }

  /** A battery cable: all the current goes through it. */
  private trunk(from: string, to: string) {
    this.draft.wire(from, to)
    const wire = this.draft.document.wires.at(-1)!
    Object.assign(wire, { mm2: 35, length: this.random.logUniform(0.3, 2), ohms: null })
  }

  protected openZone() {
    this.zone = { connector: '', used: 0, cavities: 0, fed: [], grounds: [] }
    this.openConnector()
    // The box grows by a link and a junction every few zones.
    if (this.box.length < 2 || this.random.chance(0.4)) {
      const id = this.draft.add({ kind: 'fuse', id: this.draft.id('fl'), amps: 60, style: 'link' })
      this.trunk(this.random.pick(this.box), `${id}.in`)
      this.box.push(this.spliceFrom(`${id}.out`))
    }
    if (this.random.chance(0.3)) this.zone.fed.push({ end: this.spliceFrom('ign.out'), wires: 1 })
  }

  private openConnector() {
    const cavities = this.random.whole(4, 12)
    const connector = this.draft.id('ic')
    this.draft.document.connectors.push({ id: connector, cavities, rows: cavities > 6 ? 2 : 1 })
    Object.assign(this.zone, { connector, cavities, used: 0 })
  }

  /** Two wires with a cavity of the zone's connector between them. */
  private through(from: string, to: string) {
    if (this.zone.used >= this.zone.cavities) this.openConnector()
    const id = this.draft.add({
      kind: 'cavity',
      id: this.draft.id('cv'),
      connector: this.zone.connector,
      number: ++this.zone.used,
    })
    this.draft.wire(from, `${id}.a`)
    this.draft.wire(`${id}.b`, to)
  }

  protected run(from: string, to: string) {
    if (this.random.chance(0.2)) this.through(from, to)
    else this.draft.wire(from, to)
  }

  protected spliceFrom(from: string): string {
    const id = this.draft.add({ kind: 'splice', id: this.draft.id('sp') })
    this.draft.wire(from, `${id}.s`)
    return `${id}.s`
  }

  /** Splices that nothing was hung on. */
  protected danglingSplices(): string[] {
    const { nodes, wires } = this.draft.document
    return nodes
      .filter((node) => node.kind === 'splice')
      .map((node) => `${node.id}.s`)
      .filter((end) => wires.filter((wire) => wire.from === end || wire.to === end).length < 2)
  }

  protected connector(cavities: number): { connector?: string } {
    const connector = this.draft.partConnector(cavities)
    return connector === undefined ? {} : { connector }
  }

  private groundNode(): string {
    return `${this.draft.add({ kind: 'ground', id: this.draft.id('g') })}.in`
  }

  /** A fed splice of the zone with room left, else a new one: fuse in the box, wire through the connector, splice. */
  protected supply(): string {
    const { draft, random, zone } = this
    const open = zone.fed.find((splice) => splice.wires < wiresPerSplice)
    if (open && random.chance(0.75)) {
      open.wires++
      return open.end
    }
    const amps = random.pick([5, 7.5, 10, 15, 20, 30])
    const id = draft.add({ kind: 'fuse', id: draft.id('f'), amps, ...this.connector(2) })
    draft.wire(random.pick(this.box), `${id}.in`)
    const splice = draft.add({ kind: 'splice', id: draft.id('sp') })
    this.through(`${id}.out`, `${splice}.s`)
    zone.fed.push({ end: `${splice}.s`, wires: 2 })
    return `${splice}.s`
  }

  protected earth(from: string) {
    const { zone } = this
    let splice = zone.grounds.find((ground) => ground.wires < wiresPerSplice)
    if (!splice) zone.grounds.push((splice = { end: this.spliceFrom(this.groundNode()), wires: 1 }))
    splice.wires++
    this.run(from, splice.end)
  }

  protected switched(from: string): string {
    const { draft } = this
    const id = draft.id('sw')
    draft.add({
      kind: 'switch',
      id,
      contacts: [{ id: 'x', a: 'in', b: 'out', closed: draft.when() }],
      ...this.connector(2),
    })
    this.run(from, `${id}.in`)
    return `${id}.out`
  }

  protected loadAt(from: string) {
    const { draft, random } = this
    const id = draft.id('ld')
    const ohms = random.logUniform(6, 200)
    draft.add({
      kind: 'load',
      id,
      ohms,
      style: random.pick(['lamp', 'motor', 'solenoid', 'heater', 'horn', 'other'] as const),
      ...(random.chance(0.4) ? { coldOhms: ohms / random.whole(2, 12) } : {}),
      ...this.connector(2),
    })
    this.run(from, `${id}.a`)
    this.earth(`${id}.b`)
  }
}
