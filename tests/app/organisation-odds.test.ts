import { randomUUID } from 'node:crypto'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { evaluate } from '@/diagrams/evaluate'
import { openEvaluationRequest } from '@/diagrams/faults/request'
import { type Trace, traceSchema } from '@/lib/shared/api/traces'
import { withDatabase } from '../support/database'
import { call } from './support/call'
import { exampleCircuit, exampleRequest, type Loose } from './support/example'
import { makeShop, type Person, type Shop } from './support/shop'

describe('what a shop found', () => {
  const database = withDatabase<Tables>()
  let shop: Shop
  let school: Shop
  let circuitId = ''
  const reading: Loose = exampleRequest().readings[0]

  beforeAll(async () => {
    shop = await makeShop(database, 'Alder Lane')
    school = await makeShop(database, 'Marl Street')
    circuitId = await newCircuit(shop.people.owner)
  })

  const newCircuit = async (who: Person, title = 'Step lamp'): Promise<string> =>
    (await call(who, 'POST', 'circuits', { document: exampleCircuit((c) => void (c.title = title)) })).body.id

  async function start(who: Person, circuit: string): Promise<Trace> {
    const started = await call(who, 'POST', 'traces', { id: randomUUID(), circuitId: circuit })
    return traceSchema.parse(started.body)
  }

  /** A trace from start to proof. */
  async function finish(
    finding: Loose,
    { works = true, circuit = circuitId, who = shop.people.technician } = {},
  ) {
    const { id } = await start(who, circuit)
    await call(who, 'PUT', `traces/${id}/finding`, { note: '', repaired: true, ...finding })
    const proved = await call(who, 'PUT', `traces/${id}/proof`, { reading, works })
    expect(proved.status).toBe(200)
    return id
  }

  it('is nothing at first', async () => {
    expect((await start(shop.people.technician, circuitId)).odds).toBeNull()
  })

  it('comes with its next trace: the contact that failed three times is suspected first', async () => {
    const before = await start(shop.people.technician, circuitId)
    const unread = (trace: Trace) =>
      evaluate({
        circuit: trace.circuit.document,
        readings: [],
        codes: [],
        priors: 'trade',
        ...(trace.odds ? { odds: trace.odds } : {}),
      })
    expect(unread(before).sites[0]!.site).not.toBe('contact:c7-2')
    for (let i = 0; i < 3; i++) await finish({ site: 'contact:c7-2', mode: 'open' })
    const after = await start(shop.people.technician, circuitId)
    expect(after.odds!.sites).toHaveProperty('contact:c7-2')
    expect(unread(after).sites[0]!.site).toBe('contact:c7-2')
  })

  it('counts for the class alone in another circuit, and not at all in another organisation', async () => {
    const other = await start(shop.people.technician, await newCircuit(shop.people.owner, 'Another lamp'))
    expect(other.odds!.sites).toEqual({})
    expect(other.odds!.classes.contact!.open).toBeGreaterThan(3)
    const theirs = await start(school.people.technician, await newCircuit(school.people.owner))
    expect(theirs.odds).toBeNull()
  })

  it('counts parts by their kind, and only what was found, repaired and proved', async () => {
    const start0 = (await start(shop.people.owner, circuitId)).odds!
    await finish({ site: null, mode: null, repaired: false })
    await finish({ site: 'part:f3', mode: 'blown' }, { works: false })
    expect((await start(shop.people.owner, circuitId)).odds).toEqual(start0)
    await finish({ site: 'part:f3', mode: 'blown' })
    const { odds } = await start(shop.people.owner, circuitId)
    expect(odds!.classes.fuse!.blown!).toBeGreaterThan(start0.classes.fuse!.blown!)
    expect(odds!.sites).toHaveProperty('part:f3')
  })

  it('leaves its own finding out of a trace that is opened again', async () => {
    const id = await finish({ site: 'wire:w5', mode: 'open' })
    const again = traceSchema.parse((await call(shop.people.owner, 'GET', `traces/${id}`)).body)
    expect(again.odds!.sites).not.toHaveProperty('wire:w5')
  })

  it('is the table of the organisation for a request that brings none', async () => {
    const request = { ...exampleRequest(), readings: [], codes: [] }
    const opened = openEvaluationRequest(request)
    if (!opened.ok) throw new Error('the example does not open')
    const plain = evaluate(opened.value)
    // One fuse was found among five places: far more than the trade's table foretells.
    const fuse = (answer: Loose) => answer.sites.find((site: Loose) => site.site === 'part:f3').probability
    const ours = (await call(shop.people.owner, 'POST', 'evaluations', request)).body
    const theirs = (await call(school.people.owner, 'POST', 'evaluations', request)).body
    expect(fuse(theirs)).toBeCloseTo(fuse(plain), 9)
    expect(fuse(ours)).toBeGreaterThan(1.05 * fuse(plain))
    const even = await call(shop.people.owner, 'POST', 'evaluations', { ...request, priors: 'even' })
    const evenTheirs = await call(school.people.owner, 'POST', 'evaluations', { ...request, priors: 'even' })
    expect(even.body).toEqual(evenTheirs.body)
  })
})
