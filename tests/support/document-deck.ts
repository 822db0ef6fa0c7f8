import type { Circuit, Wire } from '@/diagrams/document/circuit-schema'
import type { Condition } from '@/diagrams/document/condition-schema'
import type { When } from '@/diagrams/document/names'
import type { Node } from '@/diagrams/document/node-schema'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import type { DeckElement } from './ngspice'

/** In which state the parts rest: ids of relays that have pulled in and modules awake, diodes by id (`k1.suppression` for a relay's). */
export interface RestingStates {
  relays: ReadonlySet<string>
  modules: ReadonlySet<string>
  diodes: ReadonlySet<string>
  blown: ReadonlySet<string>
}

/**
 * A circuit as elements, written straight from the page of the circuit format and from nothing
 * else: no code is shared with the solver, so that a slip in its list of branches shows. The one
 * thing taken over is its leak, put at the same places (each point, each wire's middle, behind
 * each pin), because it decides where a floating part stands.
 *
 * Nets: a point by its name, `W:id` the middle of a wire, `I:module.pin` behind a pin, `G:module`
 * a module's inner ground, "0" chassis. Elements are named likewise; `W:id` is a wire's from half.
 */
export function documentDeck(
  circuit: Circuit,
  condition: Condition,
  states: RestingStates,
  fault?: PlantedFault,
): DeckElement[] {
  return new DeckWriter(circuit, condition, states, fault).write()
}

class DeckWriter {
  private readonly elements: DeckElement[] = []

  constructor(
    private readonly circuit: Circuit,
    private readonly condition: Condition,
    private readonly states: RestingStates,
    private readonly fault: PlantedFault | undefined,
  ) {}

  write(): DeckElement[] {
    for (const node of this.circuit.nodes) this.node(node)
    for (const wire of this.circuit.wires) this.wire(wire)
    this.condition.added.forEach((lead, i) =>
      this.put(`added ${i}`, this.net(lead.from), this.net(lead.to), lead.ohms),
    )
    return this.elements
  }

  private put(name: string, a: string, b: string, ohms: number, volts = 0) {
    this.elements.push({ name, a, b, ohms, volts })
  }

  private leak(net: string) {
    if (net !== '0') this.put(`leak ${net}`, net, '0', 1e11)
  }

  /** Ohms that the fault puts in series at a site: open, blown, resistive, stuck open. */
  private series(site: string): number {
    const f = this.fault
    const modes = ['open', 'blown', 'resistive', 'stuck-open']
    return f?.site === site && modes.includes(f.mode) ? f.ohms! : 0
  }

  private across(site: string, a: string, b: string) {
    if (this.fault?.site === site && this.fault.mode === 'shorted') this.put('short', a, b, this.fault.ohms!)
  }

  private has(site: string, mode: string): boolean {
    return this.fault?.site === site && this.fault.mode === mode
  }

  private when(when: When): boolean {
    if (when === 'always') return true
    if (when === 'never') return false
    const control = this.circuit.controls.find((c) => c.id === when.control)!
    return when.positions.includes(this.condition.controls[when.control] ?? control.rest)
  }

  private unplugged(id: string | undefined): boolean {
    return id !== undefined && this.condition.unplugged.includes(id)
  }

  /** A battery's unwired minus pole is chassis itself. */
  private net(point: string): string {
    if (point === 'chassis') return '0'
    const [nodeId, port] = point.split(/[.:]/)
    const node = this.circuit.nodes.find((n) => n.id === nodeId)
    const wired = this.circuit.wires.some((w) => w.from === `${nodeId}.neg` || w.to === `${nodeId}.neg`)
    return node?.kind === 'battery' && port === 'neg' && !wired ? '0' : point
  }

