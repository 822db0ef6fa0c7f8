import type { Circuit } from '@/diagrams/document/circuit-schema'
import { connectorName, nodeName } from '@/diagrams/document/points'
import { splitEnd } from '@/diagrams/document/ports'
import { type Mode, siteName } from '@/diagrams/document/sites'

/** A place in the fewest words that tell it from its neighbours: what fits into a cell of the rule. */
export function shortSiteName(circuit: Circuit, site: string): string {
  const colon = site.indexOf(':')
  const kind = site.slice(0, colon)
  const rest = site.slice(colon + 1)
  const nodeOf = (id: string) => circuit.nodes.find((node) => node.id === id)
  if (kind === 'wire') {
    const wire = circuit.wires.find((one) => one.id === rest)
    return wire ? `wire to ${endWord(circuit, wire.to)}` : rest
  }
  const dot = rest.indexOf('.')
  const node = nodeOf(dot < 0 ? rest : rest.slice(0, dot))
  const tail = dot < 0 ? '' : rest.slice(dot + 1)
  if (!node) return rest
  if (node.kind === 'cavity') {
    const connector = circuit.connectors.find((one) => one.id === node.connector)
    return `${connector ? connectorName(connector) : node.connector} cav ${node.number}`
  }
  if (kind === 'module') return `${nodeName(node)} itself`
  if (kind === 'pin') return `${nodeName(node)} pin ${tail}`
  if (kind === 'contact') return `${nodeName(node)} ${tail} contact`
  return tail ? `${nodeName(node)} ${tail}` : nodeName(node)
}

function endWord(circuit: Circuit, end: string): string {
  const { node: id, port } = splitEnd(end)
  const node = circuit.nodes.find((one) => one.id === id)
  if (!node) return end
  if (node.kind === 'cavity') {
    const connector = circuit.connectors.find((one) => one.id === node.connector)
    return `${connector ? connectorName(connector) : node.connector}-${node.number}`
  }
  return node.kind === 'module' || node.kind === 'relay' ? `${nodeName(node)} ${port}` : nodeName(node)
}

export const modeWords: Record<Mode, string> = {
  open: 'open',
  resistive: 'bad joint',
  'short-to-ground': 'short to ground',
  'short-to-supply': 'short to supply',
  'short-to-wire': 'touches another wire',
  blown: 'blown',
  shorted: 'shorted',
  weak: 'weak',
  'stuck-open': 'stuck open',
  'stuck-closed': 'stuck closed',
  dead: 'dead',
  'stuck-on': 'stuck on',
}

/** What to look for at a place that fails this way. */
export function lookFor(site: string, mode: Mode): string {
  if (site.startsWith('contact:')) return 'a pin pushed back, a spread terminal or green corrosion'
  if (site.startsWith('pin:'))
    return 'a bent or pushed-back pin, and the joint at the module before the module itself'
  if (site.startsWith('module:')) return 'its feeds and grounds once more under load before it is replaced'
  if (site.startsWith('wire:'))
    return mode === 'open' || mode === 'resistive'
      ? 'a break or a chafed, stretched or corroded length, first where the harness bends or passes an edge'
      : 'chafed insulation where the harness passes an edge, a bracket or another wire'
  switch (mode) {
    case 'blown':
      return 'what has overloaded it before a new one goes in, and never a bigger fuse'
    case 'weak':
      return 'its charge and its posts, with the load on'
    default:
      return 'the part itself, its terminals and what it is fixed to'
  }
}

/** "C12 cavity 3", with a capital where a sentence begins with it. */
export function siteTitle(circuit: Circuit, site: string): string {
  const name = siteName(circuit, site)
  return name.charAt(0).toUpperCase() + name.slice(1)
}

/** The first sentence of a verdict says place and what; the others say why. */
export function headAndRest(says: string): [string, string] {
  const end = says.search(/[.](?=\s)/)
  return end < 0 ? [says.replace(/[.]$/, ''), ''] : [says.slice(0, end), says.slice(end + 1).trim()]
}
