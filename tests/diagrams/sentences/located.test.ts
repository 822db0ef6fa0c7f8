import { describe, expect, it } from 'vitest'
import type { Mode } from '@/diagrams/document/sites'
import { samples } from '@/diagrams/samples/all-samples'
import { faultWords } from '@/diagrams/faults/fault-words'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { keyOn, lampLine } from '@/tests/support/lamp-line'
import { madeCircuit, onOff, whenOn } from '@/tests/support/made-circuit'
import { ToldStory } from '@/tests/support/told-story'

const fan = samples.find((sample) => sample.title === 'Two-speed cooling fan')!

describe('a place and how it fails, in one clause', () => {
  it.each<[string, Mode, number | null, string | null, string]>([
    ['wire:w6', 'open', null, null, 'Open in wire A1 feed to F20 in'],
    ['contact:c21-3', 'open', null, null, 'Open at C21 cavity 3'],
    ['contact:ecm.18', 'open', null, null, 'Open in the contact at Engine module pin 18'],
    ['contact:c21-3', 'resistive', 1.83, null, 'Bad joint at C21 cavity 3: about 1.8 ohm'],
    ['wire:w6', 'resistive', 4720, null, 'High resistance in wire A1 feed to F20 in: about 4.7 kohm'],
    ['part:k1.contact', 'resistive', 0.5, null, 'High resistance at K1 fan slow contact: about 0.5 ohm'],
    ['wire:w6', 'short-to-ground', 0.1, null, 'Short to ground in wire A1 feed to F20 in'],
    ['wire:w8', 'short-to-supply', 2, null, 'Short to supply in wire C21 cavity 3 to Engine module pin 18'],
    [
      'wire:w6',
      'short-to-wire',
      0.05,
      'w7',
      'Wire A1 feed to F20 in touches wire K1 fan slow 85 to C21 cavity 3',
    ],
    ['part:m1', 'shorted', 0.2, null, 'M1 cooling fan is shorted inside'],
    ['part:f20', 'blown', null, null, 'F20 has blown'],
    ['part:a1', 'weak', null, null, 'A1 feed is weak'],
    ['part:k1.contact', 'stuck-open', null, null, 'K1 fan slow contact stays open'],
    ['part:k1.contact', 'stuck-closed', null, null, 'K1 fan slow contact stays closed'],
    ['pin:ecm.18', 'dead', null, null, 'Engine module pin 18 is dead'],
    ['module:ecm', 'dead', null, null, 'Engine module does not wake'],
    ['pin:ecm.18', 'stuck-on', null, null, 'Engine module pin 18 is stuck on'],
  ])('%s %s', (site, mode, ohms, other, said) => {
    expect(faultWords(fan, site, { mode, ohms, other })).toBe(said)
  })
})

/** What is said once the readings have been taken. */
function said(fault: PlantedFault, take: (story: ToldStory) => void, circuit = lampLine()): string {
  const story = new ToldStory(circuit, fault)
  take(story)
  const answer = story.answer()
  expect(answer.outcome).toBe('located')
  return answer.says
}

