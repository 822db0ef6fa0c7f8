import { describe, expect, it } from 'vitest'
import { conditionKey, controlCombinations, holds, positionsIn } from '@/diagrams/document/condition'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { portsOf } from '@/diagrams/document/ports'
import { exampleCircuit } from '@/tests/app/support/example'
import { inCondition, madeCircuit } from '@/tests/support/made-circuit'

const circuit = madeCircuit([{ id: 's', kind: 'splice' }], [], {
  controls: [
    { id: 'key', positions: ['off', 'on'], rest: 'off' },
    { id: 'fan', positions: ['1', '2', '3'], rest: '2' },
  ],
})

describe('controls', () => {
  it('not named are at rest', () => {
    expect(positionsIn(circuit, { key: 'on' })).toEqual({ key: 'on', fan: '2' })
  })
  it('combine in every way, the vehicle as one finds it first', () => {
    const all = controlCombinations(circuit, 100)
    expect(all).toHaveLength(6)
    expect(new Set(all.map((setting) => JSON.stringify(setting))).size).toBe(6)
    expect(all[0]).toEqual({ key: 'off', fan: '2' })
    expect(controlCombinations(circuit, 4)).toHaveLength(4)
  })
  it('decide what is closed, live and on', () => {
    expect(holds('always', {})).toBe(true)
    expect(holds('never', { key: 'on' })).toBe(false)
    expect(holds({ control: 'key', positions: ['on'] }, { key: 'on' })).toBe(true)
    expect(holds({ control: 'key', positions: ['on'] }, { key: 'off' })).toBe(false)
    expect(holds({ control: 'key', positions: ['on'] }, {})).toBe(false)
  })
})

it('two conditions have one key when they are the same said differently', () => {
  const key = (change: object) => conditionKey(circuit, inCondition(change))
  expect(key({ controls: { key: 'off' } })).toBe(key({}))
  expect(key({ unplugged: ['b', 'a', 'a'] })).toBe(key({ unplugged: ['a', 'b'] }))
  expect(key({ controls: { key: 'on' } })).not.toBe(key({}))
  expect(key({ battery: false })).not.toBe(key({}))
  expect(key({ charging: true })).not.toBe(key({}))
})

describe('a name that every object has', () => {
  const document = (key: string, pin: string) => {
    const text = JSON.stringify(exampleCircuit())
      .replaceAll('"key"', JSON.stringify(key))
      .replaceAll('"body.12"', JSON.stringify(`body.${pin}`))
      .replaceAll('"pin":"12"', `"pin":${JSON.stringify(pin)}`)
    return openCircuit(JSON.parse(text))
  }

  it.each(['constructor', 'toString', 'valueOf', 'hasOwnProperty'])('may be a control’s: %s', (key) => {
    const opened = document(key, 'constructor')
    if (!opened.ok) throw new Error(`${opened.problems[0]?.path}: ${opened.problems[0]?.message}`)
    expect(positionsIn(opened.value, {})).toEqual({ [key]: 'off' })
    const body = opened.value.nodes.find((node) => node.id === 'body')!
    expect(portsOf({ ...body, cavities: {} }).find((port) => port.name === 'constructor')?.cavity).toBeNull()
  })
})
