import { describe, expect, it } from 'vitest'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { samples } from '@/diagrams/samples/all-samples'
import example from '@/tests/fixtures/example-circuit.json'
import { randomCircuit } from '@/tests/support/random-circuit'

/** A document to spoil, loosely typed on purpose. */
type Loose = any

const whole = {
  ...example,
  sequence: [{ id: 's1', controls: { key: 'on' }, text: '' }],
  annotations: [{ id: 'n1', kind: 'expect', point: 'door.1:part', controls: { key: 'on' } }],
  nodes: [
    ...example.nodes,
    { id: 'fd', kind: 'feed', live: { control: 'key', positions: ['on'] } },
    { id: 'sw', kind: 'switch', contacts: [{ id: 'x', a: 'in', b: 'out' }] },
    { id: 'p', kind: 'load', ohms: 5, connector: 'c7', cavities: { a: 5, b: 6 } },
  ],
}

function problems(spoil: (document: Loose) => void) {
  const document = structuredClone(whole) as Loose
  spoil(document)
  const opened = openCircuit(document)
  return opened.ok ? [] : opened.problems
}

type Case = [what: string, spoil: (d: Loose) => void, path: string, message: string]

describe('a sound document opens', () => {
  it('the example, with its defaults filled in', () => {
    const opened = openCircuit(example)
    expect(opened.ok).toBe(true)
    if (!opened.ok) return
    expect(opened.value.nodes[0]).toMatchObject({
      kind: 'battery',
      volts: 12.6,
      ohms: 0.02,
      label: 'Battery',
    })
    expect(opened.value.wires[0]).toMatchObject({ ohms: null, bends: [], signal: '' })
    expect(opened.value.connectors[0]).toMatchObject({ numbering: 'rows', accessMinutes: 3 })
  })
  it('the one the cases below spoil', () => {
    expect(problems(() => {})).toEqual([])
  })
  it('an opened document opens again as itself', () => {
    for (const circuit of [...samples, randomCircuit(1), randomCircuit(2)])
      expect(openCircuit(JSON.parse(JSON.stringify(circuit)))).toEqual({ ok: true, value: circuit })
  })
})

