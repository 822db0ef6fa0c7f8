import { describe, expect, it } from 'vitest'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { neighbourWires, siteName, sitesOf } from '@/diagrams/document/sites'
import { samples } from '@/diagrams/samples/all-samples'
import { randomCircuit } from '@/tests/support/random-circuit'
import type { NodeInput } from '@/tests/support/harness-draft'
import { madeCircuit, onOff, whenOn } from '@/tests/support/made-circuit'

const bench: NodeInput[] = [
  { id: 'bat', kind: 'battery' },
  { id: 's', kind: 'splice', label: 'S1' },
  { id: 'g', kind: 'ground' },
]
/** Modes of every site of one part wired to a bench at the given ports. */
function modesOf(node: NodeInput, ports: string[]): Record<string, string[]> {
  const circuit = madeCircuit(
    [...bench, node],
    ports.map((port) => `${node.id}.${port} > s.s`),
    { connectors: [{ id: 'c', cavities: 16 }], controls: [onOff('key')] },
  )
  const own = sitesOf(circuit).filter((site) => !/^(wire:|part:s$)/.test(site.id))
  return Object.fromEntries(own.map((site) => [site.id, site.modes]))
}

describe('the sites and modes of a part are those of the format’s table', () => {
  it.each<[NodeInput, string[], Record<string, string[]>]>([
    [{ id: 'n', kind: 'fuse', amps: 5 }, ['in', 'out'], { 'part:n': ['blown', 'resistive'] }],
    [{ id: 'n', kind: 'load', ohms: 5 }, ['a', 'b'], { 'part:n': ['open', 'resistive', 'shorted'] }],
    [{ id: 'n', kind: 'resistor', ohms: 5 }, ['a'], { 'part:n': ['open', 'resistive', 'shorted'] }],
    [{ id: 'n', kind: 'diode' }, ['anode', 'cathode'], { 'part:n': ['open', 'resistive', 'shorted'] }],
    [{ id: 'n', kind: 'ground' }, ['in'], { 'part:n': ['open', 'resistive'] }],
    [{ id: 'n', kind: 'splice' }, ['s'], { 'part:n': ['open', 'resistive'] }],
    [{ id: 'n', kind: 'feed' }, ['out'], { 'part:n': ['open', 'resistive'] }],
    [{ id: 'n', kind: 'battery' }, ['pos'], { 'part:n': ['open', 'resistive', 'shorted', 'weak'] }],
    [
      { id: 'n', kind: 'cavity', connector: 'c', number: 1 },
      ['a', 'b'],
      { 'contact:n': ['open', 'resistive'] },
    ],
    [{ id: 'n', kind: 'dlc' }, ['4'], {}],
    [{ id: 'n', kind: 'dlc', connector: 'c' }, ['4'], { 'contact:n.4': ['open', 'resistive'] }],
    [
      { id: 'n', kind: 'relay' },
      ['85', '86', '30', '87a'],
      { 'part:n.coil': ['open', 'shorted'], 'part:n.contact': ['stuck-open', 'stuck-closed', 'resistive'] },
    ],
    [{ id: 'n', kind: 'relay' }, ['85', '86', '30'], { 'part:n.coil': ['open', 'shorted'] }],
    [
      {
        id: 'n',
        kind: 'switch',
        contacts: [
          { id: 'x', a: '1', b: '2' },
          { id: 'y', a: '1', b: '3' },
        ],
      },
      ['1', '3'],
      { 'part:n.y': ['stuck-open', 'stuck-closed', 'resistive'] },
    ],
    [
      {
        id: 'n',
        kind: 'module',
        connector: 'c',
        pins: [
          { pin: '1', circuit: { type: 'supply', ohms: 100 } },
          { pin: '2', circuit: { type: 'pull-up', volts: 5, ohms: 1000 } },
          { pin: '3', circuit: { type: 'low-side', on: whenOn('key') } },
          { pin: '4', circuit: { type: 'high-side' } },
          { pin: '5' },
        ],
      },
      ['1', '2', '3', '4', '5'],
      {
        ...Object.fromEntries(
          ['1', '2', '3', '4', '5'].map((p) => [`contact:n.${p}`, ['open', 'resistive']]),
        ),
        'pin:n.1': ['open', 'resistive'],
        'pin:n.2': ['open', 'resistive', 'dead'],
        'pin:n.3': ['open', 'resistive', 'dead', 'stuck-on'],
        'pin:n.4': ['open', 'resistive', 'dead'],
        'module:n': ['dead'],
      },
    ],
    [
      { id: 'n', kind: 'module', pins: [{ pin: '1', circuit: { type: 'pull-down', ohms: 100 } }] },
      ['1'],
      { 'pin:n.1': ['open', 'resistive'] },
    ],
  ])('$kind', (node, ports, expected) => {
    expect(modesOf(node, ports)).toEqual(expected)
  })
})

