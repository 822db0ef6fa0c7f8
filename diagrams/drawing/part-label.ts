import type { Circuit } from '../document/circuit-schema'
import type { Node } from '../document/node-schema'
import { nodeName } from '../document/points'
import { partBox } from './part-geometry'
import { restState, type PartState } from './part-state'
import { textWidth, type Box, type Primitive } from './primitive'
import { ink, note } from './symbol-pen'
import { wireRoute } from './wire-route'

type Text = Extract<Primitive, { kind: 'text' }>

/** A part's name and its figures, outside its box, from the box's top left corner. */
export function partLabels(circuit: Circuit, node: Node, state: PartState = restState): Text[] {
  const { width, height } = partBox(node)
  const name = nodeName(node)
  const below = (line: number) => height + 14 + 17 * line
  switch (node.kind) {
    case 'battery':
      return [ink(width / 2 + 6, -6, name, 'middle')]
    case 'feed':
      return [ink(0, 54, name, 'start'), ...(state.liveWords ? [note(0, 71, state.liveWords, 'start')] : [])]
    case 'ground':
      return [ink(46, 28, name, 'start')]
    case 'fuse':
      return [
        ink(width / 2, below(-0.3), name, 'middle'),
        note(width / 2, below(0.7), `${node.amps} A`, 'middle'),
      ]
    case 'resistor':
      return [
        ink(width / 2, below(-0.3), name, 'middle'),
        note(width / 2, below(0.7), `${node.ohms} ohm`, 'middle'),
      ]
    case 'load':
    case 'diode':
      return [ink(width / 2, below(0.2), loadName(node, name, state), 'middle')]
    case 'splice':
      return [spliceLabel(circuit, node, name)]
    case 'cavity':
      return []
    case 'switch':
    case 'relay':
      return [ink(width / 2, -9, name, 'middle')]
    case 'module':
      return [ink(0, -9, name, 'start')]
    case 'dlc':
      return [ink(width / 2, height / 2 + 5, name, 'middle')]
  }
}

function loadName(node: Node, name: string, state: PartState): string {
  return node.kind === 'load' && node.style === 'lamp' && state.works ? `${name}, lit` : name
}

/** A splice's name goes into the corner that no wire leaves through, and that no wire turns in. */
function spliceLabel(circuit: Circuit, node: Node, name: string): Text {
  const end = `${node.id}.s`
  const taken = { left: false, right: false, up: false, down: false }
  for (const wire of circuit.wires) {
    if (wire.from !== end && wire.to !== end) continue
    const route = wireRoute(circuit, wire)
    const way = wire.from === end ? route : wire.to === end ? route.toReversed() : []
    const [here, next] = way
    if (!here || !next) continue
    if (next.x < here.x) taken.left = true
    if (next.x > here.x) taken.right = true
    if (next.y < here.y) taken.up = true
    if (next.y > here.y) taken.down = true
  }
  if (!taken.right) return ink(38, 25, name, 'start')
  if (!taken.left) return ink(2, 25, name, 'end')
  if (!taken.up) return ink(20, 2, name, 'middle')
  if (!taken.down) return ink(20, 49, name, 'middle')
  return ink(34, 44, name, 'start')
}

/** The box a text fills, in the coordinates it is given in. */
export function textBox(text: Text): Box {
  const width = textWidth(text.text, text.size, text.mono)
  const x = text.anchor === 'start' ? text.x : text.anchor === 'end' ? text.x - width : text.x - width / 2
  return { x, y: text.y - text.size * 0.82, width, height: text.size * 1.08 }
}
