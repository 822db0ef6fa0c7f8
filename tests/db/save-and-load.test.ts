import { randomUUID } from 'node:crypto'
import fc from 'fast-check'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { samples } from '@/diagrams/samples/all-samples'
import { createCircuit } from '@/lib/server/use-cases/circuits/create-circuit'
import { getCircuit } from '@/lib/server/use-cases/circuits/get-circuit'
import { saveCircuit } from '@/lib/server/use-cases/circuits/save-circuit'
import { exampleCircuit, exampleRequest } from '../app/support/example'
import { makeShop, type Shop } from '../app/support/shop'
import { randomCircuit } from '../support/random-circuit'
import { withDatabase } from '../support/database'
import { arbitraryCircuit } from './arbitrary-circuit'

describe('saving and loading', () => {
  const database = withDatabase<Tables>()
  let shop: Shop
  beforeAll(async () => {
    shop = await makeShop(database, 'Alder Lane')
  })

  /** Stores a document under a vehicle of its own and asserts that it comes back. */
  async function comesBack(input: unknown): Promise<string> {
    const opened = openCircuit(input)
    if (!opened.ok) throw new Error(JSON.stringify(opened.problems.slice(0, 3)))
    const { context } = shop.people.technician
    const made = await createCircuit(context, { document: input })
    if (!made.ok) throw new Error(made.failure.message)
    expect(made.value.document).toEqual(opened.value)
    const loaded = await getCircuit(context, { id: made.value.id })
    if (!loaded.ok) throw new Error(loaded.failure.message)
    expect(loaded.value.document).toEqual(opened.value)
    expect(loaded.value.document.nodes.map(({ id }) => id)).toEqual(opened.value.nodes.map(({ id }) => id))
    return made.value.id
  }
  const ownVehicle = <T extends object>(circuit: T) => ({ ...circuit, vehicle: `van ${randomUUID()}` })

  it('gives the same document, lists in their order, for any valid document', async () => {
    await fc.assert(
      fc.asyncProperty(arbitraryCircuit, async (circuit) => {
        await comesBack(ownVehicle(circuit))
      }),
      { numRuns: 60 },
    )
  }, 120_000)

  it('gives the same document when it is saved over another one', async () => {
    const { context } = shop.people.owner
    const id = await comesBack(ownVehicle(exampleCircuit()))
    let revision = 1
    await fc.assert(
      fc.asyncProperty(arbitraryCircuit, async (circuit) => {
        const document = ownVehicle(circuit)
        const opened = openCircuit(document)
        const saved = await saveCircuit(context, { id }, { baseRevision: revision, document })
        if (!saved.ok || !opened.ok) throw new Error(saved.ok ? 'not opened' : saved.failure.message)
        revision = saved.value.revision
        expect(saved.value.document).toEqual(opened.value)
      }),
      { numRuns: 20 },
    )
    expect(revision).toBe(21)
  }, 120_000)

  it('gives the same document for made-up harnesses with every kind of part and pin', async () => {
    for (let seed = 1; seed <= 15; seed++) await comesBack(ownVehicle(randomCircuit(seed)))
  }, 60_000)

  it('takes every sample, whose vehicles share their connectors', async () => {
    expect(samples.length).toBeGreaterThanOrEqual(8)
    for (const sample of samples) await comesBack(sample)
  }, 60_000)

  it('takes both documents of the format page', async () => {
    await comesBack(exampleCircuit())
    await comesBack(exampleRequest().circuit)
  })

  it('keeps two circuits without a vehicle apart, connectors of the same id included', async () => {
    await comesBack(exampleCircuit((c) => void (c.vehicle = '')))
    await comesBack(
      exampleCircuit((c) => {
        c.vehicle = '  '
        c.connectors[0].cavities = 4
      }),
    )
  })

  it('takes a harness as large as a request may carry', async () => {
    const nodes = Array.from({ length: 3000 }, (_, i) => ({ id: `s${i}`, kind: 'splice' }))
    const wires = nodes.slice(1).map((node, i) => ({ id: `w${i}`, from: `s${i}.s`, to: `${node.id}.s` }))
    await comesBack({ format: 'halfsplit-circuit', version: 1, title: 'large', nodes, wires })
  }, 60_000)
})
