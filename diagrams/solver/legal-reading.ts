import type { Problem } from '../document/check-circuit'
import type { Circuit } from '../document/circuit-schema'
import { checkCondition, conditionKey } from '../document/condition'
import type { Condition } from '../document/condition-schema'
import { nodeName, parsePoint, pointName } from '../document/points'
import { hasContact, portsOf } from '../document/ports'
import type { Probe } from '../document/reading-schema'
import { leadBelowOhms, mostLeadAmps } from './added-lead'
import { branchAmps, type Case, type Settled, voltsAt } from './case'
import { deadVolts } from './constants'
import { openCase } from './faulted-case'
import { unstable } from './operating-point'

/** Why a reading cannot be taken, or null. Judged on the good circuit, as the person with the meter would. */
export function refuseReading(circuit: Circuit, probe: Probe): Problem | null {
  return refuseProbe(circuit, probe) ?? refuseUnrest(circuit, probe.condition)
}

/** What does not come to rest has no figure to expect, so that nothing could be made of one that was read. */
function refuseUnrest(circuit: Circuit, condition: Condition): Problem | null {
  // With the battery off nothing is driven and no coil pulls.
  if (!condition.battery) return null
  let known = restByCircuit.get(circuit)
  if (!known) restByCircuit.set(circuit, (known = new Map()))
  const key = conditionKey(circuit, condition)
  let problem = known.get(key)
  if (problem === undefined) {
    const opened = openCase(circuit, condition)
    const settled = opened.ok ? opened.value.given.settle(0) : null
    if (!opened.ok) problem = opened.problem
    else problem = settled ? refuseLeads(circuit, opened.value.given, settled) : unstable
    if (known.size > 300) known.clear()
    known.set(key, problem)
  }
  return problem
}

/**
 * What is put in bypasses what protects: never on an airbag circuit, and never so that the good circuit
 * would drive more through a lead than any fused lead carries.
 */
function refuseLeads(circuit: Circuit, given: Case, settled: Settled): Problem | null {
  const { network, condition } = given.study
  if (condition.added.length === 0) return null
  if (circuit.cautions.includes('airbag'))
    return {
      path: 'condition.added',
      message: 'nothing is put into an airbag circuit: disable it by the maker’s procedure',
    }
  for (const [index, lead] of condition.added.entries()) {
    const amps = Math.abs(branchAmps(given, settled, network.branchIndex.get(`added:${index}`)!))
    if (lead.ohms < leadBelowOhms && amps > mostLeadAmps)
      return {
        path: `condition.added.${index}`,
        message: `a lead from ${pointName(circuit, lead.from)} to ${pointName(circuit, lead.to)} would carry ${amps.toFixed(0)} A, expected at most ${mostLeadAmps} A: it joins a supply to ground`,
      }
  }
  return null
}

/** Asked for every reading of a trace, and most are taken in the same few conditions. */
const restByCircuit = new WeakMap<Circuit, Map<string, Problem | null>>()

function refuseProbe(circuit: Circuit, probe: Probe): Problem | null {
  const wrong = checkCondition(circuit, probe.condition, 'condition')[0]
  if (wrong) return wrong
  for (const [index, lead] of probe.condition.added.entries())
    for (const side of ['from', 'to'] as const) {
      const path = `condition.added.${index}.${side}`
      const problem = refusePoint(circuit, lead[side], path, probe.condition.unplugged)
      if (problem) return problem
    }
  switch (probe.kind) {
    case 'amps':
      return circuit.wires.some((wire) => wire.id === probe.wire)
        ? null
        : { path: 'wire', message: `wire "${probe.wire}" does not exist` }
    case 'works':
      return circuit.nodes.some((node) => node.id === probe.node && node.kind === 'load')
        ? null
        : { path: 'node', message: `load "${probe.node}" does not exist` }
    case 'sees': {
      const point = parsePoint(probe.pin)
      if (point?.part)
        return {
          path: 'pin',
          message: `"${probe.pin}" is a side of a plug, expected a pin such as ${point.node}.${point.port}`,
        }
      const node = circuit.nodes.find((n) => n.id === point?.node)
      const pin = node?.kind === 'module' ? node.pins.find((p) => p.pin === point?.port) : undefined
      if (pin?.circuit.type !== 'pull-up' && pin?.circuit.type !== 'pull-down')
        return { path: 'pin', message: `"${probe.pin}" is not an input of a module` }
      return probe.condition.battery
        ? null
        : {
            path: 'condition.battery',
            message: `${node ? nodeName(node) : probe.pin} reports nothing with the battery disconnected`,
          }
    }
    case 'volts':
    case 'ohms':
      for (const side of ['red', 'black'] as const) {
        const problem = refusePoint(circuit, probe[side], side, probe.condition.unplugged)
        if (problem) return problem
      }
      if (probe.red === probe.black) return { path: 'black', message: `both leads are on ${probe.red}` }
      return probe.kind === 'ohms' && probe.condition.battery ? refuseLiveOhms(circuit, probe) : null
  }
}

