import { neighbourWires, type Mode } from '../document/sites'
import type { Alteration } from './alteration'
import { nothingForced, type Forced, type Network } from './network'

/** A fault without its severity: where and how. */
export interface FaultKind {
  site: string
  mode: Mode
  other?: string | undefined
  wire?: string | undefined
}

/** What a fault changes in a network. Throws on a site or mode the circuit does not have: check first. */
export function alterationOf(network: Network, fault: FaultKind): Alteration {
  const { circuit } = network
  const colon = fault.site.indexOf(':')
  const rest = fault.site.slice(colon + 1)
  const dot = rest.indexOf('.')
  const nodeId = dot < 0 ? rest : rest.slice(0, dot)
  const tail = dot < 0 ? '' : rest.slice(dot + 1)
  const node = circuit.nodes.find((n) => n.id === nodeId)
  const key = `${fault.site}=${fault.mode}`

  const branch = (name: string): number => {
    const index = network.branchIndex.get(name)
    if (index === undefined) throw new Error(`${fault.site}: no branch ${name}`)
    return index
  }
  const make = (change: Partial<Omit<Alteration, 'forced'>>, forced: Partial<Forced> = {}): Alteration => ({
    series: [],
    shunt: null,
    weak: false,
    ...change,
    forced: Object.keys(forced).length === 0 ? nothingForced : { ...nothingForced, ...forced, key },
  })
  const series = (...names: string[]) => ({ series: names.map(branch) })
  const across = (name: string) => {
    const { a, b } = network.branches[branch(name)]!
    return { shunt: [a, b] as const }
  }
  const idle = { idle: new Set([nodeId]) }

  switch (fault.site.slice(0, colon)) {
    case 'wire': {
      const middle = network.middleOf.get(rest)!
      switch (fault.mode) {
        case 'open':
        case 'resistive':
          return make(series(`wire:${rest}/from`))
        case 'short-to-ground':
          return make({ shunt: [middle, -1] })
        case 'short-to-supply':
          return make({ shunt: [middle, supplyUnknown(network)] })
        case 'short-to-wire': {
          const other = fault.other ?? neighbourWires(circuit, rest)[0]
          return make({ shunt: [middle, network.middleOf.get(other!)!] })
        }
      }
      break
    }
    case 'contact':
      return make(series(fault.site))
    case 'module':
      return make({}, { deadModules: new Set([nodeId]) })
    case 'pin':
      switch (fault.mode) {
        case 'open':
        case 'resistive':
          return make(series(fault.site))
        case 'dead':
          return make({}, { off: new Set([`${fault.site}/inner`]) })
        case 'stuck-on':
          return make({}, { on: new Set([`${fault.site}/inner`]) })
      }
      break
    case 'part': {
      if (node?.kind === 'splice') {
        const end = `${nodeId}.s`
        const wire = circuit.wires.find(
          (w) => (fault.wire === undefined || w.id === fault.wire) && (w.from === end || w.to === end),
        )!
        return make(series(`wire:${wire.id}/${wire.from === end ? 'from' : 'to'}`))
      }
      if (node?.kind === 'switch')
        switch (fault.mode) {
          case 'stuck-closed':
            return make({}, { on: new Set([fault.site]) })
          default:
            // Stuck open: a contact that never joins is a closed one with an open in series.
            return make(series(fault.site))
        }
      if (node?.kind === 'relay') {
        if (tail === 'coil')
          return make(fault.mode === 'open' ? series(fault.site) : across(fault.site), idle)
        if (fault.mode === 'resistive') return make(series(`${fault.site}/87`, `${fault.site}/87a`))
        return make({}, { stuckRelays: new Map([[nodeId, fault.mode === 'stuck-closed']]) })
      }
      if (fault.mode === 'weak') return make({ weak: true })
      // An open or shorted load never works.
      const never = node?.kind === 'load' && fault.mode !== 'resistive' ? idle : {}
      return make(fault.mode === 'shorted' ? across(fault.site) : series(fault.site), never)
    }
  }
  throw new Error(`${fault.site}: no mode ${fault.mode}`)
}

/** Where a short to supply leads: the battery's plus, else the first feed. */
function supplyUnknown(network: Network): number {
  const battery = network.circuit.nodes.find((n) => n.kind === 'battery')
  const feed = network.circuit.nodes.find((n) => n.kind === 'feed')
  return network.unknownOf.get(battery ? `${battery.id}.pos` : `${feed!.id}.out`)!
}

/** True for the modes whose severity is a resistance that joins what should be apart. */
export function isShort(mode: Mode): boolean {
  return mode.startsWith('short')
}

/** A plain severity for a mode, used when none is asked for: ohm, or volts of a weak battery. */
export function plainSeverity(mode: Mode): number {
  switch (mode) {
    case 'open':
    case 'blown':
    case 'stuck-open':
      return 1e10
    case 'resistive':
      return 5
    case 'weak':
      return 10
    default:
      return isShort(mode) ? 0.05 : 0
  }
}
