import type { Problem } from './check-circuit'
import type { Circuit, ControlsSetting } from './circuit-schema'
import type { Condition } from './condition-schema'
import type { When } from './names'
import { pointsOf } from './points'

/** Position of every control: the ones named, the others at rest. */
export function positionsIn(circuit: Circuit, setting: ControlsSetting): ControlsSetting {
  // Only what was set: a control may be called like something that every object has.
  const set = (id: string) => (Object.hasOwn(setting, id) ? setting[id] : undefined)
  return Object.fromEntries(circuit.controls.map((c) => [c.id, set(c.id) ?? c.rest]))
}

export function holds(when: When, positions: ControlsSetting): boolean {
  if (when === 'always') return true
  if (when === 'never') return false
  const position = positions[when.control]
  return position !== undefined && when.positions.includes(position)
}

/** What a condition names that the circuit does not have. Paths start at `base`. */
export function checkCondition(circuit: Circuit, condition: Condition, base: string): Problem[] {
  const problems: Problem[] = []
  for (const [id, position] of Object.entries(condition.controls)) {
    const control = circuit.controls.find((c) => c.id === id)
    if (!control) problems.push({ path: `${base}.controls.${id}`, message: `control "${id}" does not exist` })
    else if (!control.positions.includes(position))
      problems.push({
        path: `${base}.controls.${id}`,
        message: `control "${id}" has no position "${position}"`,
      })
  }
  condition.unplugged.forEach((id, index) => {
    const pulled = circuit.nodes.find((node) => node.id === id)
    if (!circuit.connectors.some((c) => c.id === id) && pulled?.kind !== 'fuse' && pulled?.kind !== 'relay')
      problems.push({
        path: `${base}.unplugged.${index}`,
        message: `"${id}" is not a connector, fuse or relay of this circuit`,
      })
  })
  const opened = condition.unplugged
  opened.forEach((id, index) => {
    if (opened.indexOf(id) < index)
      problems.push({ path: `${base}.unplugged.${index}`, message: `"${id}" is unplugged twice` })
  })
  if (condition.charging && !condition.battery)
    problems.push({
      path: `${base}.charging`,
      message: 'nothing charges with the battery disconnected: expected "battery": true or "charging": false',
    })
  if (condition.added.length === 0) return problems
  const points = new Set(['chassis', ...pointsOf(circuit)])
  condition.added.forEach((lead, index) => {
    for (const side of ['from', 'to'] as const)
      if (!points.has(lead[side]))
        problems.push({
          path: `${base}.added.${index}.${side}`,
          message: `point ${lead[side]} does not exist`,
        })
    if (lead.from === lead.to)
      problems.push({
        path: `${base}.added.${index}.to`,
        message: `both ends of the lead are on ${lead.from}`,
      })
  })
  return problems
}

/** One key for equal conditions, whatever the order they were written in. */
export function conditionKey(circuit: Circuit, condition: Condition): string {
  const positions = positionsIn(circuit, condition.controls)
  return JSON.stringify([
    circuit.controls.map((c) => positions[c.id]),
    [...new Set(condition.unplugged)].toSorted(),
    condition.battery,
    condition.charging,
    condition.added,
  ])
}

/** Every combination of control positions, everything plugged in, battery connected; at most `limit` of them. */
export function controlCombinations(circuit: Circuit, limit: number): ControlsSetting[] {
  let all: ControlsSetting[] = [{}]
  for (const control of circuit.controls) {
    // The rest position first, so that the first combination is the vehicle as one finds it.
    const positions = [control.rest, ...control.positions.filter((p) => p !== control.rest)]
    all = positions.flatMap((position) => all.map((setting) => ({ ...setting, [control.id]: position })))
    if (all.length > limit) all = all.slice(0, limit)
  }
  return all
}
