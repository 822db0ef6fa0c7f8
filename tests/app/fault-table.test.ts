import { monitorEventLoopDelay } from 'node:perf_hooks'
import { beforeAll, describe, expect, it } from 'vitest'
import { GET } from '@/app/api/v1/circuits/[circuitId]/fault-table/route'
import type { Tables } from '@/db/tables/database'
import { faultTable, type TablePart } from '@/diagrams/fault-table/fault-table'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { tablesRunning } from '@/lib/server/fault-table/fault-table-stream'
import { roles } from '@/lib/shared/permissions'
import { withDatabase } from '../support/database'
import { randomCircuit } from '../support/random-circuit'
import { call } from './support/call'
import { exampleCircuit, type Loose } from './support/example'
import { makeShop, type Person, type Shop } from './support/shop'

describe('the fault table behind its address', () => {
  const database = withDatabase<Tables>()
  let shop: Shop
  let id = ''
  let large = ''

  const store = async (document: Loose) => {
    const made = await call(shop.people.owner, 'POST', 'circuits', { document })
    expect(made.status).toBe(201)
    return made.body.id as string
  }
  const open = (who: Person, circuitId: string, query = '') =>
    GET(
      new Request(`http://127.0.0.1:3210/api/v1/circuits/${circuitId}/fault-table${query}`, {
        headers: { host: '127.0.0.1:3210', cookie: who.cookie },
      }),
      { params: Promise.resolve({ circuitId }) },
    )
  const until = async (holds: () => boolean) => {
    for (let i = 0; i < 100 && !holds(); i++) await new Promise((resolve) => setTimeout(resolve, 50))
    expect(holds()).toBe(true)
  }

  beforeAll(async () => {
    shop = await makeShop(database, 'Alder Lane')
    id = await store(exampleCircuit())
    large = await store(randomCircuit(3, 40))
  })

  it('gives a program one value a line: the head, a row for each fault in each condition, what looks alike', async () => {
    const response = await open(shop.people.technician, id, '?format=ndjson')
    expect([response.status, response.headers.get('content-type')]).toEqual([200, 'application/x-ndjson'])
    const lines = (await response.text()).trim().split('\n')
    const parts = lines.map((line) => JSON.parse(line) as TablePart)
    const opened = openCircuit(exampleCircuit())
    if (!opened.ok) throw new Error('the example does not open')
    const here = [...faultTable(opened.value)]
    expect(parts.length).toBe(here.length)
    expect(parts[0]).toEqual(JSON.parse(JSON.stringify(here[0])))
    expect(parts.at(-1)).toEqual(here.at(-1))
    // The same figures as worked out here, to the microvolt that is sent.
    for (const [i, part] of parts.entries()) {
      const own = here[i]!
      if (part.part !== 'row' || own.part !== 'row') continue
      expect([part.condition, part.fault]).toEqual([own.condition, own.fault])
      part.cells.forEach((cell, c) => {
        const figure = own.cells[c]
        if (typeof cell === 'number') expect(Math.abs(cell - (figure as number))).toBeLessThan(1e-6)
        else expect(cell).toEqual(figure)
      })
    }
    expect(tablesRunning()).toBe(0)
  })

  it('gives a person a sheet to save, named after the circuit, no formula in it', async () => {
    const tricky = await store(
      exampleCircuit((circuit) => {
        circuit.nodes[1].label = '=2+2, "F3"'
      }),
    )
    const response = await open(shop.people.student, tricky)
    expect(response.headers.get('content-type')).toBe('text/csv; charset=utf-8')
    expect(response.headers.get('content-disposition')).toBe(
      'attachment; filename="step-lamp-request-line.faults.csv"',
    )
    const lines = (await response.text()).split('\r\n')
    expect(lines[0]).toMatch(/^condition,place,fault,blows,unit,/)
    expect(lines[0]).toContain(`"'=2+2, ""F3"" in"`)
    expect(lines.some((line) => /(^|,)"?=/.test(line))).toBe(false)
    expect(lines.filter((line) => line.startsWith('Key on,')).length).toBe(
      lines.filter((line) => line.startsWith('battery disconnected,')).length,
    )
    expect(lines.some((line) => line.startsWith('looks alike 1,'))).toBe(true)
  })

  it('may be had by every role of the organisation, and by nobody signed out', async () => {
    for (const role of roles) {
      const response = await open(shop.people[role], id, '?format=ndjson')
      expect(response.status, role).toBe(200)
      await response.text()
    }
    expect((await open({ cookie: '' } as Person, id)).status).toBe(401)
  })

  it('is not there for another organisation, for no such circuit, and in no other format', async () => {
    const school = await makeShop(database, 'Marl Street')
    expect((await open(school.people.owner, id)).status).toBe(404)
    expect((await open(shop.people.owner, 'nothing')).status).toBe(404)
    const odd = await open(shop.people.owner, id, '?format=xls')
    expect([odd.status, (await odd.json()).error.message]).toEqual([
      422,
      'format "xls": expected csv or ndjson',
    ])
    expect(tablesRunning()).toBe(0)
  })

  it('ends its work when the client goes away, and holds up nobody meanwhile', async () => {
    const response = await open(shop.people.owner, large, '?format=ndjson')
    const reader = response.body!.getReader()
    const delay = monitorEventLoopDelay({ resolution: 10 })
    delay.enable()
    let seen = ''
    while (!seen.includes('"part":"row"')) seen += new TextDecoder().decode((await reader.read()).value)
    const other = await call(shop.people.owner, 'GET', `circuits/${id}`)
    delay.disable()
    expect(other.status).toBe(200)
    expect(delay.max / 1e6).toBeLessThan(700)
    expect(tablesRunning()).toBe(1)
    await reader.cancel()
    await until(() => tablesRunning() === 0)
  })

  it('writes two at once and turns a third away', async () => {
    const two = await Promise.all([open(shop.people.owner, large), open(shop.people.student, large)])
    expect(two.map(({ status }) => status)).toEqual([200, 200])
    const third = await open(shop.people.technician, large)
    expect([third.status, (await third.json()).error.code]).toEqual([503, 'evaluator-busy'])
    for (const { body } of two) await body!.cancel()
    await until(() => tablesRunning() === 0)
    const again = await open(shop.people.technician, id)
    expect(again.status).toBe(200)
    await again.text()
  })

  it('works out nothing ahead of the reader', async () => {
    const response = await open(shop.people.owner, id)
    await new Promise((resolve) => setTimeout(resolve, 300))
    const reader = response.body!.getReader()
    const { value } = await reader.read()
    expect(new TextDecoder().decode(value)).toMatch(/^condition,place/)
    await reader.cancel()
    expect(tablesRunning()).toBe(0)
  })
})
