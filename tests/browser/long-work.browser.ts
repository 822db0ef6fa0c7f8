import { readFileSync } from 'node:fs'
import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import { distanceProbes } from '@/diagrams/distance-to-fault'
import { namedConditions } from '@/diagrams/fault-table/named-conditions'
import { tableFaults } from '@/diagrams/fault-table/table-faults'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { samples } from '@/diagrams/samples/all-samples'
import { measure } from '@/diagrams/solver/meter'
import { harnessOfSize } from '../support/harness-of-size'
import { signIn } from './support/sign-in'
import { takePictures } from './support/take-pictures'
import { withBrowser } from './support/with-browser'

const circuit = samples[0]!
const wire = circuit.wires.find((one) => one.to.startsWith('c12-3'))!

describe('what takes its time', () => {
  const test = withBrowser()

  type Loose = any

  /** A call of the page's own, with its cookie and its origin. */
  async function send(page: Page, method: string, path: string, body?: unknown): Promise<Loose> {
    const answer = await page.evaluate(
      async ([verb, address, text]) => {
        const response = await fetch(`/api/v1/${address}`, {
          method: verb!,
          ...(text === null ? {} : { body: text!, headers: { 'content-type': 'application/json' } }),
        })
        return { ok: response.ok, body: (await response.json()) as unknown }
      },
      [method, path, body === undefined ? null : JSON.stringify(body)] as const,
    )
    expect(answer.ok, JSON.stringify(answer.body)).toBe(true)
    return answer.body
  }

  async function circuitId(page: Page): Promise<string> {
    const found = await send(page, 'GET', `circuits?code=${circuit.codes[0]!.code}`)
    return found.rows.find((one: Loose) => one.title === circuit.title).circuitId as string
  }

  it('says how far along its wire a located short lies', async () => {
    const { page, context } = await test.visit()
    await signIn(page, 'noor@alderlane.example', test.product.password)
    const id = await circuitId(page)
    const traceId = crypto.randomUUID()
    await send(page, 'POST', 'traces', { id: traceId, circuitId: id })
    const fault = { site: `wire:${wire.id}`, mode: 'short-to-ground' as const, ohms: 0.1 }
    const probes = distanceProbes(circuit, wire.id)
    const neighbour = { ...probes[0]!, red: wire.from, black: 'cab.8' } as (typeof probes)[number]
    for (const [i, probe] of [probes[2]!, probes[0]!, neighbour].entries()) {
      const shown = measure(circuit, probe, fault)
      if (!shown.ok) throw new Error(shown.problem.message)
      const value = typeof shown.value === 'number' ? Number(shown.value.toFixed(2)) : shown.value
      await send(page, 'PUT', `traces/${traceId}/readings/r${i + 1}`, { id: `r${i + 1}`, ...probe, value })
    }
    await page.goto(`/circuits/${id}/traces/${traceId}`)
    await page.locator('[data-outcome="located"]').first().waitFor({ timeout: 60_000 })
    await page.getByRole('button', { name: 'Distance to the fault' }).click()
    const dialog = page.getByRole('dialog')
    await dialog.getByText('Millivolts at a current').click()
    const [millivolts, amps] = await dialog.getByRole('textbox').all()
    const ohms = (0.01724 * wire.length) / wire.mm2
    await millivolts!.fill((0.5 * ohms * 4 * 1000).toFixed(1))
    await amps!.fill('4')
    await expect
      .poll(() => dialog.getByRole('status').innerText())
      .toMatch(
        new RegExp(`^The short lies ${(wire.length / 2).toFixed(2)} m from .*, give or take \\d+ cm\\.$`),
      )
    await takePictures(page, 'distance-to-fault')
    await context.close()
  })

  it('saves the fault table: a row for every fault in every condition', async () => {
    const { page, context } = await test.visit()
    await signIn(page, 'noor@alderlane.example', test.product.password)
    await page.goto(`/circuits/${await circuitId(page)}`)
    const downloading = page.waitForEvent('download')
    await page.getByRole('link', { name: 'Save the fault table' }).first().click()
    const file = await (await downloading).path()
    const lines = readFileSync(file, 'utf8').split('\r\n')
    expect(lines[0]).toMatch(/^condition,place,fault,blows,unit,/)
    const rows = lines.filter((line) => / ?(,V,|,ohm,)/.test(line))
    const conditions = namedConditions(circuit).conditions.length
    expect(rows.length).toBe(conditions * (tableFaults(circuit).length + 1))
    await context.close()
  })

  it('leaves the page free while a large circuit is worked on, and says how far it is', async () => {
    const { page, context } = await test.visit()
    await signIn(page, 'noor@alderlane.example', test.product.password)
    const large: Circuit = harnessOfSize(1, 150)
    const { id } = await send(page, 'POST', 'circuits', { document: large })
    const traceId = crypto.randomUUID()
    await send(page, 'POST', 'traces', { id: traceId, circuitId: id })
    await page.goto(`/circuits/${id}/traces/${traceId}`)
    await page.getByText(/(Circuit learned|Next split): \d+ %/).waitFor({ timeout: 60_000 })
    const longestGap = await page.evaluate(
      () =>
        new Promise<number>((done) => {
          const start = performance.now()
          let last = start
          let longest = 0
          const frame = () => {
            const now = performance.now()
            longest = Math.max(longest, now - last)
            last = now
            const working = /(Circuit learned|Readings weighed|Next split): \d+ %/.test(
              document.body.textContent ?? '',
            )
            // What draws the answer is another matter: only frames while it is worked on count.
            if (!working || now - start > 1500) done(longest)
            else requestAnimationFrame(frame)
          }
          requestAnimationFrame(frame)
        }),
    )
    console.log(
      `longest gap between frames while a circuit of 150 parts is worked on: ${longestGap.toFixed(0)} ms`,
    )
    // On the page's own thread it would be all of the second and a half; a starved machine takes a part of it.
    expect(longestGap).toBeLessThan(700)
    await context.close()
  })
})
