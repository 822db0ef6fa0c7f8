import type { Circuit, Wire } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import { holds } from '../document/condition'
import type { When } from '../document/names'
import type { Node, NodeOf } from '../document/node-schema'
import { hasContact, portsOf, wiresByEnd } from '../document/ports'
import {
  closedContactOhms,
  contactOhms,
  copperOhmMm2PerMetre,
  diodeOhms,
  fuseOhmAmps,
  groundPinOhms,
  pinJointOhms,
  suppressionOhms,
  worksReferenceVolts,
} from './constants'
import { finishNetwork, type Branch, type Network, type NetworkParts, type Setting } from './network'

/** Ohm of a wire: as given, else from size and length. */
export function wireOhms(wire: Wire): number {
  return wire.ohms ?? (copperOhmMm2PerMetre * wire.length) / wire.mm2
}

type Draft = Omit<NetworkParts, 'unknownOf' | 'middleOf'> & {
  unknownOf: Map<string, number>
  middleOf: Map<string, number>
}
type BranchInput = Partial<Omit<Branch, 'ohms' | 'name' | 'a' | 'b'>> & {
  ohms: number | ((s: Setting) => number)
}

const chassis = -1

/**
 * Turns a checked circuit, with the leads added for one reading, into unknowns and branches.
 * Every wire gets an unknown in its middle, every contact one on each of its sides, every module
 * pin one behind it, so that each fault of the format is one changed branch or one added one.
 */
export function buildNetwork(circuit: Circuit, added: Condition['added'] = []): Network {
  const draft: Draft = {
    circuit,
    added,
    size: 0,
    branches: [],
    unknownOf: new Map([['chassis', chassis]]),
    middleOf: new Map(),
    relays: [],
    modules: [],
    diodes: [],
    fuses: [],
    loads: [],
    inputs: [],
  }
  const build = new NetworkBuilder(draft, circuit)
  for (const node of circuit.nodes) build.addPoints(node)
  for (const node of circuit.nodes) build.addNode(node)
  for (const wire of circuit.wires) build.addWire(wire)
  added.forEach((lead, index) =>
    build.branch(`added:${index}`, draft.unknownOf.get(lead.from)!, draft.unknownOf.get(lead.to)!, {
      ohms: lead.ohms,
      exact: true,
    }),
  )
  return finishNetwork(draft)
}

class NetworkBuilder {
  private readonly wired
  constructor(
    private readonly draft: Draft,
    circuit: Circuit,
  ) {
    this.wired = wiresByEnd(circuit)
  }

  private unknown(): number {
    return this.draft.size++
  }

  branch(name: string, a: number, b: number, input: BranchInput): number {
    const ohms = input.ohms
    return (
      this.draft.branches.push({
        name,
        a,
        b,
        exact: false,
        supply: 'fixed',
        varies: false,
        conducts: () => true,
        emf: () => 0,
        ...input,
        ohms: typeof ohms === 'number' ? () => ohms : ohms,
      }) - 1
    )
  }

  addPoints(node: Node) {
    const points = this.draft.unknownOf
    for (const port of portsOf(node)) {
      const end = `${node.id}.${port.name}`
      // An unwired minus pole stands on chassis.
      const bonded = node.kind === 'battery' && port.name === 'neg' && !this.wired.has(end)
      points.set(end, bonded ? chassis : this.unknown())
      if (!hasContact(node, port)) continue
      points.set(`${end}:part`, bonded ? chassis : this.unknown())
      if (bonded) continue
      const connector = port.connector!
      // Pulling a fuse or relay opens its contacts like opening its connector does.
      const own = node.kind === 'fuse' || node.kind === 'relay' ? node.id : connector
      this.branch(`contact:${end}`, points.get(end)!, points.get(`${end}:part`)!, {
        ohms: contactOhms,
        exact: true,
        conducts: (s) => !s.unplugged.has(connector) && !s.unplugged.has(own),
      })
    }
  }