describe('a wire', () => {
  it('can be shorted to supply only where there is one, and to a wire only where one lies beside it', () => {
    const alone = madeCircuit(
      [
        { id: 's', kind: 'splice' },
        { id: 'g', kind: 'ground' },
      ],
      ['s.s > g.in'],
    )
    expect(sitesOf(alone)[0]?.modes).toEqual(['open', 'resistive', 'short-to-ground'])
    const line = madeCircuit(
      [...bench, { id: 'f', kind: 'fuse', amps: 5 }],
      ['bat.pos > f.in', 'f.out > s.s', 's.s > g.in'],
    )
    // Next to each other on the fuse's two ports; the third touches neither part nor connector with them.
    expect(
      sitesOf(line)
        .map((site) => site.modes.includes('short-to-wire'))
        .slice(0, 3),
    ).toEqual([true, true, false])
    expect(sitesOf(line)[0]?.modes).toContain('short-to-supply')
  })

  it('lies beside those in the next cavity on the same side of its connector, not across it', () => {
    const cavity = (number: number): NodeInput => ({
      id: `v${number}`,
      kind: 'cavity',
      connector: 'c',
      number,
    })
    const circuit = madeCircuit(
      [...bench, cavity(1), cavity(2), cavity(4)],
      ['s.s > v1.a', 'v1.b > g.in', 's.s > v2.a', 'v2.b > g.in', 's.s > v4.a'],
      { connectors: [{ id: 'c', cavities: 4 }] },
    )
    expect(neighbourWires(circuit, 'w1')).toEqual(['w3'])
    expect(neighbourWires(circuit, 'w2')).toEqual(['w4'])
    expect(neighbourWires(circuit, 'w5')).toEqual([])
  })
})

describe('a site is named in the trade’s words', () => {
  const circuit = madeCircuit(
    [
      ...bench,
      { id: 'k', kind: 'relay', label: 'K3' },
      { id: 'v', kind: 'cavity', connector: 'c', number: 2 },
    ],
    ['bat.pos > k.86', 'k.85 > v.a', 'v.b > g.in'],
    { connectors: [{ id: 'c', label: 'C12', cavities: 4 }] },
  )
  it.each([
    ['wire:w2', 'wire K3 85 to C12 cavity 2'],
    ['part:k.coil', 'K3 coil'],
    ['contact:v', 'C12 cavity 2'],
    ['part:g', 'g'],
    ['part:none', 'part:none'],
  ])('%s', (id, name) => {
    expect(siteName(circuit, id)).toBe(name)
  })

  it('of thousands of wires on two ends are listed without pairing all of them', () => {
    const count = 4000
    const ids = Array.from({ length: count }, (_, i) => `l${i}`)
    const opened = openCircuit({
      format: 'halfsplit-circuit',
      version: 1,
      title: 'A star',
      nodes: [{ id: 'b', kind: 'battery' }, ...ids.map((id) => ({ id, kind: 'load', ohms: 100 }))],
      wires: ids.flatMap((id) => [
        { id: `${id}-in`, from: 'b.pos', to: `${id}.a` },
        { id: `${id}-out`, from: `${id}.b`, to: 'b.neg' },
      ]),
    })
    if (!opened.ok) throw new Error(opened.problems[0]?.message)
    const before = process.cpuUsage().user
    const sites = sitesOf(opened.value)
    expect((process.cpuUsage().user - before) / 1000).toBeLessThan(1000)
    expect(sites.length).toBe(3 * count + 1)
    expect(sites[0]?.modes).toContain('short-to-wire')
  })

  it('of wires can touch another wire exactly where one lies beside them', () => {
    for (const circuit of [...samples, ...Array.from({ length: 40 }, (_, seed) => randomCircuit(seed))])
      for (const site of sitesOf(circuit).filter(({ id }) => id.startsWith('wire:')))
        expect([site.id, site.modes.includes('short-to-wire')]).toEqual([
          site.id,
          neighbourWires(circuit, site.id.slice('wire:'.length)).length > 0,
        ])
  })
})
