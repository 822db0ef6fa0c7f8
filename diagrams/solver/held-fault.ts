import { noAlteration, type Alteration } from './alteration'
import { finishNetwork, nothingForced, type Branch, type Forced, type Network } from './network'

/** A fault that stays as it is while others are swept: a network with its resistance in it, and what it forces. */
export interface HeldFault {
  network: Network
  forced: Forced
}

/**
 * Writes a fault into a network, so that a second one can be swept as if it were the only one.
 *
 * In series: branch a–b becomes a–m and m–b with a new unknown m, the part's own resistance and
 * source in the first, the fault's in the second; so the part is still judged by its own element.
 * Across: one more branch. Old unknowns and branches keep their numbers. The elimination order is
 * found once and serves every severity; the factorisation stays free of subtractions.
 * Not for a weak battery, whose severity is the scale of all sources: sweep that one instead.
 */
export function faultHolder(network: Network, alteration: Alteration): (severity: number) => HeldFault {
  const { series, shunt, weak, forced } = alteration
  if (weak) throw new Error('a weak battery cannot be held: sweep it beside the other fault')
  if (series.length === 0 && !shunt) return () => ({ network, forced })
  const branches = network.branches.slice()
  let { size } = network
  for (const index of series) {
    const own = branches[index]!
    const between = size++
    branches[index] = { ...own, b: between }
    branches.push(resistance(`${own.name}/held`, between, own.b))
  }
  if (shunt) branches.push(resistance('held', ...shunt))
  const shape = finishNetwork({ ...network, branches, size })
  const from = network.branches.length
  return (severity) => ({
    network: {
      ...shape,
      branches: shape.branches.map((branch, i) => (i < from ? branch : { ...branch, ohms: () => severity })),
    },
    forced,
  })
}

function resistance(name: string, a: number, b: number): Branch {
  return {
    name,
    a,
    b,
    // A severity is what it is: no tolerance on top.
    exact: true,
    supply: 'fixed',
    varies: false,
    conducts: () => true,
    emf: () => 0,
    ohms: () => 1,
  }
}

/** The alteration to sweep on a held fault's network: its own change, and what both force. */
export function besides(held: HeldFault, alteration: Alteration = noAlteration): Alteration {
  return { ...alteration, forced: bothForced(held.forced, alteration.forced) }
}

function bothForced(one: Forced, other: Forced): Forced {
  if (one === nothingForced || one.key === '') return other
  if (other.key === '') return one
  return {
    key: `${one.key}+${other.key}`,
    off: new Set([...one.off, ...other.off]),
    on: new Set([...one.on, ...other.on]),
    deadModules: new Set([...one.deadModules, ...other.deadModules]),
    stuckRelays: new Map([...one.stuckRelays, ...other.stuckRelays]),
    idle: new Set([...one.idle, ...other.idle]),
  }
}
