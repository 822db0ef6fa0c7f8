import { randomUUID } from 'node:crypto'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { errorBodySchema } from '@/lib/shared/api/error-body'
import { withDatabase } from '../support/database'
import { type Answer, call } from './support/call'
import { exampleCircuit, exampleRequest, type Loose } from './support/example'
import { makeShop, type Person, type Shop } from './support/shop'

describe('bad input', () => {
  const database = withDatabase<Tables>()
  let shop: Shop
  let who: Person
  let circuit: Loose
  let traceId = ''
  const reading = exampleRequest().readings[0]

  beforeAll(async () => {
    shop = await makeShop(database, 'Alder Lane')
    who = shop.people.owner
    circuit = (await call(who, 'POST', 'circuits', { document: exampleCircuit() })).body
    traceId = randomUUID()
    await call(who, 'POST', 'traces', { id: traceId, circuitId: circuit.id })
  })

  const refuses = (answer: Answer, status: number, field: string, says: RegExp | string = field) => {
    const { error } = errorBodySchema.parse(answer.body)
    expect([answer.status, error.path]).toEqual([status, field])
    expect(error.message).toMatch(says)
  }
  const document = (change: (c: Loose) => void) =>
    call(who, 'POST', 'circuits', { document: exampleCircuit(change) })

  it('in a document is answered with its path and a sentence naming the field', async () => {
    refuses(await document((c) => void delete c.title), 422, 'document.title')
    refuses(await document((c) => void (c.colour = 'red')), 422, 'document.colour', 'unknown field "colour"')
    refuses(
      await document((c) => void (c.wires[0].to = 'f9.in')),
      422,
      'document.wires.0.to',
      'node "f9" does not exist',
    )
    refuses(await document((c) => void (c.nodes[1].amps = 0)), 422, 'document.nodes.1.amps')
    refuses(await document((c) => void (c.nodes[3].number = 7)), 422, 'document.nodes.3.number', 'cavity 7')
    refuses(await document((c) => void (c.nodes[0].kind = 'lever')), 422, 'document.nodes.0.kind')
    refuses(await call(who, 'POST', 'circuits', {}), 422, 'document')
    refuses(await call(who, 'POST', 'circuits', { document: null }), 422, 'document')
    expect((await call(who, 'POST', 'circuits', [])).status).toBe(422)
  })

  it('lists every problem of a document, not the first alone', async () => {
    const answer = await document((c) => {
      c.wires[0].to = 'f9.in'
      c.wires[1].from = 'f3.middle'
    })
    expect(answer.body.error.details).toHaveLength(2)
  })

  it('beside the document is named too', async () => {
    const more = (fields: object) => call(who, 'POST', 'circuits', { document: exampleCircuit(), ...fields })
    refuses(await more({ connectors: 'merge' }), 422, 'connectors', 'expected refuse, keep or replace')
    refuses(await more({ id: '7' }), 422, 'id')
    refuses(await more({ owner: 'me' }), 422, 'owner', 'unknown field "owner"')
    const save = (fields: object) =>
      call(who, 'PUT', `circuits/${circuit.id}`, { baseRevision: 1, document: exampleCircuit(), ...fields })
    refuses(await save({ baseRevision: '1' }), 422, 'baseRevision')
    refuses(await save({ baseRevision: 1.5 }), 422, 'baseRevision')
    refuses(await save({ document: exampleCircuit((c) => void (c.version = 2)) }), 422, 'document.version')
  })

  it('in characters that are no text is refused before it reaches the database', async () => {
    refuses(await document((c) => void (c.title = 'a\0b')), 422, 'document.title')
    refuses(await document((c) => void (c.nodes[2].notes = '\ud800')), 422, 'document.nodes.2.notes')
    refuses(await call(who, 'GET', 'circuits?name=%00'), 422, 'name')
  })

  it('in finders is refused, and odd words simply find nothing', async () => {
    refuses(await call(who, 'GET', 'circuits?cavity=three'), 422, 'cavity')
    refuses(await call(who, 'GET', 'circuits?cavity=0'), 422, 'cavity')
    refuses(await call(who, 'GET', 'circuits?cursor=zzz'), 422, 'cursor')
    refuses(await call(who, 'GET', 'circuits?wire=RD'), 422, 'wire')
    refuses(await call(who, 'GET', `circuits?name=${'x'.repeat(121)}`), 422, 'name')
    refuses(await call(who, 'GET', 'traces?open=yes'), 422, 'open')
    for (const odd of ["' or 1=1 --", '\\', '_', '😀', '()'])
      expect((await call(who, 'GET', `circuits?connector=${encodeURIComponent(odd)}`)).body.rows).toEqual([])
  })

  it('in a trace and its readings is named', async () => {
    const start = (fields: object) =>
      call(who, 'POST', 'traces', { id: randomUUID(), circuitId: circuit.id, ...fields })
    refuses(await start({ id: 'mine' }), 422, 'id')
    refuses(await start({ circuitId: 7 }), 422, 'circuitId')
    refuses(await start({ codes: ['B12'] }), 422, 'codes.0', 'B12')
    refuses(await start({ complaint: 'x'.repeat(2001) }), 422, 'complaint', 'at most 2000')
    const put = (change: object) =>
      call(who, 'PUT', `traces/${traceId}/readings/r1`, { ...reading, ...change })
    refuses(await put({ value: 'high' }), 422, 'value')
    refuses(await put({ kind: 'watts' }), 422, 'kind')
    refuses(await put({ red: 'c7' }), 422, 'red')
    refuses(await put({ id: 'r2' }), 422, 'id', '"r2" in the body, "r1" in the address')
    refuses(
      await put({ condition: { controls: { key: 'start' } } }),
      422,
      'condition.controls.key',
      'no position "start"',
    )
    refuses(await put({ extra: 1 }), 422, 'extra')
    expect((await call(who, 'GET', `traces/${traceId}`)).body.readings).toEqual([])
    const proof = await call(who, 'PUT', `traces/${traceId}/proof`, { reading, works: 'yes' })
    refuses(proof, 422, 'works')
  })

  it('that is not JSON, or not sent as JSON, is refused', async () => {
    const send = (raw: BodyInit, headers: Record<string, string> = {}) =>
      call(who, 'POST', 'circuits', undefined, { raw, headers })
    expect((await send('{"document":')).body.error.code).toBe('bad-request')
    expect((await send(new Uint8Array([0x22, 0xff, 0x22]))).status).toBe(400)
    expect((await send('')).status).toBe(400)
    expect((await send('{}', { 'content-type': 'text/plain' })).status).toBe(415)
  })

  it('over 2 MB is refused without reading it all', async () => {
    const said = await call(who, 'POST', 'circuits', undefined, {
      raw: '{}',
      headers: { 'content-length': String(3 * 1024 * 1024) },
    })
    expect([said.status, said.body.error.code]).toEqual([413, 'too-large'])

    let given = 0
    let cancelled = false
    const endless = new ReadableStream<Uint8Array>({
      pull(controller) {
        given += 64 * 1024
        controller.enqueue(new Uint8Array(64 * 1024).fill(0x20))
      },
      cancel() {
        cancelled = true
      },
    })
    const answer = await call(who, 'POST', 'evaluations', undefined, { raw: endless })
    expect([answer.status, answer.body.error.code]).toEqual([413, 'too-large'])
    expect(cancelled).toBe(true)
    expect(given).toBeLessThan(2.5 * 1024 * 1024)

    const padded = JSON.stringify({ document: exampleCircuit() }).padEnd(2 * 1024 * 1024 - 10)
    expect((await call(who, 'POST', 'circuits', undefined, { raw: padded })).status).toBe(201)
  })

  it('from a page of another site is not carried out', async () => {
    const from = (headers: Record<string, string>) =>
      call(who, 'DELETE', `circuits/${circuit.id}`, undefined, { headers })
    for (const [name, value] of [
      ['origin', 'https://elsewhere.example'],
      ['origin', 'null'],
      ['sec-fetch-site', 'cross-site'],
      ['sec-fetch-site', 'same-site'],
      ['origin', 'http://127.0.0.1:9999'],
    ] as const)
      expect((await from({ [name]: value })).body.error.code).toBe('wrong-origin')
    expect((await call(who, 'GET', `circuits/${circuit.id}`)).status).toBe(200)
    expect((await from({ origin: 'http://127.0.0.1:3210', 'sec-fetch-site': 'same-origin' })).status).toBe(
      204,
    )
  })

  it('nested without end is refused before anybody walks through it', async () => {
    const raw = `{"document":${'['.repeat(100_000)}${']'.repeat(100_000)}}`
    for (const [method, address] of [
      ['POST', 'circuits'],
      ['POST', 'evaluations'],
      ['POST', 'traces'],
      ['PUT', `circuits/${circuit.id}`],
      ['PUT', `traces/${traceId}/readings/r1`],
    ] as const) {
      const answer = await call(who, method, address, undefined, { raw })
      expect([address, answer.status, answer.body.error.message]).toEqual([
        address,
        400,
        'The body is nested more than 64 levels deep.',
      ])
    }
  })

  it('in a reading is named with its value, as in a document', async () => {
    const answer = await call(who, 'PUT', `traces/${traceId}/readings/r1`, { ...reading, value: 'much' })
    refuses(answer, 422, 'value', 'value: "much": expected a number or "OL"')
  })
})
