import type { Circuit } from '../document/circuit-schema'
import { nodeName } from '../document/points'
import { splitEnd } from '../document/ports'
import { siteName } from '../document/sites'
import type { SiteAnswer } from './answer'
import { capital, fewWords, percentWords } from './value-words'

const mostNamed = 4

/** Places that no reading tells apart, and what beside a meter would. */
export function alikeWords(circuit: Circuit, group: readonly SiteAnswer[]): string {
  const names = fewWords(
    group.map((site) => siteName(circuit, site.site)),
    mostNamed,
  )
  return `${capital(names)} look the same from outside and cannot be told apart by any reading. ${separatedBy(circuit, group)}`
}

/** What would separate them, since no reading does. */
function separatedBy(circuit: Circuit, group: readonly SiteAnswer[]): string {
  const ids = group.map((site) => site.site)
  const module = ofOneModule(circuit, ids)
  if (module) return `Prove the feeds and grounds of ${module}, then it is the module.`
  const splice = circuit.nodes.find((node) => node.kind === 'splice' && ids.includes(`part:${node.id}`))
  if (splice) return `Open ${nodeName(splice)} and look at its crimp first.`
  const wires = circuit.wires.filter((wire) => ids.includes(`wire:${wire.id}`))
  if (wires.length === ids.length && wires.length > 1)
    return 'They touch each other or the same metal: look where they run together.'
  const first = group[0]!
  return `Look at ${siteName(circuit, first.site)} first: ${percentWords(first.probability)} likely.`
}

/** The one module whose pins, or which itself, all these places are. */
export function ofOneModule(circuit: Circuit, ids: readonly string[]): string | null {
  const owners = new Set(
    ids.map((id) => (/^(pin|module):/.test(id) ? splitEnd(`${id.slice(id.indexOf(':') + 1)}.`).node : '')),
  )
  const [only] = owners
  if (owners.size !== 1 || !only) return null
  const node = circuit.nodes.find((n) => n.id === only)
  return node ? nodeName(node) : null
}