  /** Makes a port: its point, and its contact where the node has a connector. Returns the net the part is joined to. */
  private port(node: Node, name: string, connector: string | undefined = node.connector): string {
    const point = this.net(`${node.id}.${name}`)
    this.leak(point)
    if (connector === undefined || point === '0') return point
    const part = `${point}:part`
    this.leak(part)
    const pulled = (node.kind === 'fuse' || node.kind === 'relay') && this.unplugged(node.id)
    if (!this.unplugged(connector) && !pulled)
      this.put(`contact ${point}`, point, part, 0.005 + this.series(`contact:${point}`))
    return part
  }

  private supplyVolts(drawn: number): number {
    if (this.fault?.mode === 'weak') return (drawn * this.fault.volts!) / 12.6
    return this.condition.charging ? (drawn * 14.15) / 12.6 : drawn
  }

  private wire(wire: Wire) {
    const site = `wire:${wire.id}`
    const ohms = wire.ohms ?? (0.01724 * wire.length) / wire.mm2
    const middle = `W:${wire.id}`
    const f = this.fault
    this.leak(middle)
    // A splice fails at the end of one of its wires: the first unless the fault names another.
    const spliceSeries = (end: string): number => {
      const node = this.circuit.nodes.find((n) => `${n.id}.s` === end && n.kind === 'splice')
      if (!node || f?.site !== `part:${node.id}`) return 0
      const first = f.wire ?? this.circuit.wires.find((w) => w.from === end || w.to === end)!.id
      return first === wire.id ? f.ohms! : 0
    }
    this.put(middle, this.net(wire.from), middle, ohms / 2 + this.series(site) + spliceSeries(wire.from))
    this.put(`${middle} to`, middle, this.net(wire.to), ohms / 2 + spliceSeries(wire.to))
    if (f?.site !== site) return
    if (f.mode === 'short-to-ground') this.put('short', middle, '0', f.ohms!)
    if (f.mode === 'short-to-wire') this.put('short', middle, `W:${f.other}`, f.ohms!)
    if (f.mode === 'short-to-supply') {
      const battery = this.circuit.nodes.find((n) => n.kind === 'battery')
      const feed = this.circuit.nodes.find((n) => n.kind === 'feed')
      this.put('short', middle, battery ? `${battery.id}.pos` : `${feed!.id}.out`, f.ohms!)
    }
  }

  private node(node: Node) {
    const site = `part:${node.id}`
    const series = this.series(site)
    // A part pulled as a whole, when it has no contacts that would open.
    const pulled = node.connector === undefined && this.unplugged(node.id)
    switch (node.kind) {
      case 'battery': {
        const [pos, neg] = [this.port(node, 'pos'), this.port(node, 'neg')]
        if (this.condition.battery) this.put(site, pos, neg, node.ohms + series, this.supplyVolts(node.volts))
        return this.across(site, pos, neg)
      }
      case 'feed': {
        const out = this.port(node, 'out')
        if (this.condition.battery && this.when(node.live))
          this.put(site, out, '0', node.ohms + series, this.supplyVolts(node.volts))
        return
      }
      case 'ground':
        return this.put(site, this.port(node, 'in'), '0', node.ohms + series)
      case 'fuse': {
        const [a, b] = [this.port(node, 'in'), this.port(node, 'out')]
        if (!pulled && !this.states.blown.has(node.id)) this.put(site, a, b, 0.08 / node.amps + series)
        return
      }
      case 'switch': {
        const nets = new Map<string, string>()
        for (const contact of node.contacts)
          for (const port of [contact.a, contact.b])
            if (!nets.has(port)) nets.set(port, this.port(node, port))
        for (const contact of node.contacts) {
          const at = `${site}.${contact.id}`
          if (this.when(contact.closed) || this.has(at, 'stuck-closed'))
            this.put(at, nets.get(contact.a)!, nets.get(contact.b)!, 0.02 + this.series(at))
        }
        return
      }
      case 'relay':
        return this.relay(node, pulled)
      case 'load':
      case 'resistor': {
        const [a, b] = [this.port(node, 'a'), this.port(node, 'b')]
        const cold = node.kind === 'load' && !this.condition.battery ? node.coldOhms : undefined
        this.put(site, a, b, (cold ?? node.ohms) + series)
        return this.across(site, a, b)
      }
      case 'diode': {
        const [a, b] = [this.port(node, 'anode'), this.port(node, 'cathode')]
        if (this.states.diodes.has(node.id)) this.put(site, a, b, 0.01 + series, node.volts)
        return this.across(site, a, b)
      }
      case 'splice':
        return void this.port(node, 's')
      case 'cavity': {
        const [a, b] = [`${node.id}.a`, `${node.id}.b`]
        this.leak(a)
        this.leak(b)
        if (!this.unplugged(node.connector))
          this.put(`contact ${node.id}`, a, b, 0.005 + this.series(`contact:${node.id}`))
        return
      }
      case 'dlc':
        for (let i = 1; i <= 16; i++) this.port(node, String(i))
        return
      case 'module':
        return this.module(node)
    }
  }