describe('a located fault', () => {
  it('open between two points: what goes in and what comes out', () => {
    expect(
      said({ site: 'wire:w4', mode: 'open' }, (story) => {
        story.volts('c1-1.b', keyOn)
        story.volts('lamp.a', keyOn)
      }),
    ).toBe(
      'Open in wire C1 cavity 1 to Lamp a. 12.60 V goes in at C1 cavity 1, side b, 0.00 V comes out at Lamp a. Less likely: high resistance, 13 %.',
    )
  })

  it('open in a connector: its two sides', () => {
    expect(
      said({ site: 'contact:c1-1', mode: 'open' }, (story) => {
        story.volts('c1-1.a', keyOn)
        story.volts('c1-1.b', keyOn)
      }),
    ).toBe(
      'Open at C1 cavity 1. 12.60 V goes in on side a, 0.00 V comes out on side b. Less likely: bad joint, 22 %.',
    )
  })

  it('a bad joint: how bad, and what is lost there', () => {
    const words = said({ site: 'part:g1', mode: 'resistive', ohms: 1.8 }, (story) => {
      story.volts('g1.in', keyOn)
      story.volts('lamp.b', keyOn)
      story.amps('w6', keyOn)
    })
    expect(words).toMatch(
      /^Bad joint at G1: about (1\.[5-9]|2\.[01]) ohm\. 2\.88 V is lost there under load\.$/,
    )
  })

  it('a blown fuse by itself: what stands across it', () => {
    const words = said({ site: 'part:f1', mode: 'blown' }, (story) => {
      story.volts('f1.in', keyOn, 'f1.out')
      story.volts('f1.in', keyOn)
      story.ohms('f1.out', 'chassis', keyOn)
      story.ohms('c1-1.a', 'chassis', { ...keyOn, unplugged: ['c1'] })
      story.ohms('f1.in', 'f1.out')
    })
    expect(words).toMatch(/^F1 has blown\. 12\.60 V stands across it\./)
  })

  it('a short with the fuse that it has blown as its consequence, and ohms before volts as the reason', () => {
    const words = said({ site: 'wire:w3', mode: 'short-to-ground', ohms: 0.05 }, (story) => {
      story.volts('f1.in')
      story.volts('f1.out')
      story.ohms('c1-1.a', 'chassis', { unplugged: ['c1'] })
    })
    expect(words).toMatch(/^Short to ground in wire Key out to C1 cavity 1\. /)
    expect(words).toContain('It has blown F1: the short is the cause, the fuse the consequence. ')
    expect(words).toContain('0.1 ohm at C1 cavity 1, side a, a good circuit has OL.')
  })

  it('what stays on: the reading that shows it', () => {
    const words = said({ site: 'wire:w4', mode: 'short-to-supply', ohms: 0.05 }, (story) => {
      story.works('lamp')
      story.volts('c1-1.b', { unplugged: ['c1'] })
    })
    expect(words).toMatch(/^Short to supply in wire C1 cavity 1 to Lamp a\. /)
    expect(words).toMatch(
      /(Lamp works, though it should not|12\.\d\d V at C1 cavity 1, side b, a good circuit has 0\.00 V)\.$/,
    )
  })

  it('two wires that touch: one fault, both named, and no talk of telling them apart', () => {
    const pair = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        { id: 'one', kind: 'switch', contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('one') }] },
        { id: 'two', kind: 'switch', contacts: [{ id: 'x', a: 'in', b: 'out', closed: whenOn('two') }] },
        { id: 'c1', kind: 'cavity', connector: 'x1', number: 1 },
        { id: 'c2', kind: 'cavity', connector: 'x1', number: 2 },
        { id: 'left', kind: 'load', ohms: 6, label: 'Left' },
        { id: 'right', kind: 'load', ohms: 6, label: 'Right' },
        { id: 'g', kind: 'ground', label: 'G' },
      ],
      [
        'bat.pos > one.in',
        'one.out > c1.a',
        'c1.b > left.a',
        'left.b > g.in',
        'bat.pos > two.in',
        'two.out > c2.a',
        'c2.b > right.a',
        'right.b > g.in',
      ],
      { controls: [onOff('one'), onOff('two')], connectors: [{ id: 'x1', label: 'X1', cavities: 2 }] },
    )
    const words = said(
      { site: 'wire:w3', mode: 'short-to-wire', other: 'w7', ohms: 0.1 },
      (story) => {
        story.works('left', { controls: { two: 'on' } })
        story.ohms('c1.b', 'c2.b', { unplugged: ['x1'] })
        story.works('left', { controls: { two: 'on' }, unplugged: ['x1'] })
      },
      pair,
    )
    expect(words).toMatch(
      /^Wire X1 cavity [12] to (Left|Right) a touches wire X1 cavity [12] to (Left|Right) a\. /,
    )
    expect(words).toContain('0.1 ohm at X1 cavity 1, side b to X1 cavity 2, side b, a good circuit has ')
    expect(words).not.toContain('told apart')
  })

  it('a branch and its crimp: why no reading helps, and what does', () => {
    const spliced = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        { id: 's', kind: 'splice', label: 'S4' },
        { id: 'left', kind: 'load', ohms: 6, label: 'Left' },
        { id: 'right', kind: 'load', ohms: 6, label: 'Right' },
        { id: 'g', kind: 'ground', label: 'G' },
      ],
      ['bat.pos > s.s', 's.s > left.a', 's.s > right.a', 'left.b > g.in', 'right.b > g.in'],
    )
    const words = said(
      { site: 'wire:w2', mode: 'open' },
      (story) => {
        story.volts('s.s')
        story.volts('left.a')
      },
      spliced,
    )
    expect(words).toMatch(
      /^Open in wire S4 to Left a\. 12\.5\d V goes in at S4, 0\.00 V comes out at Left a\. /,
    )
    expect(words).toMatch(
      /Wire S4 to Left a and S4 look the same from outside and cannot be told apart by any reading\. Open S4 and look at its crimp first\.$/,
    )
  })

  it('a pin and its module: what is proved first, then the module', () => {
    const words = said(
      { site: 'pin:m.3', mode: 'dead' },
      (story) => {
        story.volts('m.3', keyOn)
        story.volts('m.1', keyOn)
        story.volts('m.2', keyOn)
        story.works('other', keyOn)
      },
      twoOutputs,
    )
    expect(words).toMatch(
      /^(M2 pin 3 is dead|Open at M2 pin 3)\. 12\.\d\d V at M2 pin 3, a good circuit has 0\.\d\d V\. /,
    )
    expect(words).toMatch(/Before replacing M2: .*are proved good/)
  })
})

const twoOutputs = madeCircuit(
  [
    { id: 'bat', kind: 'battery' },
    {
      id: 'm',
      kind: 'module',
      label: 'M2',
      pins: [
        { pin: '1', circuit: { type: 'supply', ohms: 200 } },
        { pin: '2', circuit: { type: 'ground' } },
        { pin: '3', circuit: { type: 'low-side', on: whenOn('key') } },
        { pin: '4', circuit: { type: 'low-side', on: whenOn('key') } },
      ],
    },
    { id: 'lamp', kind: 'load', ohms: 12, label: 'Lamp' },
    { id: 'other', kind: 'load', ohms: 12, label: 'Other lamp' },
    { id: 'g', kind: 'ground', label: 'G5' },
  ],
  ['bat.pos > m.1', 'm.2 > g.in', 'bat.pos > lamp.a', 'lamp.b > m.3', 'bat.pos > other.a', 'other.b > m.4'],
  { controls: [onOff('key')] },
)
