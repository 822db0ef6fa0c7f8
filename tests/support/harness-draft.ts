import type { z } from 'zod'
import type { circuitSchema } from '@/diagrams/document/circuit-schema'
import type { Random } from './random'

export type CircuitInput = z.input<typeof circuitSchema>
export type NodeInput = CircuitInput['nodes'][number]
type Draft = Omit<CircuitInput, 'nodes' | 'wires' | 'connectors' | 'controls'> & {
  nodes: NodeInput[]
  wires: NonNullable<CircuitInput['wires']>
  connectors: NonNullable<CircuitInput['connectors']>
  controls: NonNullable<CircuitInput['controls']>
}

/** Lays parts, wires and inline connectors into a document, one after another. */
export class HarnessDraft {
  readonly document: Draft = {
    format: 'halfsplit-circuit',
    version: 1,
    title: 'random harness',
    controls: [],
    connectors: [],
    nodes: [],
    wires: [],
  }
  private inline: { id: string; used: number; cavities: number } | null = null

  constructor(private readonly random: Random) {}

  id(prefix: string): string {
    return `${prefix}${this.document.nodes.length + this.document.connectors.length}`
  }

  add<K extends NodeInput['kind']>(node: Extract<NodeInput, { kind: K }>): string {
    this.document.nodes.push(node)
    return node.id
  }

  control(positions = this.random.whole(2, 3)): string {
    const id = `sel${this.document.controls.length}`
    const names = ['off', 'on', 'high'].slice(0, positions)
    this.document.controls.push({ id, positions: names, rest: names[0]! })
    return id
  }

  /** A control's setting for a part to follow: one of those there are, in one or two positions. */
  when(): { control: string; positions: string[] } | 'always' {
    if (this.random.chance(0.15)) return 'always'
    const control = this.random.pick(this.document.controls)
    const moved = control.positions.slice(1)
    return { control: control.id, positions: this.random.chance(0.5) ? moved : [moved[0]!] }
  }

  /** A part's own connector, for one part in two. */
  partConnector(cavities: number): string | undefined {
    if (this.random.chance(0.5)) return undefined
    const id = this.id('pc')
    this.document.connectors.push({ id, cavities })
    return id
  }

  wire(from: string, to: string) {
    const { random } = this
    this.document.wires.push({
      id: `w${this.document.wires.length}`,
      from,
      to,
      mm2: random.pick([0.35, 0.5, 0.75, 1, 1.5, 2.5]),
      length: random.logUniform(0.1, 6),
      ...(random.chance(0.1) ? { ohms: random.logUniform(0.001, 2) } : {}),
    })
  }

  /** A run between two ends: one wire, or two with an inline connector between them. */
  run(from: string, to: string) {
    if (!this.random.chance(0.3)) return this.wire(from, to)
    const cavity = this.cavity()
    this.wire(from, `${cavity}.a`)
    this.wire(`${cavity}.b`, to)
  }

  private cavity(): string {
    if (this.inline === null || this.inline.used >= this.inline.cavities) {
      this.inline = { id: this.id('ic'), used: 0, cavities: this.random.whole(2, 6) }
      this.document.connectors.push({ id: this.inline.id, cavities: this.inline.cavities })
    }
    return this.add({
      kind: 'cavity',
      id: this.id('cv'),
      connector: this.inline.id,
      number: ++this.inline.used,
    })
  }
}
