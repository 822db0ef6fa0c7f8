import type { Node, NodeOf } from '../document/node-schema'
import { portsOf } from '../document/ports'

/** One way through a part: a relay has two that do not meet, its coil and its contact. */
export interface Hall {
  name: string
  /** Places met on every entry, even when the hall was walked before: the pin by which one came in. */
  always: string[]
  /** Places met once, on the first way through. */
  sites: string[]
  /** Ports by which current leaves. */
  exits: string[]
  /** Places met only when leaving by that port. */
  exitSites: (port: string) => string[]
}

const none = () => []

/** The halls of a part that a port opens into; all of them when the walk starts at the part. */
export function halls(node: Node, port: string | null): Hall[] {
  const others = (ports: string[]) => ports.filter((name) => name !== port)
  switch (node.kind) {
    case 'cavity':
      return [
        {
          name: 'contact',
          always: [],
          sites: [`contact:${node.id}`],
          exits: others(['a', 'b']),
          exitSites: none,
        },
      ]
    case 'relay': {
      const coil: Hall = {
        name: 'coil',
        always: [],
        sites: [`part:${node.id}.coil`],
        exits: others(['86', '85']),
        exitSites: none,
      }
      const contact: Hall = {
        name: 'contact',
        always: [],
        sites: [`part:${node.id}.contact`],
        exits: others(['30', '87', '87a']),
        exitSites: none,
      }
      return port === null ? [coil, contact] : port === '85' || port === '86' ? [coil] : [contact]
    }
    case 'switch':
      return switchHalls(node, port)
    case 'module':
      return [moduleHall(node, port)]
    case 'dlc':
      // Cavities only, nothing inside joins them.
      return portsOf(node)
        .filter((one) => port === null || one.name === port)
        .map(({ name }) => ({
          name: `cavity ${name}`,
          always: [],
          sites: [],
          exits: port === null ? [name] : [],
          exitSites: none,
        }))
    default:
      return [
        {
          name: 'part',
          always: [],
          sites: [`part:${node.id}`],
          exits: node.kind === 'splice' ? ['s'] : others(portsOf(node).map((one) => one.name)),
          exitSites: none,
        },
      ]
  }
}

/** Contacts that share a port are one hall: what comes in by any of their ports may leave by any other. */
function switchHalls(node: NodeOf<'switch'>, port: string | null): Hall[] {
  const groups: { ports: Set<string>; contacts: string[] }[] = []
  for (const contact of node.contacts) {
    const touching = groups.filter((group) => group.ports.has(contact.a) || group.ports.has(contact.b))
    const joined = {
      ports: new Set([...touching.flatMap((group) => [...group.ports]), contact.a, contact.b]),
      contacts: [...touching.flatMap((group) => group.contacts), contact.id],
    }
    for (const group of touching) groups.splice(groups.indexOf(group), 1)
    groups.push(joined)
  }
  return groups
    .filter((group) => port === null || group.ports.has(port))
    .map((group) => ({
      name: group.contacts.join(' '),
      always: [],
      sites: group.contacts.map((contact) => `part:${node.id}.${contact}`),
      exits: [...group.ports].filter((name) => name !== port),
      exitSites: none,
    }))
}

/**
 * A supply pin leads into the module and out by all that it feeds, its grounds last. A pin that takes current in
 * any other way ends the leg there; a bridge leads across to its other pin.
 */
function moduleHall(node: NodeOf<'module'>, port: string | null): Hall {
  const own = node.pins.find((pin) => pin.pin === port)
  const site = (pin: string) => `pin:${node.id}.${pin}`
  if (own && own.circuit.type !== 'supply') {
    const bridged = node.pins
      .filter(
        (pin) =>
          (own.circuit.type === 'bridge' && own.circuit.to === pin.pin) ||
          (pin.circuit.type === 'bridge' && pin.circuit.to === own.pin),
      )
      .map((pin) => pin.pin)
    return {
      name: `pin ${own.pin}`,
      always: [site(own.pin)],
      sites: [],
      exits: bridged,
      exitSites: (pin) => [site(pin)],
    }
  }
  const gives = (pin: (typeof node.pins)[number] | undefined) =>
    pin !== undefined && ['high-side', 'source', 'pull-up'].includes(pin.circuit.type)
  const giving = node.pins.filter((pin) => {
    const { circuit } = pin
    return gives(pin) || (circuit.type === 'bridge' && gives(node.pins.find((one) => one.pin === circuit.to)))
  })
  const grounds = node.pins.filter((pin) => pin.circuit.type === 'ground')
  return {
    name: 'inside',
    always: own ? [site(own.pin)] : [],
    sites: [`module:${node.id}`],
    exits: [...giving, ...grounds].map((pin) => pin.pin),
    exitSites: (pin) => [site(pin)],
  }
}