describe('a reference to nothing is told with its path', () => {
  it.each<Case>([
    [
      'a wire to a node that is not there',
      (d) => (d.wires[0].to = 'f9.in'),
      'wires.0.to',
      'wire "w1": node "f9" does not exist',
    ],
    [
      'a wire to a port that is not there',
      (d) => (d.wires[0].to = 'f3.mid'),
      'wires.0.to',
      'wire "w1": "f3" has no port "mid"',
    ],
    [
      'a wire to a pin that is not there',
      (d) => (d.wires[1].to = 'door.9'),
      'wires.1.to',
      'wire "w2": "door" has no port "9"',
    ],
    [
      'a wire from a port to itself',
      (d) => (d.wires[0].to = 'bat.pos'),
      'wires.0.to',
      'wire "w1": both ends are bat.pos',
    ],
    [
      'a node behind an unknown connector',
      (d) => (d.nodes[2].connector = 'zz'),
      'nodes.2.connector',
      'node "door": connector "zz" does not exist',
    ],
    [
      'a pin behind an unknown connector',
      (d) => (d.nodes[2].pins[0].connector = 'zz'),
      'nodes.2.pins.0.connector',
      'pin "1": connector "zz" does not exist',
    ],
    [
      'an inline cavity beyond its connector',
      (d) => (d.nodes[3].number = 7),
      'nodes.3.number',
      'node "c7-2": cavity 7 is outside connector "c7", which has 6',
    ],
    [
      'a pin’s cavity beyond its connector',
      (d) => (d.nodes[2].pins[1].cavity = 9),
      'nodes.2.pins.1.cavity',
      'node "door": cavity 9 is outside connector "dm", which has 8',
    ],
    [
      'a part’s cavity beyond its connector',
      (d) => (d.nodes[9].cavities.b = 8),
      'nodes.9.cavities.b',
      'node "p": cavity 8 is outside connector "c7", which has 6',
    ],
    [
      'a cavity used twice',
      (d) => (d.nodes[9].cavities.b = 5),
      'nodes.9.cavities.b',
      'node "p": cavity 5 of connector "c7" is already used by "p"',
    ],
    [
      'a cavity for a port that is not there',
      (d) => (d.nodes[9].cavities.q = 1),
      'nodes.9.cavities.q',
      'node "p" has no port "q"',
    ],
    [
      'an unknown control in a driver',
      (d) => (d.nodes[2].pins[1].circuit.on.control = 'lid'),
      'nodes.2.pins.1.circuit.on.control',
      'control "lid" does not exist',
    ],
    [
      'an unknown position in a driver',
      (d) => (d.nodes[2].pins[1].circuit.on.positions = ['on', 'up']),
      'nodes.2.pins.1.circuit.on.positions.1',
      'control "key" has no position "up"',
    ],
    [
      'an unknown control in a feed',
      (d) => (d.nodes[7].live.control = 'lid'),
      'nodes.7.live.control',
      'control "lid" does not exist',
    ],
    [
      'an unknown position in a switch',
      (d) => (d.nodes[8].contacts[0].closed = { control: 'key', positions: ['up'] }),
      'nodes.8.contacts.0.closed.positions.0',
      'control "key" has no position "up"',
    ],
    [
      'a switch contact to itself',
      (d) => (d.nodes[8].contacts[0].b = 'in'),
      'nodes.8.contacts.0.b',
      'contact "x": both of its ports are "in"',
    ],
    [
      'an unknown control in a step',
      (d) => (d.sequence[0].controls = { lid: 'on' }),
      'sequence.0.controls.lid',
      'control "lid" does not exist',
    ],
    [
      'an unknown position in a step',
      (d) => (d.sequence[0].controls = { key: 'up' }),
      'sequence.0.controls.key',
      'control "key" has no position "up"',
    ],
    [
      'an unknown position in an annotation',
      (d) => (d.annotations[0].controls = { key: 'up' }),
      'annotations.0.controls.key',
      'control "key" has no position "up"',
    ],
    [
      'an annotation at no point',
      (d) => (d.annotations[0].point = 'f3.in:part'),
      'annotations.0.point',
      'annotation "n1": point f3.in:part does not exist',
    ],
    [
      'a rest position that is none',
      (d) => (d.controls[0].rest = 'up'),
      'controls.0.rest',
      'control "key": rest "up" is not one of its positions',
    ],
    [
      'a position listed twice',
      (d) => (d.controls[0].positions = ['off', 'on', 'on']),
      'controls.0.positions',
      'control "key": a position is listed twice',
    ],
    [
      'a bridge to no pin',
      (d) => (d.nodes[4].pins[0].circuit = { type: 'bridge', to: '7', ohms: 120 }),
      'nodes.4.pins.0.circuit.to',
      'pin "12": bridge to "7", expected another pin of "body"',
    ],
    [
      'a bridge to itself',
      (d) => (d.nodes[4].pins[0].circuit = { type: 'bridge', to: '12', ohms: 120 }),
      'nodes.4.pins.0.circuit.to',
      'pin "12": bridge to "12", expected another pin of "body"',
    ],
    [
      'a high-side driver without a supply',
      (d) => (d.nodes[4].pins[0].circuit = { type: 'high-side' }),
      'nodes.4.pins.0.circuit.from',
      'pin "12": a high-side driver needs a supply pin in "body"',
    ],
    [
      'a high-side driver from another pin',
      (d) => (d.nodes[2].pins[1].circuit.from = '8'),
      'nodes.2.pins.1.circuit.from',
      'pin "4": "8" is not a supply pin of "door"',
    ],
    [
      'a code at a place that is not there',
      (d) => (d.codes[0].sites[0] = 'wire:w9'),
      'codes.0.sites.0',
      'code "B1234": place "wire:w9" does not exist',
    ],
  ])('%s', (_, spoil, path, message) => {
    expect(problems(spoil)).toContainEqual({ path, message })
  })
})

