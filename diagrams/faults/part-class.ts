import type { Circuit } from '../document/circuit-schema'
import type { Node } from '../document/node-schema'
import type { Mode } from '../document/sites'

/** Ways in which each class of places fails. */
export const modesOfClass = {
  wire: ['open', 'resistive', 'short-to-ground', 'short-to-supply', 'short-to-wire'],
  contact: ['open', 'resistive'],
  splice: ['open', 'resistive'],
  ground: ['open', 'resistive'],
  fuse: ['blown', 'resistive'],
  load: ['open', 'resistive', 'shorted'],
  resistor: ['open', 'resistive', 'shorted'],
  diode: ['open', 'resistive', 'shorted'],
  'switch-contact': ['stuck-open', 'stuck-closed', 'resistive'],
  'relay-coil': ['open', 'shorted'],
  'relay-contact': ['stuck-open', 'stuck-closed', 'resistive'],
  pin: ['open', 'resistive', 'dead', 'stuck-on'],
  module: ['dead'],
  battery: ['open', 'resistive', 'shorted', 'weak'],
  feed: ['open', 'resistive'],
} as const satisfies Record<string, readonly Mode[]>

/** What kind of thing a place is, for how often such things fail. */
export type PartClass = keyof typeof modesOfClass
export const partClasses = Object.keys(modesOfClass) as [PartClass, ...PartClass[]]

/** Class of a place from its id; `kindOf` tells the kind of a node. Null for a place on what is not there. */
export function classOfSite(
  site: string,
  kindOf: (node: string) => Node['kind'] | undefined,
): PartClass | null {
  const colon = site.indexOf(':')
  const what = site.slice(0, colon)
  if (what === 'wire' || what === 'contact' || what === 'pin' || what === 'module') return what
  const [node, tail] = site.slice(colon + 1).split('.')
  const kind = kindOf(node!)
  switch (kind) {
    case 'switch':
      return 'switch-contact'
    case 'relay':
      return tail === 'coil' ? 'relay-coil' : 'relay-contact'
    case undefined:
    case 'cavity':
    case 'module':
    case 'dlc':
      return null
    default:
      return kind
  }
}

const kindsByCircuit = new WeakMap<Circuit, Map<string, Node['kind']>>()

/** Class of a place of a circuit; its places have one. Asked for every fault of it, again and again. */
export function partClassOf(circuit: Circuit, site: string): PartClass {
  let kinds = kindsByCircuit.get(circuit)
  if (!kinds)
    kindsByCircuit.set(circuit, (kinds = new Map(circuit.nodes.map((node) => [node.id, node.kind]))))
  const found = classOfSite(site, (node) => kinds.get(node))
  if (found === null) throw new Error(`place "${site}" does not exist`)
  return found
}
