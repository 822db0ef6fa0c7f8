import type { Circuit } from '@/diagrams/document/circuit-schema'
import { madeCircuit, onOff, whenOn } from './made-circuit'

/**
 * Battery, fuse F1 of 20 A, key switch, through C1 to a lamp behind its own plug C2, and back through C1 to ground G1.
 * Feed: cavity 1 of C1, a towards the key; ground: cavity 2, a towards the ground.
 */
export function lampLine(loadOhms = 6, coldOhms?: number): Circuit {
  return madeCircuit(
    [
      { id: 'bat', kind: 'battery' },
      { id: 'f1', kind: 'fuse', amps: 20, label: 'F1' },
      {
        id: 'key',
        kind: 'switch',
        label: 'Key',
        contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('key') }],
      },
      { id: 'c1-1', kind: 'cavity', connector: 'c1', number: 1 },
      {
        id: 'lamp',
        kind: 'load',
        label: 'Lamp',
        style: 'lamp',
        ohms: loadOhms,
        coldOhms,
        connector: 'c2',
        cavities: { a: 1, b: 2 },
      },
      { id: 'c1-2', kind: 'cavity', connector: 'c1', number: 2 },
      { id: 'g1', kind: 'ground', label: 'G1' },
    ],
    [
      'bat.pos > f1.in', // w1
      'f1.out > key.in', // w2
      'key.out > c1-1.a', // w3
      'c1-1.b > lamp.a', // w4
      'lamp.b > c1-2.b', // w5
      'c1-2.a > g1.in', // w6
    ],
    {
      controls: [{ ...onOff('key'), label: 'Key' }],
      connectors: [
        { id: 'c1', label: 'C1', cavities: 2 },
        { id: 'c2', label: 'C2', cavities: 2 },
      ],
    },
  )
}

export const keyOn = { controls: { key: 'on' } }
