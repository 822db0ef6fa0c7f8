import { randomUUID } from 'node:crypto'
import { beforeAll, describe, expect, it } from 'vitest'
import { samples } from '@/diagrams/samples/all-samples'
import type { Tables } from '@/db/tables/database'
import { traceListSchema, traceSchema } from '@/lib/shared/api/traces'
import { withDatabase } from '../support/database'
import { call } from './support/call'
import { exampleCircuit, exampleRequest, type Loose } from './support/example'
import { makeShop, type Person, type Shop } from './support/shop'

describe('traces over the API', () => {
  const database = withDatabase<Tables>()
  let shop: Shop
  let circuitId = ''
  let dangerousId = ''
  // Of the format page's example request: wire w5 is open.
  const readings: Loose[] = exampleRequest().readings

  beforeAll(async () => {
    shop = await makeShop(database, 'Alder Lane')
    circuitId = (await call(shop.people.owner, 'POST', 'circuits', { document: exampleCircuit() })).body.id
    const dangerous = exampleCircuit((c) => {
      c.vehicle = 'Electric van'
      c.cautions = ['high-voltage']
    })
    dangerousId = (await call(shop.people.owner, 'POST', 'circuits', { document: dangerous })).body.id
  })

  async function start(who: Person = shop.people.technician, circuit = circuitId): Promise<string> {
    const id = randomUUID()
    const started = await call(who, 'POST', 'traces', {
      id,
      circuitId: circuit,
      vehicle: 'Van 12',
      complaint: 'Step lamp stays dark',
      codes: ['b1234-14'],
    })
    expect(started.status).toBe(201)
    return id
  }
  const put = (id: string, reading: Loose, who: Person = shop.people.technician) =>
    call(who, 'PUT', `traces/${id}/readings/${reading.id}`, reading)

  it('keeps a trace reading by reading, in order, through finding and proof, to done', async () => {
    const id = await start()
    for (const reading of readings) expect((await put(id, reading)).status).toBe(200)
    const whole = traceSchema.parse((await call(shop.people.owner, 'GET', `traces/${id}`)).body)
    expect(whole.readings.map((reading) => reading.id)).toEqual(['r1', 'r2', 'r3'])
    expect(whole.readings[0]).toMatchObject({ kind: 'volts', red: 'body.12', value: 0.01 })
    expect(whole).toMatchObject({ state: 'open', codes: ['B1234-14'], vehicle: 'Van 12', finding: null })
    expect(whole.circuit).toMatchObject({ id: circuitId, revision: 1 })

    const proof = { reading: { ...readings[0], id: 'proof', value: 12.4 }, works: true }
    const early = await call(shop.people.technician, 'PUT', `traces/${id}/proof`, proof)
    expect([early.status, early.body.error.code]).toEqual([409, 'finding-first'])
    const finding = { site: 'wire:w5', mode: 'open', note: 'broken at the sill', repaired: true }
    expect((await call(shop.people.technician, 'PUT', `traces/${id}/finding`, finding)).status).toBe(200)
    const still = await call(shop.people.technician, 'PUT', `traces/${id}/proof`, { ...proof, works: false })
    expect(still.body.state).toBe('open')
    const done = await call(shop.people.technician, 'PUT', `traces/${id}/proof`, proof)
    expect(done.body).toMatchObject({ state: 'done', proof: { works: true }, finding })

    // The same again is harmless; anything new is refused.
    expect((await call(shop.people.technician, 'PUT', `traces/${id}/proof`, proof)).status).toBe(200)
    expect((await put(id, readings[0])).status).toBe(200)
    expect((await put(id, { ...readings[0], value: 1 })).body.error.code).toBe('trace-done')
    const gone = await call(shop.people.technician, 'DELETE', `traces/${id}/readings/r1`)
    expect(gone.body.error.code).toBe('trace-done')
    expect((await call(shop.people.owner, 'GET', `traces/${id}`)).body.readings).toHaveLength(3)
  })

  it('takes every write twice as once', async () => {
    const id = randomUUID()
    const request = { id, circuitId, vehicle: '', complaint: 'dark', codes: [] }
    const [first, second] = await Promise.all([
      call(shop.people.student, 'POST', 'traces', request),
      call(shop.people.student, 'POST', 'traces', request),
    ])
    expect([first.status, second.status]).toEqual([201, 201])
    expect(second.body).toEqual(first.body)
    expect(first.body.vehicle).toBe('Example van')
    const student = shop.people.student
    const twice = await Promise.all([put(id, readings[0], student), put(id, readings[0], student)])
    expect(twice.map((answer) => [answer.status, answer.body.readings.length])).toEqual([
      [200, 1],
      [200, 1],
    ])
    await put(id, readings[1], student)
    const corrected = await put(id, { ...readings[0], value: 0.02 }, student)
    expect(corrected.body.readings.map((r: Loose) => [r.id, r.value])).toEqual([
      ['r1', 0.02],
      ['r2', 12.57],
    ])
    for (let i = 0; i < 2; i++) {
      const removed = await call(student, 'DELETE', `traces/${id}/readings/r1`)
      expect([removed.status, removed.body.readings.length]).toEqual([200, 1])
    }
    const other = await call(student, 'POST', 'traces', { ...request, circuitId: dangerousId })
    expect([other.status, other.body.error.code]).toEqual([409, 'id-taken'])
  })

  it('stays on the edition it was started on, and outlives its circuit', async () => {
    const made = (
      await call(shop.people.owner, 'POST', 'circuits', {
        document: exampleCircuit((c) => void (c.vehicle = 'Third van')),
      })
    ).body
    const id = await start(shop.people.technician, made.id)
    await call(shop.people.owner, 'PUT', `circuits/${made.id}`, {
      baseRevision: 1,
      document: { ...made.document, title: 'Renamed', wires: made.document.wires.slice(0, 3) },
    })
    expect((await put(id, readings[1])).status).toBe(200)
    await call(shop.people.owner, 'DELETE', `circuits/${made.id}`)
    const trace = (await call(shop.people.technician, 'GET', `traces/${id}`)).body
    expect(trace.circuit).toEqual({ id: made.id, revision: 1, document: made.document })
    expect(trace.readings).toHaveLength(1)
  })

  it('wants the cautions answered before the first reading', async () => {
    const id = await start(shop.people.technician, dangerousId)
    const refused = await put(id, readings[0])
    expect([refused.status, refused.body.error.code]).toEqual([409, 'cautions-first'])
    const answered = await call(shop.people.technician, 'PUT', `traces/${id}/cautions`, {})
    expect(answered.body.cautionsAnsweredAt).toEqual(expect.any(String))
    const again = await call(shop.people.technician, 'PUT', `traces/${id}/cautions`)
    expect(again.body).toEqual(answered.body)
    expect((await put(id, readings[0])).status).toBe(200)
  })

  it('refuses an ohms reading on a live circuit with its caution, and keeps nothing of it', async () => {
    const id = await start()
    const live = {
      id: 'r9',
      kind: 'ohms',
      red: 'c7-2.a',
      black: 'chassis',
      value: 3,
      condition: { controls: { key: 'on' } },
    }
    const refused = await put(id, live)
    expect([refused.status, refused.body.error.code]).toEqual([422, 'reading-refused'])
    expect(refused.body.error.message).toMatch(/live|battery/i)
    const missing = await put(id, { ...readings[0], red: 'nowhere.1' })
    expect(missing.body.error).toMatchObject({ code: 'reading-refused', path: 'red' })
    expect(missing.body.error.message).toContain('nowhere.1')
    expect((await call(shop.people.technician, 'GET', `traces/${id}`)).body.readings).toEqual([])
  })

  it('refuses a finding that the circuit cannot have, naming the field', async () => {
    const id = await start()
    const finding = (change: object) =>
      call(shop.people.technician, 'PUT', `traces/${id}/finding`, {
        site: 'wire:w5',
        mode: 'open',
        repaired: false,
        ...change,
      })
    expect((await finding({ site: 'wire:w99' })).body.error).toMatchObject({ code: 'invalid', path: 'site' })
    expect((await finding({ mode: 'blown' })).body.error).toMatchObject({ code: 'invalid', path: 'mode' })
    expect((await finding({ mode: null })).body.error).toMatchObject({ code: 'invalid', path: 'mode' })
    expect((await finding({ site: null, mode: null })).status).toBe(200)
  })

  it('shows a student their own traces only; the others see all', async () => {
    const mine = await start(shop.people.student)
    const others = await start(shop.people.technician)
    const student = shop.people.student
    expect((await call(student, 'GET', `traces/${mine}`)).body.mine).toBe(true)
    for (const answer of [
      await call(student, 'GET', `traces/${others}`),
      await put(others, readings[0], student),
      await call(student, 'DELETE', `traces/${others}/readings/r1`),
      await call(student, 'PUT', `traces/${others}/cautions`),
      await call(student, 'PUT', `traces/${others}/finding`, { site: null, mode: null, repaired: false }),
    ])
      expect([answer.status, answer.body.error.code]).toEqual([404, 'not-found'])
    for (const role of ['owner', 'instructor', 'technician'] as const) {
      expect((await call(shop.people[role], 'GET', `traces/${mine}`)).status).toBe(200)
      expect((await put(mine, readings[0], shop.people[role])).status).toBe(200)
    }
  })

  it('lists open traces, the latest first, with how far each got', async () => {
    const lab = await makeShop(database, 'Lab')
    const { technician, student } = lab.people
    const circuit = (await call(technician, 'POST', 'circuits', { document: exampleCircuit() })).body
    const begun = await start(student, circuit.id)
    const located = await start(technician, circuit.id)
    for (const reading of readings) await put(located, reading, technician)
    const rows = traceListSchema.parse((await call(technician, 'GET', 'traces?open=1')).body).rows
    expect(rows.map(({ id, readings: taken }) => [id, taken])).toEqual([
      [located, 3],
      [begun, 0],
    ])
    expect(rows[0]?.progress).toMatchObject({ outcome: 'located' })
    expect(rows[1]?.progress?.left).toBe(rows[1]?.progress?.places)
    expect(rows[0]?.progress?.left).toBeLessThan(rows[1]?.progress?.left ?? 0)
    const own = traceListSchema.parse((await call(student, 'GET', 'traces?open=1')).body).rows
    expect(own.map(({ id }) => id)).toEqual([begun])
    const none = await call(technician, 'GET', `traces?open=1&circuitId=${randomUUID()}`)
    expect(none.body.rows).toEqual([])
  })

  it('keeps what the driver tells and refuses what the circuit does not have', async () => {
    const fan = samples.find((sample) => sample.title === 'Two-speed cooling fan')!
    const load = fan.nodes.find((node) => node.kind === 'load')!.id
    const step = fan.sequence[1]!.id
    const who = shop.people.technician
    const made = await call(shop.people.owner, 'POST', 'circuits', { document: fan })
    const ask = { id: randomUUID(), circuitId: made.body.id, vehicle: '', complaint: 'silent', codes: [] }
    const symptoms = [{ node: load, does: 'not-work' }, { step }]
    for (const [path, wrong] of [
      ['symptoms.0.node', { node: 'f20', does: 'not-work' }],
      ['symptoms.0.node', { node: 'gone', does: 'always' }],
      ['symptoms.0.step', { step: 'never' }],
    ] as const) {
      const refused = await call(who, 'POST', 'traces', { ...ask, symptoms: [wrong] })
      expect([refused.status, refused.body.error.path]).toEqual([422, path])
    }
    const started = await call(who, 'POST', 'traces', { ...ask, symptoms })
    expect([started.status, started.body.symptoms]).toEqual([201, symptoms])
    const again = await call(who, 'POST', 'traces', { ...ask, symptoms })
    expect([again.status, again.body]).toEqual([201, started.body])
    const other = await call(who, 'POST', 'traces', { ...ask, symptoms: [{ step }] })
    expect(other.body.error.code).toBe('id-taken')
    const whole = traceSchema.parse((await call(shop.people.owner, 'GET', `traces/${ask.id}`)).body)
    expect(whole.symptoms).toEqual(symptoms)
  })

  it('has no symptoms where none are told', async () => {
    const whole = await call(shop.people.owner, 'GET', `traces/${await start()}`)
    expect(whole.body.symptoms).toEqual([])
  })

  it('evaluates the format page’s example to the open wire', async () => {
    const answer = await call(shop.people.student, 'POST', 'evaluations', exampleRequest())
    expect(answer.status).toBe(200)
    expect(answer.body.sites[0].site).toBe('wire:w5')
    expect(
      answer.body.sites.reduce((sum: number, s: Loose) => sum + s.probability, answer.body.noFault),
    ).toBeCloseTo(1, 6)
    const wrong = await call(shop.people.student, 'POST', 'evaluations', {
      ...exampleRequest(),
      circuit: exampleCircuit((c) => void (c.nodes[3].kind = 'lever')),
    })
    expect(wrong.status).toBe(422)
    expect(wrong.body.error.path).toBe('circuit.nodes.3.kind')
  })
})