  /** The part's side of a port: behind its contact where it has one. */
  private at(node: Node, port: string): number {
    const points = this.draft.unknownOf
    const end = `${node.id}.${port}`
    return points.get(`${end}:part`) ?? points.get(end)!
  }

  addWire(wire: Wire) {
    const middle = this.unknown()
    this.draft.middleOf.set(wire.id, middle)
    const half = wireOhms(wire) / 2
    const points = this.draft.unknownOf
    this.branch(`wire:${wire.id}/from`, points.get(wire.from)!, middle, { ohms: half })
    this.branch(`wire:${wire.id}/to`, middle, points.get(wire.to)!, { ohms: half })
  }

  addNode(node: Node) {
    const part = `part:${node.id}`
    const pulled = (s: Setting) => s.unplugged.has(node.id) && node.connector === undefined
    switch (node.kind) {
      case 'battery':
        this.branch(part, this.at(node, 'pos'), this.at(node, 'neg'), {
          ohms: node.ohms,
          supply: 'battery',
          conducts: (s) => s.battery,
          emf: () => node.volts,
        })
        break
      case 'feed':
        this.branch(part, this.at(node, 'out'), chassis, {
          ohms: node.ohms,
          supply: 'battery',
          conducts: (s) => s.battery && holds(node.live, s.positions),
          emf: () => node.volts,
        })
        break
      case 'ground':
        this.branch(part, this.at(node, 'in'), chassis, { ohms: node.ohms })
        break
      case 'fuse': {
        const branch = this.branch(part, this.at(node, 'in'), this.at(node, 'out'), {
          ohms: fuseOhmAmps / node.amps,
          varies: true,
          conducts: (s) => !pulled(s) && !s.forced.off.has(part),
        })
        this.draft.fuses.push({ node: node.id, branch, amps: node.amps })
        break
      }
      case 'switch':
        for (const contact of node.contacts)
          this.addSwitched(
            `${part}.${contact.id}`,
            this.at(node, contact.a),
            this.at(node, contact.b),
            contact.closed,
          )
        break
      case 'relay':
        this.addRelay(node, pulled)
        break
      case 'load': {
        const branch = this.branch(part, this.at(node, 'a'), this.at(node, 'b'), {
          ohms: (s) => (s.battery ? node.ohms : (node.coldOhms ?? node.ohms)),
        })
        this.draft.loads.push({ node: node.id, branch, worksFromVolts: node.worksFrom * worksReferenceVolts })
        break
      }
      case 'resistor':
        this.branch(part, this.at(node, 'a'), this.at(node, 'b'), { ohms: node.ohms })
        break
      case 'diode':
        this.addDiode(part, this.at(node, 'anode'), this.at(node, 'cathode'), node.volts)
        break
      case 'cavity':
        this.branch(`contact:${node.id}`, this.at(node, 'a'), this.at(node, 'b'), {
          ohms: contactOhms,
          exact: true,
          conducts: (s) => !s.unplugged.has(node.connector),
        })
        break
      case 'module':
        this.addModule(node)
        break
      case 'splice':
      case 'dlc':
        break
    }
  }

  private addSwitched(name: string, a: number, b: number, closed: When) {
    this.branch(name, a, b, {
      ohms: closedContactOhms,
      varies: true,
      conducts: (s) => s.forced.on.has(name) || (!s.forced.off.has(name) && holds(closed, s.positions)),
    })
  }

  private addDiode(
    name: string,
    anode: number,
    cathode: number,
    volts: number,
    present: (s: Setting) => boolean = () => true,
  ) {
    const index = this.draft.diodes.length
    const branch = this.branch(name, anode, cathode, {
      ohms: diodeOhms,
      varies: true,
      conducts: (s) => s.diodes[index]! && present(s),
      emf: (s) => (s.battery ? volts : 0),
    })
    this.draft.diodes.push({ branch, volts })
  }

