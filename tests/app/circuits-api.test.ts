import { randomUUID } from 'node:crypto'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { circuitPageSchema, storedCircuitSchema } from '@/lib/shared/api/circuits'
import { errorBodySchema } from '@/lib/shared/api/error-body'
import { roles } from '@/lib/shared/permissions'
import { withDatabase } from '../support/database'
import { call } from './support/call'
import { exampleCircuit, type Loose } from './support/example'
import { makeShop, type Shop } from './support/shop'

describe('circuits over the API', () => {
  const database = withDatabase<Tables>()
  let shop: Shop
  beforeAll(async () => {
    shop = await makeShop(database, 'Alder Lane')
  })
  const ownVehicle = (change: (circuit: Loose) => void = () => {}) =>
    exampleCircuit((circuit) => {
      circuit.vehicle = `van ${randomUUID()}`
      change(circuit)
    })
  const add = (document: Loose, more: object = {}, who = shop.people.technician) =>
    call(who, 'POST', 'circuits', { document, ...more })

  it('imports a document, answers it with defaults filled in, and exports it as a file that imports again', async () => {
    const document = ownVehicle()
    const made = await add(document)
    expect(made.status).toBe(201)
    const stored = storedCircuitSchema.parse(made.body)
    expect(stored).toMatchObject({ revision: 1, mine: true, may: { edit: true, delete: true } })
    const opened = openCircuit(document)
    expect(stored.document).toEqual(opened.ok && opened.value)

    const file = await call(shop.people.student, 'GET', `circuits/${stored.id}/document`)
    expect(file.headers.get('content-disposition')).toBe(
      'attachment; filename="step-lamp-request-line.halfsplit.json"',
    )
    const again = await add(file.body)
    expect(again.status).toBe(201)
    expect(again.body.document).toEqual(stored.document)
  })

  it('gives the JSON Schema of the document to anybody', async () => {
    const schema = await call(null, 'GET', 'circuit-schema')
    expect(schema.status).toBe(200)
    expect(schema.body.required).toEqual(
      expect.arrayContaining(['format', 'version', 'title', 'nodes', 'wires']),
    )
    expect(schema.body.required).not.toContain('vehicle')
  })

  it('asks to sign in everywhere else', async () => {
    for (const path of ['circuits', `circuits/${randomUUID()}`]) {
      const answer = await call(null, 'GET', path)
      expect(answer.status).toBe(401)
      expect(errorBodySchema.parse(answer.body).error).toEqual({
        code: 'not-signed-in',
        message: 'Sign in first.',
      })
    }
  })

  it('lets each role do what the table says, and nothing else', async () => {
    for (const role of roles) {
      const who = shop.people[role]
      const mayEdit = role !== 'student'
      const created = await add(ownVehicle(), {}, who)
      expect([role, created.status]).toEqual([role, mayEdit ? 201 : 403])
      const others = (await add(ownVehicle(), {}, shop.people.owner)).body
      expect((await call(who, 'GET', `circuits/${others.id}`)).status).toBe(200)
      const saved = await call(who, 'PUT', `circuits/${others.id}`, {
        baseRevision: 1,
        document: others.document,
      })
      expect([role, saved.status]).toEqual([role, mayEdit ? 200 : 403])
      const gone = await call(who, 'DELETE', `circuits/${others.id}`)
      expect([role, gone.status]).toEqual([role, role === 'owner' || role === 'instructor' ? 204 : 403])
      if (mayEdit) expect((await call(who, 'DELETE', `circuits/${created.body.id}`)).status).toBe(204)
    }
  })

  it('answers a repeated import under the same id with the circuit already there', async () => {
    const id = randomUUID()
    const document = ownVehicle()
    const first = await add(document, { id })
    const second = await add(document, { id })
    expect([first.status, second.status]).toEqual([201, 201])
    expect(second.body).toEqual(first.body)
    const found = await call(
      shop.people.owner,
      'GET',
      `circuits?name=${encodeURIComponent(document.vehicle)}`,
    )
    expect(circuitPageSchema.parse(found.body).found).toEqual({ rows: 1, circuits: 1 })
    expect((await add(document, { id }, shop.people.owner)).body.error.code).toBe('id-taken')
  })

  it('takes two imports under one id at once as one', async () => {
    const id = randomUUID()
    const document = exampleCircuit((c) => void (c.vehicle = ''))
    const both = await Promise.all([add(document, { id }), add(document, { id })])
    expect(both.map(({ status }) => status)).toEqual([201, 201])
    expect(both[0].body).toEqual(both[1].body)
  })

  it('refuses a save on a stale edition and says whose edition is newer, and keeps what was saved', async () => {
    const made = (await add(ownVehicle())).body
    const path = `circuits/${made.id}`
    const change = (title: string) => ({ ...made.document, title })
    const first = await call(shop.people.owner, 'PUT', path, { baseRevision: 1, document: change('First') })
    expect(first.body.revision).toBe(2)
    const stale = await call(shop.people.technician, 'PUT', path, {
      baseRevision: 1,
      document: change('Second'),
    })
    expect(stale.status).toBe(409)
    expect(stale.body.error).toMatchObject({ code: 'stale-revision', path: 'baseRevision' })
    expect(stale.body.error.message).toContain('owner saved edition 2')
    expect((await call(shop.people.technician, 'GET', path)).body.document.title).toBe('First')
    // The answer got lost and the same person sends the same save again.
    const again = await call(shop.people.owner, 'PUT', path, { baseRevision: 1, document: change('First') })
    expect([again.status, again.body.revision]).toEqual([200, 2])
  })

  it('lets exactly one of several saves at once win', async () => {
    const made = (await add(ownVehicle())).body
    const answers = await Promise.all(
      [1, 2, 3, 4].map((n) =>
        call(shop.people.technician, 'PUT', `circuits/${made.id}`, {
          baseRevision: 1,
          document: { ...made.document, title: `Save ${n}` },
        }),
      ),
    )
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409, 409, 409])
  })

  describe('the connectors of a vehicle', () => {
    const secondCircuit = (vehicle: string, change: (circuit: Loose) => void) =>
      exampleCircuit((circuit) => {
        circuit.vehicle = vehicle
        circuit.title = 'Second circuit'
        change(circuit)
      })

    it('refuses an import whose connector differs, naming each difference, and saves nothing of it', async () => {
      const vehicle = `van ${randomUUID()}`
      await add(ownVehicle((c) => void (c.vehicle = vehicle)))
      const document = secondCircuit(vehicle.toUpperCase(), (c) => {
        c.connectors[0].cavities = 8
        c.connectors[0].location = 'right sill'
      })
      const refused = await add(document)
      expect(refused.status).toBe(409)
      expect(refused.body.error).toEqual({
        code: 'connector-differs',
        path: 'document.connectors.0',
        message:
          'connector C7: cavities 6 in the vehicle, 8 in this document; connector C7: location "left sill, front" in the vehicle, "right sill" in this document. Keep the vehicle\'s connector or replace it.',
        details: [
          'connector C7: cavities 6 in the vehicle, 8 in this document',
          'connector C7: location "left sill, front" in the vehicle, "right sill" in this document',
        ],
      })
      const found = await call(shop.people.owner, 'GET', `circuits?name=${vehicle.slice(4)}`)
      expect(found.body.found).toEqual({ rows: 1, circuits: 1 })
    })

    it('keeps the vehicle’s connector when told to', async () => {
      const vehicle = `van ${randomUUID()}`
      await add(ownVehicle((c) => void (c.vehicle = vehicle)))
      const kept = await add(
        secondCircuit(vehicle, (c) => void (c.connectors[0].cavities = 8)),
        {
          connectors: 'keep',
        },
      )
      expect(kept.status).toBe(201)
      expect(kept.body.document.connectors[0].cavities).toBe(6)
    })

    it('refuses to keep a connector that lacks a cavity the document uses', async () => {
      const vehicle = `van ${randomUUID()}`
      await add(ownVehicle((c) => void (c.vehicle = vehicle)))
      const document = secondCircuit(vehicle, (c) => {
        c.connectors[0].cavities = 8
        c.nodes[3].number = 8
      })
      const refused = await add(document, { connectors: 'keep' })
      expect(refused.status).toBe(422)
      expect(refused.body.error).toMatchObject({ code: 'invalid', path: 'document.nodes.3.number' })
      expect(refused.body.error.message).toContain('cavity 8 is outside connector "c7", which has 6')
    })

    it('replaces it when told to, and the circuits that share it get a new edition with it', async () => {
      const vehicle = `van ${randomUUID()}`
      const first = (await add(ownVehicle((c) => void (c.vehicle = vehicle)))).body
      const replaced = await add(
        secondCircuit(vehicle, (c) => void (c.connectors[0].location = 'right sill')),
        {
          connectors: 'replace',
        },
      )
      expect(replaced.status).toBe(201)
      const shared = (await call(shop.people.owner, 'GET', `circuits/${first.id}`)).body
      expect(shared.document.connectors[0].location).toBe('right sill')
      expect(shared.revision).toBe(2)
    })

    it('refuses a replacement that takes a cavity from another circuit, with the reason', async () => {
      const vehicle = `van ${randomUUID()}`
      const first = (
        await add(
          ownVehicle((c) => {
            c.vehicle = vehicle
            c.nodes[3].number = 6
          }),
        )
      ).body
      const refused = await add(
        secondCircuit(vehicle, (c) => void (c.connectors[0].cavities = 4)),
        {
          connectors: 'replace',
        },
      )
      expect(refused.status).toBe(409)
      expect(refused.body.error).toMatchObject({
        code: 'connector-in-use',
        path: 'document.connectors',
        message:
          'Not replaced. connector C7: circuit "Step lamp request line" uses cavity 6, the new one has 4.',
      })
      const untouched = (await call(shop.people.owner, 'GET', `circuits/${first.id}`)).body
      expect(untouched).toEqual({ ...first, mine: false })
    })

    it('survives many replacing it at once: no save hangs or breaks, and all circuits end with the same one', async () => {
      const vehicle = `van ${randomUUID()}`
      const circuits: Loose[] = []
      for (let i = 0; i < 4; i++)
        circuits.push(
          (
            await add(
              ownVehicle((c) => {
                c.vehicle = vehicle
                c.title = `Circuit ${i}`
              }),
            )
          ).body,
        )
      const answers = await Promise.all(
        circuits.flatMap((circuit, i) => {
          const document = structuredClone(circuit.document)
          document.connectors[0].location = `place ${i}`
          return [
            call(shop.people.owner, 'PUT', `circuits/${circuit.id}`, {
              baseRevision: 1,
              document,
              connectors: 'replace',
            }),
            i === 3 ? call(shop.people.owner, 'DELETE', `circuits/${circuit.id}`) : null,
          ].filter((answer) => answer !== null)
        }),
      )
      // A replacement gives the others a new edition, so all but the first find theirs stale.
      for (const { status } of answers) expect([200, 204, 404, 409]).toContain(status)
      expect(answers.filter(({ status }) => status === 200).length).toBeGreaterThanOrEqual(1)
      const left = await Promise.all(
        circuits.slice(0, 3).map((circuit) => call(shop.people.owner, 'GET', `circuits/${circuit.id}`)),
      )
      expect(left.map(({ status }) => status)).toEqual([200, 200, 200])
      const locations = left.map(({ body }) => body.document.connectors[0].location)
      expect(new Set(locations).size).toBe(1)
      expect(locations[0]).toMatch(/^place [0-3]$/)
    })

    it('changes a connector that no other circuit uses without asking', async () => {
      const made = (await add(ownVehicle())).body
      const document = structuredClone(made.document)
      document.connectors[0].location = 'under the seat'
      const saved = await call(shop.people.technician, 'PUT', `circuits/${made.id}`, {
        baseRevision: 1,
        document,
      })
      expect([saved.status, saved.body.document.connectors[0].location]).toEqual([200, 'under the seat'])
    })

    it('moves a circuit to another vehicle with the connectors it brings', async () => {
      const made = (await add(ownVehicle())).body
      const vehicle = `van ${randomUUID()}`
      const saved = await call(shop.people.technician, 'PUT', `circuits/${made.id}`, {
        baseRevision: 1,
        document: { ...made.document, vehicle },
      })
      expect(saved.status).toBe(200)
      expect(saved.body.vehicleId).not.toBe(made.vehicleId)
      expect(saved.body.document).toEqual({ ...made.document, vehicle })
    })
  })
})
