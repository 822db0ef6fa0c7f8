import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointPlaces } from '../canvas/point-place'
import { nodesById } from '@/diagrams/drawing/part-geometry'
import { splitEnd, wiresByEnd } from '@/diagrams/document/ports'

/** Less than this along a wire or through a joint is the same figure on a plate. */
const sameVolts = 0.05

/**
 * The points whose volts are worth a plate on the sheet: the ports of parts. Joints and inline cavities repeat what
 * stands beside them, so they get one only where something is lost across them.
 */
export function shownVolts(circuit: Circuit, volts: ReadonlyMap<string, number>): Map<string, number> {
  const nodes = nodesById(circuit.nodes)
  const wired = wiresByEnd(circuit)
  const shown = new Map<string, number>()
  for (const [point, value] of volts) {
    if (point.endsWith(':part') || point === 'chassis' || !wired.has(point)) continue
    const { node: id, port } = splitEnd(point)
    const node = nodes.get(id)
    if (!node || node.kind === 'splice' || node.kind === 'ground') continue
    if (node.kind === 'cavity') {
      const other = volts.get(`${id}.${port === 'a' ? 'b' : 'a'}`) ?? value
      if (Math.abs(other - value) < sameVolts) continue
    }
    shown.set(point, value)
  }
  return shown
}

/** Every point that a lead can reach, in the order of the drawing, the ones that moved against `before` first. */
export function pointRows(
  circuit: Circuit,
  unplugged: readonly string[],
  now: ReadonlyMap<string, number>,
  before: ReadonlyMap<string, number> | null,
): { point: string; volts: number; before: number | null; moved: boolean }[] {
  // The part's side of a contact can be reached only while its connector is open.
  const reachable = new Set(pointPlaces(circuit, unplugged).map(({ point }) => point))
  const rows = [...now]
    .filter(([point]) => reachable.has(point))
    .map(([point, volts]) => {
      const earlier = before?.get(point) ?? null
      return {
        point,
        volts,
        before: earlier,
        moved: earlier !== null && Math.abs(earlier - volts) >= sameVolts,
      }
    })
  return [...rows.filter((row) => row.moved), ...rows.filter((row) => !row.moved)]
}
