import { randomUUID } from 'node:crypto'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { createCircuit } from '@/lib/server/use-cases/circuits/create-circuit'
import { deleteCircuit } from '@/lib/server/use-cases/circuits/delete-circuit'
import { searchCircuits } from '@/lib/server/use-cases/circuits/search-circuits'
import { getCavity } from '@/lib/server/use-cases/connectors/get-cavity'
import type { CircuitPage } from '@/lib/shared/api/circuits'
import { exampleCircuit, type Loose } from '../app/support/example'
import { makeShop, type Shop } from '../app/support/shop'
import { withDatabase } from '../support/database'

describe('the search of the Circuits page', () => {
  const database = withDatabase<Tables>()
  let shop: Shop

  beforeAll(async () => {
    shop = await makeShop(database, 'Alder Lane')
    await add(() => {})
    await add((c) => {
      c.title = 'Rear work lamps'
      c.system = 'Lamps'
      c.codes = [{ code: 'P1F61' }, { code: 'B1234', failureType: '13', text: 'Request line, open circuit' }]
      c.wires[3] = { ...c.wires[3], colour: 'BU/WH', signal: 'coil feed' }
      c.wires[4] = { ...c.wires[4], colour: 'BU/WH', signal: 'coil feed' }
      c.wires[1].colour = 'BU'
    })
    await add((c) => {
      c.vehicle = 'Another van'
      c.title = 'Gone by now'
      c.system = 'Lamps'
    }).then((id) => deleteCircuit(shop.people.owner.context, { id }))
  })

  async function add(change: (circuit: Loose) => void): Promise<string> {
    const made = await createCircuit(shop.people.technician.context, { document: exampleCircuit(change) })
    if (!made.ok) throw new Error(made.failure.message)
    return made.value.id
  }

  async function find(finders: Record<string, string>): Promise<CircuitPage> {
    const found = await searchCircuits(shop.people.student.context, finders)
    if (!found.ok) throw new Error(found.failure.message)
    return found.value
  }
  const titles = (page: CircuitPage) => page.rows.map((row) => row.title)
  const cavities = (page: CircuitPage) =>
    page.rows.map((row) =>
      row.cavity ? `${row.cavity.connector}-${row.cavity.number}` : `wire ${row.wire?.id}`,
    )

  it('without finders lists every circuit by title, with counts by system; deleted ones are gone', async () => {
    const page = await find({})
    expect(titles(page)).toEqual(['Rear work lamps', 'Step lamp request line'])
    expect(page.systems).toEqual([
      { system: 'Body', circuits: 1 },
      { system: 'Lamps', circuits: 1 },
    ])
    expect(page.circuits).toBe(2)
    expect(page.found).toEqual({ rows: 2, circuits: 2 })
    expect(page.rows[0]).toMatchObject({ kind: 'circuit', code: 'P1F61', cavity: null, wire: null })
  })

  it('finds by the beginnings of words in title, vehicle, part or signal, all of them', async () => {
    expect(titles(await find({ name: 'lamp' }))).toEqual(['Rear work lamps', 'Step lamp request line'])
    expect(titles(await find({ name: 'LAMP rear' }))).toEqual(['Rear work lamps'])
    expect(titles(await find({ name: 'coil' }))).toEqual(['Rear work lamps'])
    expect(titles(await find({ name: 'glove' }))).toEqual([])
    expect(titles(await find({ name: 'f3' }))).toHaveLength(2)
    expect(titles(await find({ name: '%' }))).toHaveLength(2)
  })

  it('finds by code, with or without failure type, and shows the code that was asked for', async () => {
    const exact = await find({ code: 'b1234-13' })
    expect(exact.rows.map(({ title, code, carries }) => ({ title, code, carries }))).toEqual([
      { title: 'Rear work lamps', code: 'B1234-13', carries: 'Request line, open circuit' },
    ])
    expect((await find({ code: 'B1234' })).rows.map(({ code }) => code)).toEqual(['B1234-13', 'B1234-14'])
    expect(titles(await find({ code: 'B123_' }))).toEqual([])
  })

  it('finds cavities by connector and number, each line of a cavity once', async () => {
    const page = await find({ connector: 'c7', cavity: '2' })
    expect(page.rows.map(({ title, wire, carries }) => ({ title, colour: wire?.colour, carries }))).toEqual(
      expect.arrayContaining([
        {
          title: 'Step lamp request line',
          colour: 'GN/YE',
          carries: 'Door module pin 4 to Body module pin 12',
        },
        {
          title: 'Rear work lamps',
          colour: 'BU/WH',
          carries: 'Door module pin 4 to Body module pin 12, coil feed',
        },
      ]),
    )
    expect(page.rows).toHaveLength(2)
    expect(page.found).toEqual({ rows: 2, circuits: 2 })
    expect(cavities(await find({ connector: 'door' }))).toEqual([
      'Door module-1',
      'Door module-1',
      'Door module-4',
      'Door module-4',
      'Door module-8',
      'Door module-8',
    ])
  })

  it('finds wires by base, by base and stripe, and by base without stripe', async () => {
    expect(cavities(await find({ colour: 'bu/wh' }))).toEqual(['Body module-12', 'C7-2', 'Door module-4'])
    expect(cavities(await find({ colour: 'BU' }))).toEqual([
      'Body module-12',
      'C7-2',
      'Door module-1',
      'Door module-4',
    ])
    expect(cavities(await find({ colour: 'BU/' }))).toEqual(['Door module-1'])
    // A wire that meets no connector is a line of its own.
    expect(cavities(await find({ colour: 'RD/' }))).toEqual(['wire w1', 'wire w1'])
  })

  it('joins all finders', async () => {
    expect(
      titles(await find({ cavity: '2', colour: 'BU/WH', system: 'Lamps', name: 'work', code: 'B' })),
    ).toEqual(['Rear work lamps'])
    expect(titles(await find({ cavity: '2', colour: 'BU/WH', system: 'Body' }))).toEqual([])
  })

  it('pages through circuits and through cavities without a gap or a double', async () => {
    const many = await makeShop(database, 'Many circuits')
    for (let i = 0; i < 60; i++) {
      const document = exampleCircuit((c) => {
        // Equal titles on purpose: the id then decides.
        c.title = `Lamp ${i % 7}`
      })
      const made = await createCircuit(many.people.owner.context, { document })
      if (!made.ok) throw new Error(made.failure.message)
    }
    for (const finders of [{}, { colour: 'GN/YE' }]) {
      const keys: string[] = []
      let cursor: string | null = null
      do {
        const page = await searchCircuits(many.people.owner.context, {
          ...finders,
          ...(cursor ? { cursor } : {}),
        })
        if (!page.ok) throw new Error(page.failure.message)
        keys.push(...page.value.rows.map((row) => row.key))
        cursor = page.value.nextCursor
        expect(page.value.rows.length).toBeLessThanOrEqual(50)
      } while (cursor)
      expect(keys).toHaveLength(finders.colour ? 180 : 60)
      expect(new Set(keys).size).toBe(keys.length)
    }
  }, 60_000)

  it('says everything that one cavity carries, in one query over all circuits of the vehicle', async () => {
    const page = await find({ connector: 'c7', cavity: '2' })
    const { vehicleId = '', connectorId = '' } = page.rows[0]?.cavity ?? {}
    const cavity = await getCavity(shop.people.student.context, { vehicleId, connectorId, n: '2' })
    expect(cavity.ok && cavity.value.connector.label).toBe('C7')
    expect(cavity.ok && cavity.value.vehicle).toBe('Example van')
    expect(
      cavity.ok &&
        cavity.value.carries.map(({ title, end, wire }) => [title, end, wire?.colour, wire?.farEnd]),
    ).toEqual([
      ['Rear work lamps', 'c7-2.a', 'BU/WH', 'Door module 4'],
      ['Rear work lamps', 'c7-2.b', 'BU/WH', 'Body module 12'],
      ['Step lamp request line', 'c7-2.a', 'GN/YE', 'Door module 4'],
      ['Step lamp request line', 'c7-2.b', 'GN/YE', 'Body module 12'],
    ])
    const bare = await getCavity(shop.people.student.context, { vehicleId, connectorId, n: '3' })
    expect(bare.ok && bare.value.carries).toEqual([])
    for (const wrong of [
      { vehicleId, connectorId, n: '7' },
      { vehicleId, connectorId: 'c8', n: '1' },
      { vehicleId: randomUUID(), connectorId, n: '1' },
    ]) {
      const answer = await getCavity(shop.people.student.context, wrong)
      expect(answer.ok || answer.failure.code).toBe('not-found')
    }
  })
})
