import type { Circuit, ControlsSetting } from '../document/circuit-schema'
import { holds } from '../document/condition'
import type { Node } from '../document/node-schema'
import { portsOf } from '../document/ports'

/** What a symbol shows of its part just now. */
export interface PartState {
  /** Switch contacts that are closed. */
  closed: ReadonlySet<string>
  /** A relay's coil has moved its contact. */
  pulledIn: boolean
  /** A load does its job; null where nothing has been computed. */
  works: boolean | null
  /** Ports whose connector is open. */
  unplugged: ReadonlySet<string>
  /** A fuse or relay taken out of its holder. */
  pulled: boolean
  /** A fuse that has blown. */
  blown: boolean
  /** A feed that is not live just now. */
  dead: boolean
  /** Ports that have a wire; null draws all of them. */
  wired: ReadonlySet<string> | null
  /** A feed's control, as words under its name. */
  liveWords: string
}

export const restState: PartState = {
  closed: new Set(),
  pulledIn: false,
  works: null,
  unplugged: new Set(),
  pulled: false,
  blown: false,
  dead: false,
  wired: null,
  liveWords: '',
}

/** What is known about the moment that is drawn. Plain data: whoever solved the circuit hands it in. */
export interface Moment {
  positions: ControlsSetting
  unplugged: readonly string[]
  relays?: ReadonlyMap<string, boolean>
  works?: ReadonlyMap<string, boolean>
  blown?: readonly string[]
}

export function partState(circuit: Circuit, node: Node, moment: Moment): PartState {
  const positions = Object.fromEntries(
    circuit.controls.map((control) => [control.id, moment.positions[control.id] ?? control.rest]),
  )
  const open = new Set(moment.unplugged)
  const ports = portsOf(node)
  const wired = wiredEnds(circuit)
  return {
    closed: new Set(
      node.kind === 'switch'
        ? node.contacts.filter((contact) => holds(contact.closed, positions)).map((contact) => contact.id)
        : [],
    ),
    pulledIn: moment.relays?.get(node.id) ?? false,
    works: moment.works?.get(node.id) ?? null,
    unplugged: new Set(
      ports.filter((port) => port.connector !== null && open.has(port.connector)).map((port) => port.name),
    ),
    pulled: open.has(node.id),
    blown: moment.blown?.includes(node.id) ?? false,
    dead: node.kind === 'feed' && !holds(node.live, positions),
    wired: new Set(ports.filter((port) => wired.has(`${node.id}.${port.name}`)).map((port) => port.name)),
    liveWords: node.kind === 'feed' ? liveWords(circuit, node.live) : '',
  }
}

const knownEnds = new WeakMap<Circuit['wires'], ReadonlySet<string>>()

/** Every end that has a wire; kept with the list of wires, because every part asks. */
function wiredEnds(circuit: Circuit): ReadonlySet<string> {
  const before = knownEnds.get(circuit.wires)
  if (before) return before
  const ends = new Set(circuit.wires.flatMap((wire) => [wire.from, wire.to]))
  knownEnds.set(circuit.wires, ends)
  return ends
}

function liveWords(circuit: Circuit, live: Extract<Node, { kind: 'feed' }>['live']): string {
  if (live === 'always') return 'always live'
  if (live === 'never') return 'never live'
  const control = circuit.controls.find((one) => one.id === live.control)
  return `${control?.label || live.control} ${live.positions.join(' or ')}`
}
