import { randomUUID } from 'node:crypto'
import { readdirSync } from 'node:fs'
import path from 'node:path'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { withDatabase } from '../support/database'
import { addresses, call } from './support/call'
import { exampleCircuit, exampleRequest, type Loose } from './support/example'
import { makeShop, type Shop } from './support/shop'

describe('another organisation', () => {
  const database = withDatabase<Tables>()
  let shop: Shop
  let school: Shop
  let circuit: Loose
  let traceId = ''
  const reading = exampleRequest().readings[0]

  beforeAll(async () => {
    shop = await makeShop(database, 'Alder Lane')
    school = await makeShop(database, 'Marl Street')
    const { owner } = shop.people
    circuit = (await call(owner, 'POST', 'circuits', { document: exampleCircuit() })).body
    traceId = randomUUID()
    await call(owner, 'POST', 'traces', { id: traceId, circuitId: circuit.id })
    await call(owner, 'PUT', `traces/${traceId}/readings/r1`, reading)
  })

  /** Every request that names a thing by its id, in the words of the address. */
  const requests: [method: 'GET' | 'POST' | 'PUT' | 'DELETE', address: string, body?: () => Loose][] = [
    ['GET', 'circuits/[circuitId]'],
    ['PUT', 'circuits/[circuitId]', () => ({ baseRevision: 1, document: circuit.document })],
    ['DELETE', 'circuits/[circuitId]'],
    ['GET', 'circuits/[circuitId]/document'],
    ['GET', 'circuits/[circuitId]/fault-table'],
    ['GET', 'connectors/[vehicleId]/[connectorId]/cavities/[n]'],
    ['GET', 'traces/[traceId]'],
    ['PUT', 'traces/[traceId]/cautions'],
    ['PUT', 'traces/[traceId]/finding', () => ({ site: 'wire:w5', mode: 'open', repaired: true })],
    ['PUT', 'traces/[traceId]/proof', () => ({ reading, works: true })],
    ['PUT', 'traces/[traceId]/readings/[readingId]', () => reading],
    ['DELETE', 'traces/[traceId]/readings/[readingId]'],
  ]
  const fill = (address: string, ids: Record<string, string>) =>
    address.replace(/\[(\w+)\]/g, (_, name: string) => ids[name] ?? '')
  const theirs = () => ({
    circuitId: circuit.id as string,
    vehicleId: circuit.vehicleId as string,
    connectorId: 'c7',
    n: '2',
    traceId,
    readingId: 'r1',
  })

  it('is asked about on every route that names an id', () => {
    const withIds = Object.keys(addresses).filter((address) => address.includes('['))
    expect([...new Set(requests.map(([, address]) => address))].sort()).toEqual(withIds.sort())
    const files = readdirSync(path.join(import.meta.dirname, '../../app/api/v1'), { recursive: true })
      .map(String)
      .filter((file) => file.endsWith('route.ts'))
    expect(files.map((file) => path.dirname(file)).sort()).toEqual(Object.keys(addresses).sort())
  })

  it('reaches what is its own on each of them', async () => {
    for (const [method, address] of requests.filter(([method]) => method === 'GET'))
      expect([
        method,
        address,
        (await call(shop.people.owner, method, fill(address, theirs()))).status,
      ]).toEqual([method, address, 200])
  })

  it('gets 404 for every id that is not its own, as for one that does not exist or cannot be one', async () => {
    for (const [method, address, body] of requests) {
      const say = async (ids: Record<string, string>) => {
        const answer = await call(school.people.owner, method, fill(address, ids), body?.())
        return { status: answer.status, error: answer.body?.error }
      }
      const foreign = await say(theirs())
      expect([method, address, foreign.status, foreign.error.code]).toEqual([
        method,
        address,
        404,
        'not-found',
      ])
      const nowhere = { ...theirs(), circuitId: randomUUID(), vehicleId: randomUUID(), traceId: randomUUID() }
      expect(await say(nowhere)).toEqual(foreign)
      for (const odd of ['1', 'x'.repeat(300), "'; drop table circuits; --", '%00'])
        expect(await say({ ...theirs(), circuitId: odd, vehicleId: odd, traceId: odd })).toEqual(foreign)
    }
    const untouched = (await call(shop.people.owner, 'GET', `circuits/${circuit.id}`)).body
    expect(untouched).toEqual(circuit)
    expect((await call(shop.people.owner, 'GET', `traces/${traceId}`)).body.readings).toHaveLength(1)
  })

  it('finds nothing of it in search and lists', async () => {
    const found = await call(school.people.owner, 'GET', 'circuits?name=lamp')
    expect(found.body).toMatchObject({ rows: [], circuits: 0, systems: [] })
    expect((await call(school.people.owner, 'GET', 'circuits?cavity=2')).body.rows).toEqual([])
  })

  it('cannot start a trace on its circuit, and may use the same ids for its own', async () => {
    const foreign = await call(school.people.owner, 'POST', 'traces', {
      id: randomUUID(),
      circuitId: circuit.id,
    })
    expect([foreign.status, foreign.body.error.path]).toEqual([404, 'circuitId'])
    const same = { id: circuit.id, document: exampleCircuit() }
    expect((await call(school.people.owner, 'POST', 'circuits', same)).status).toBe(201)
    const trace = await call(school.people.owner, 'POST', 'traces', { id: traceId, circuitId: circuit.id })
    expect([trace.status, trace.body.readings]).toEqual([201, []])
  })

  it('has vehicles of its own by the same title, whose connectors may differ', async () => {
    const document = exampleCircuit((c) => {
      c.vehicle = 'Shared title'
    })
    await call(shop.people.owner, 'POST', 'circuits', { document })
    document.connectors[0].cavities = 12
    expect((await call(school.people.owner, 'POST', 'circuits', { document })).status).toBe(201)
  })
})