describe('an id used twice is told', () => {
  it.each<Case>([
    [
      'by two nodes',
      (d) => (d.nodes[6].id = 'g1'),
      'nodes.6.id',
      'node "g1": the id is already used by nodes.5',
    ],
    [
      'by a node and a connector',
      (d) => (d.nodes[1].id = 'c7'),
      'nodes.1.id',
      'node "c7": the id is already used by connectors.0',
    ],
    [
      'by two connectors',
      (d) => (d.connectors[1].id = 'c7'),
      'connectors.1.id',
      'connector "c7": the id is already used by connectors.0',
    ],
    [
      'by two wires',
      (d) => (d.wires[1].id = 'w1'),
      'wires.1.id',
      'wire "w1": the id is already used by wires.0',
    ],
    [
      'by two controls',
      (d) => d.controls.push(d.controls[0]),
      'controls.1.id',
      'control "key": the id is already used by controls.0',
    ],
    [
      'by two steps',
      (d) => d.sequence.push(d.sequence[0]),
      'sequence.1.id',
      'step "s1": the id is already used by sequence.0',
    ],
    [
      'by two annotations',
      (d) => d.annotations.push(d.annotations[0]),
      'annotations.1.id',
      'annotation "n1": the id is already used by annotations.0',
    ],
    [
      'by two contacts of a switch',
      (d) => d.nodes[8].contacts.push(d.nodes[8].contacts[0]),
      'nodes.8.contacts.1.id',
      'contact "x": the id is already used by nodes.8.contacts.0',
    ],
    [
      'by two pins of a module',
      (d) => (d.nodes[2].pins[1].pin = '1'),
      'nodes.2.pins',
      'node "door": pin "1" is listed twice',
    ],
  ])('%s', (_, spoil, path, message) => {
    expect(problems(spoil)).toContainEqual({ path, message })
  })
})