function refusePoint(
  circuit: Circuit,
  text: string,
  side: string,
  unplugged: readonly string[],
): Problem | null {
  const point = parsePoint(text)
  if (!point) return null
  const node = circuit.nodes.find((n) => n.id === point.node)
  const port = node && portsOf(node).find((p) => p.name === point.port)
  if (!node || !port || (point.part && !hasContact(node, port)))
    return { path: side, message: `point ${text} does not exist` }
  if (!point.part) return null
  const pulled = (node.kind === 'fuse' || node.kind === 'relay') && unplugged.includes(node.id)
  return unplugged.includes(port.connector!) || pulled
    ? null
    : {
        path: side,
        message: `${pointName(circuit, text)} is reachable only while its connector is unplugged`,
      }
}

const liveOhms =
  'Ohms needs the battery disconnected. A live circuit gives a false figure and can harm the meter.'

function refuseLiveOhms(circuit: Circuit, probe: Extract<Probe, { kind: 'volts' | 'ohms' }>): Problem | null {
  const opened = openCase(circuit, probe.condition)
  if (!opened.ok) return opened.problem
  const settled = opened.value.given.settle(0)
  if (!settled) return unstable
  return isDead(opened.value.given, settled, probe.red, probe.black)
    ? null
    : { path: 'condition.battery', message: liveOhms }
}

/** Both leads within 0.05 V of chassis and of each other, and no source connected to either. */
export function isDead(given: Case, settled: Settled, red: string, black: string): boolean {
  const { network } = given.study
  const [a, b] = [network.unknownOf.get(red)!, network.unknownOf.get(black)!]
  const [va, vb] = [voltsAt(settled, a), voltsAt(settled, b)]
  if (Math.abs(va) > deadVolts || Math.abs(vb) > deadVolts || Math.abs(va - vb) > deadVolts) return false
  const fed = unknownsFed(given, settled)
  return !fed.has(a) && !fed.has(b)
}

/** Unknowns that a conducting path joins to a live source, chassis not counted as a path. */
function unknownsFed(given: Case, settled: Settled): Set<number> {
  const { network } = given.study
  const { conductance, emfBattery, emfFixed } = settled.located.base
  const beside = new Map<number, number[]>()
  const queue: number[] = []
  network.branches.forEach((branch, i) => {
    if (conductance[i] === 0) return
    const live = emfBattery[i] !== 0 || emfFixed[i] !== 0
    for (const [here, there] of [
      [branch.a, branch.b],
      [branch.b, branch.a],
    ] as const) {
      if (here < 0) continue
      if (live) queue.push(here)
      if (there < 0) continue
      const list = beside.get(here)
      if (list) list.push(there)
      else beside.set(here, [there])
    }
  })
  const fed = new Set<number>()
  for (let next = queue.pop(); next !== undefined; next = queue.pop()) {
    if (fed.has(next)) continue
    fed.add(next)
    queue.push(...(beside.get(next) ?? []))
  }
  return fed
}
