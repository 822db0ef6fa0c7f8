import type { Circuit, Wire } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import { hasContact, portsOf, splitEnd } from '../document/ports'
import { theveninOhms } from '../solver/case'
import { openCase } from '../solver/faulted-case'

/** More than this between a wire's end and anything else, and the end is open: no wire has a millionth of it. */
const openFromOhms = 1e6

/** True when, with this wire cut, these points have nothing between them in this condition. */
export function apart(circuit: Circuit, wire: string, condition: Condition, a: string, b: string): boolean {
  if (a === b) return false
  const opened = openCase(circuit, condition, { site: `wire:${wire}`, mode: 'open' })
  if (!opened.ok) return false
  const { given, severity } = opened.value
  const settled = given.settle(severity)
  if (!settled) return false
  const { unknownOf } = given.study.network
  const [first, second] = [unknownOf.get(a), unknownOf.get(b)]
  return first !== undefined && second !== undefined && theveninOhms(settled, first, second) > openFromOhms
}

/** True when nothing but the wire itself leads from either of its ends to the other, to chassis or to this point. */
export function bothEndsOpen(circuit: Circuit, wire: Wire, condition: Condition, against: string): boolean {
  const free = (a: string, b: string) => apart(circuit, wire.id, condition, a, b)
  return (
    free(wire.from, wire.to) &&
    [wire.from, wire.to].every((end) => free(end, 'chassis') && free(end, against))
  )
}

/** What to unplug so that this end of a wire is open; null where it ends in something that cannot be unplugged. */
export function unplugFor(circuit: Circuit, end: string): string | null {
  const { node: id, port: name } = splitEnd(end)
  const node = circuit.nodes.find((one) => one.id === id)
  const port = node && portsOf(node).find((one) => one.name === name)
  if (!node || !port) return null
  if (node.kind === 'cavity') return node.connector
  if (hasContact(node, port)) return port.connector
  return node.kind === 'fuse' || node.kind === 'relay' ? node.id : null
}