describe('a field of the wrong shape is told in plain words', () => {
  it.each<Case>([
    ['unknown at the top', (d) => (d.extra = 1), 'extra', 'unknown field "extra"'],
    ['unknown in a node', (d) => (d.nodes[0].extra = 1), 'nodes.0.extra', 'unknown field "extra"'],
    ['of another kind of node', (d) => (d.nodes[0].amps = 1), 'nodes.0.amps', 'unknown field "amps"'],
    [
      'unknown in a pin’s circuit',
      (d) => (d.nodes[2].pins[0].circuit.volts = 1),
      'nodes.2.pins.0.circuit.volts',
      'unknown field "volts"',
    ],
    ['unknown in a setting', (d) => (d.nodes[7].live.x = 1), 'nodes.7.live.x', 'unknown field "x"'],
    ['missing', (d) => delete d.nodes[1].amps, 'nodes.1.amps', 'missing: expected a number'],
    ['missing at the top', (d) => delete d.title, 'title', 'missing: expected text'],
    ['a list missing', (d) => delete d.nodes, 'nodes', 'missing: expected a list'],
    ['text for a number', (d) => (d.nodes[1].amps = '10'), 'nodes.1.amps', '"10": expected a number'],
    ['a number for text', (d) => (d.nodes[1].id = 7), 'nodes.1.id', '7: expected text'],
    ['nothing for text', (d) => (d.nodes[1].label = null), 'nodes.1.label', 'null: expected text'],
    ['no number at all', (d) => (d.wires[0].mm2 = Number.NaN), 'wires.0.mm2', 'NaN: expected a number'],
    [
      'half a cavity',
      (d) => (d.connectors[0].cavities = 1.5),
      'connectors.0.cavities',
      '1.5: expected a whole number',
    ],
    ['a list for an object', (d) => (d.nodes[1] = []), 'nodes.1', 'a list: expected an object'],
    ['too small', (d) => (d.nodes[1].amps = 0), 'nodes.1.amps', '0: expected more than 0'],
    [
      'a resistance below all figures',
      (d) => (d.wires[0].ohms = 5e-324),
      'wires.0.ohms',
      '5e-324: expected at least 1e-9',
    ],
    [
      'a rating below all figures',
      (d) => (d.nodes[1].amps = 5e-324),
      'nodes.1.amps',
      '5e-324: expected at least 0.000001',
    ],
    [
      'a name that gets lost',
      (d) => (d.controls[0].id = '__proto__'),
      'controls.0.id',
      'id "__proto__": expected 1 to 40 letters, digits, "_" or "-"',
    ],
    ['no format', (d) => delete d.format, 'format', 'missing: expected "halfsplit-circuit"'],
    ['a list for a format', (d) => (d.format = []), 'format', 'a list: expected "halfsplit-circuit"'],
    [
      'a list for a kind',
      (d) => (d.nodes[1].kind = []),
      'nodes.1.kind',
      'unknown kind a list: expected one of "battery", "feed", "ground", "fuse", "switch", "relay", "load", "resistor", "diode", "splice", "cavity", "module", "dlc"',
    ],
    [
      'a list for a time',
      (d) => (d.nodes[2].pins[1].circuit.on = []),
      'nodes.2.pins.1.circuit.on',
      'a list: expected "always" or "never" or an object',
    ],
    [
      'a bend out of all bounds',
      (d) => (d.wires[0].bends = [{ x: 1e308, y: 0 }]),
      'wires.0.bends.0.x',
      '1e+308: expected at most 100000',
    ],
    ['too big', (d) => (d.nodes[1].amps = 1e9), 'nodes.1.amps', '1000000000: expected at most 2000'],
    ['a resistance of nothing', (d) => (d.wires[0].ohms = 0), 'wires.0.ohms', '0: expected more than 0'],
    ['empty text', (d) => (d.title = ''), 'title', '"": expected at least 1 character'],
    ['long text', (d) => (d.title = 'x'.repeat(200)), 'title', 'expected at most 120 characters'],
    ['an empty list', (d) => (d.nodes[2].pins = []), 'nodes.2.pins', 'expected at least 1 entry'],
    [
      'an unknown choice',
      (d) => (d.nodes[1].style = 'round'),
      'nodes.1.style',
      '"round": expected one of "blade", "link"',
    ],
    ['another version', (d) => (d.version = 2), 'version', '2: expected 1'],
    ['another format', (d) => (d.format = 'x'), 'format', '"x": expected "halfsplit-circuit"'],
    [
      'a setting of no form',
      (d) => (d.nodes[7].live = 'sometimes'),
      'nodes.7.live',
      '"sometimes": expected "always" or "never" or an object',
    ],
    [
      'a setting without positions',
      (d) => delete d.nodes[7].live.positions,
      'nodes.7.live.positions',
      'missing: expected a list',
    ],
    [
      'an id with a space',
      (d) => (d.nodes[1].id = 'a b'),
      'nodes.1.id',
      'id "a b": expected 1 to 40 letters, digits, "_" or "-"',
    ],
    [
      'an end without a port',
      (d) => (d.wires[0].from = 'bat'),
      'wires.0.from',
      'end "bat": expected node.port',
    ],
    [
      'a port’s name with a space',
      (d) => (d.nodes[9].cavities = { 'i n': 1 }),
      'nodes.9.cavities.i n',
      'port "i n": expected 1 to 12 letters, digits, "+", "_" or "-"',
    ],
    [
      'a code of another form',
      (d) => (d.codes[0].code = 'X1'),
      'codes.0.code',
      'code "X1": expected a code such as B1042',
    ],
  ])('%s', (_, spoil, path, message) => {
    expect(problems(spoil)).toContainEqual({ path, message })
  })

  it('an unknown kind, once, at its own path, with the kinds there are', () => {
    const found = problems((d) => (d.nodes[7].kind = 'gizmo'))
    expect(found).toHaveLength(1)
    expect(found[0]?.path).toBe('nodes.7.kind')
    expect(found[0]?.message).toMatch(/^unknown kind "gizmo": expected one of "battery", .*"dlc"$/)
    expect(problems((d) => delete d.nodes[7].kind)[0]).toMatchObject({
      path: 'nodes.7.kind',
      message: expect.stringMatching(/^kind missing or unknown: expected one of/),
    })
    expect(problems((d) => (d.nodes[2].pins[0].circuit.type = 'zap'))[0]).toMatchObject({
      path: 'nodes.2.pins.0.circuit.type',
      message: expect.stringMatching(/^unknown type "zap": expected one of "supply"/),
    })
  })

  it('every problem at once, not the first alone', () => {
    const found = problems((d) => {
      d.wires[0].to = 'f9.in'
      d.nodes[6].id = 'g1'
      d.controls[0].rest = 'up'
    })
    expect(found.map((problem) => problem.path)).toEqual(
      expect.arrayContaining(['wires.0.to', 'nodes.6.id', 'controls.0.rest']),
    )
  })

  it('what is no document at all', () => {
    for (const input of [null, undefined, 'text', 7, [], {}, () => 1]) {
      const opened = openCircuit(input)
      expect(opened.ok).toBe(false)
      if (!opened.ok)
        for (const { message } of opened.problems) expect(message).not.toMatch(/Invalid|undefined|received/)
    }
    expect(openCircuit(null)).toEqual({
      ok: false,
      problems: [{ path: '', message: 'null: expected an object' }],
    })
  })
})

describe('a message', () => {
  it('repeats no more of what was sent than finds it again', () => {
    const long = 'i'.repeat(1_000_000)
    for (const document of [
      { ...example, nodes: [{ id: long, kind: 'splice' }] },
      { ...example, [long]: 1 },
      { ...example, sequence: [{ id: 's', controls: { [long]: 'on' } }] },
    ]) {
      const opened = openCircuit(document)
      const problem = opened.ok ? undefined : opened.problems[0]
      expect(`${problem?.path}${problem?.message}`.length).toBeLessThan(1000)
    }
  })
})