  private addRelay(node: NodeOf<'relay'>, pulled: (s: Setting) => boolean) {
    const index = this.draft.relays.length
    const part = `part:${node.id}`
    const present = (s: Setting) => !pulled(s)
    const [plus, minus] = [this.at(node, '85'), this.at(node, '86')]
    const coil = this.branch(`${part}.coil`, plus, minus, { ohms: node.coilOhms, conducts: present })
    if (node.suppression === 'resistor')
      this.branch(`${part}.suppression`, plus, minus, { ohms: suppressionOhms, conducts: present })
    if (node.suppression === 'diode') this.addDiode(`${part}.suppression`, plus, minus, 0.7, present)
    const contact = (pulledIn: boolean, port: string) =>
      this.branch(`${part}.contact/${port}`, this.at(node, '30'), this.at(node, port), {
        ohms: closedContactOhms,
        varies: true,
        conducts: (s) => present(s) && s.relays[index] === pulledIn,
      })
    contact(true, '87')
    contact(false, '87a')
    this.draft.relays.push({ node: node.id, coil, pullIn: node.pullIn })
  }

  private addModule(node: NodeOf<'module'>) {
    const index = this.draft.modules.length
    const grounded = node.pins.some((pin) => pin.circuit.type === 'ground')
    const innerGround = grounded ? this.unknown() : chassis
    const inner = new Map<string, number>()
    for (const pin of node.pins) {
      const name = `pin:${node.id}.${pin.pin}`
      if (pin.circuit.type === 'ground') {
        inner.set(pin.pin, innerGround)
        this.branch(name, this.at(node, pin.pin), innerGround, { ohms: groundPinOhms })
      } else {
        const behind = this.unknown()
        inner.set(pin.pin, behind)
        this.branch(name, this.at(node, pin.pin), behind, { ohms: pinJointOhms, exact: true })
      }
    }
    const supplies = node.pins.filter((pin) => pin.circuit.type === 'supply')
    for (const pin of node.pins) {
      const name = `pin:${node.id}.${pin.pin}/inner`
      const here = inner.get(pin.pin)!
      const awake = (s: Setting) => s.modules[index]!
      const circuit = pin.circuit
      const driven = (s: Setting, on: When) =>
        s.forced.on.has(name) || (!s.forced.off.has(name) && awake(s) && holds(on, s.positions))
      const kept = (s: Setting) => !s.forced.off.has(name)
      const input = (threshold: number) =>
        this.draft.inputs.push({
          point: `${node.id}.${pin.pin}`,
          inner: here,
          innerGround,
          threshold: pin.threshold ?? threshold,
          module: index,
        })
      switch (circuit.type) {
        case 'supply':
          this.branch(name, here, innerGround, { ohms: circuit.ohms })
          break
        case 'pull-up':
          this.branch(name, here, innerGround, {
            ohms: circuit.ohms,
            varies: true,
            conducts: kept,
            emf: (s) => (awake(s) ? circuit.volts : 0),
          })
          input(circuit.volts / 2)
          break
        case 'pull-down':
          this.branch(name, here, innerGround, { ohms: circuit.ohms, varies: true, conducts: kept })
          input(6)
          break
        case 'low-side':
          this.branch(name, here, innerGround, {
            ohms: circuit.onOhms,
            varies: true,
            conducts: (s) => driven(s, circuit.on),
          })
          break
        case 'high-side': {
          const from = inner.get(circuit.from ?? supplies[0]!.pin)!
          this.branch(name, from, here, {
            ohms: circuit.onOhms,
            varies: true,
            conducts: (s) => driven(s, circuit.on),
          })
          break
        }
        case 'source':
          this.branch(name, here, innerGround, {
            ohms: circuit.ohms,
            varies: true,
            conducts: kept,
            emf: (s) => (s.battery && driven(s, circuit.on) ? circuit.volts : 0),
          })
          break
        case 'bridge':
          this.branch(name, here, inner.get(circuit.to)!, { ohms: circuit.ohms })
          break
        case 'ground':
        case 'none':
          break
      }
    }
    this.draft.modules.push({
      node: node.id,
      supplies: supplies.map((pin) => inner.get(pin.pin)!),
      innerGround,
      runsFrom: node.runsFrom,
    })
  }
}