  private relay(node: Extract<Node, { kind: 'relay' }>, pulled: boolean) {
    const [plus, minus, common, made, broken] = ['85', '86', '30', '87', '87a'].map((name) =>
      this.port(node, name),
    ) as [string, string, string, string, string]
    const [coil, contact] = [`part:${node.id}.coil`, `part:${node.id}.contact`]
    this.across(coil, plus, minus)
    if (pulled) return
    this.put(coil, plus, minus, node.coilOhms + this.series(coil))
    if (node.suppression === 'resistor') this.put(`${coil} suppression`, plus, minus, 680)
    if (node.suppression === 'diode' && this.states.diodes.has(`${node.id}.suppression`))
      this.put(`${coil} suppression`, plus, minus, 0.01, 0.7)
    const stuckOpen = this.has(contact, 'stuck-open')
    const pulledIn = this.has(contact, 'stuck-closed') || (!stuckOpen && this.states.relays.has(node.id))
    const resistive = this.has(contact, 'resistive') ? this.fault!.ohms! : 0
    this.put(contact, common, pulledIn ? made : broken, 0.02 + resistive)
  }

  private module(node: Extract<Node, { kind: 'module' }>) {
    const drawn = node.pins.some((pin) => pin.circuit.type === 'ground')
    const ground = drawn ? `G:${node.id}` : '0'
    this.leak(ground)
    const awake = this.states.modules.has(node.id)
    const firstSupply = node.pins.find((pin) => pin.circuit.type === 'supply')?.pin
    for (const pin of node.pins) {
      const site = `pin:${node.id}.${pin.pin}`
      const outside = this.port(node, pin.pin, pin.connector ?? node.connector)
      const inside = pin.circuit.type === 'ground' ? ground : `I:${node.id}.${pin.pin}`
      if (pin.circuit.type === 'ground') {
        this.put(site, outside, ground, 0.005 + this.series(site))
        continue
      }
      this.leak(inside)
      this.put(site, outside, inside, this.series(site))
      if (this.has(site, 'dead')) continue
      const c = pin.circuit
      const acts = this.has(site, 'stuck-on') || ('on' in c && awake && this.when(c.on))
      switch (c.type) {
        case 'supply':
        case 'pull-down':
          this.put(`in ${site}`, inside, ground, c.ohms)
          break
        case 'pull-up':
          this.put(`in ${site}`, inside, ground, c.ohms, awake ? c.volts : 0)
          break
        case 'low-side':
          if (acts) this.put(`in ${site}`, inside, ground, c.onOhms)
          break
        case 'high-side':
          if (acts) this.put(`in ${site}`, `I:${node.id}.${c.from ?? firstSupply}`, inside, c.onOhms)
          break
        case 'source':
          this.put(`in ${site}`, inside, ground, c.ohms, acts && this.condition.battery ? c.volts : 0)
          break
        case 'bridge': {
          const far = node.pins.find((other) => other.pin === c.to)!
          this.put(
            `in ${site}`,
            inside,
            far.circuit.type === 'ground' ? ground : `I:${node.id}.${c.to}`,
            c.ohms,
          )
          break
        }
        case 'none':
          break
      }
    }
  }
}
