import { readFile } from 'node:fs/promises'
import AxeBuilder from '@axe-core/playwright'
import type { BrowserContext, Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import { openCircuit } from '@/diagrams/document/open-circuit'
import { lampRequestLine } from '@/diagrams/samples/lamp-request-line'
import { signIn } from './support/sign-in'
import { withBrowser } from './support/with-browser'

/** Violations of accessibility rules on the page as it stands, one line each. */
async function violations(page: Page): Promise<string[]> {
  const { violations: found } = await new AxeBuilder({ page }).analyze()
  return found.flatMap(({ id, nodes }) => nodes.map((node) => `${id}: ${node.html.slice(0, 120)}`))
}

/** A busy machine may take its time; what is tested is what comes, not when. */
const patient = { timeout: 20_000 }

describe('the library of a shop', () => {
  const test = withBrowser()

  async function visitAs(email: string, width: 'laptop' | 'tablet' | 'phone' = 'laptop') {
    const { page, context } = await test.visit({ width })
    await signIn(page, email, test.product.password)
    await page.waitForURL('**/circuits')
    return { page, context }
  }

  it('brings whoever signs in back to the search they came for', async () => {
    const { page, context } = await test.visit()
    await page.goto('/circuits?cavity=3&colour=BU%2FWH')
    await page.getByLabel('E-mail').fill('noor@alderlane.example')
    await page.getByLabel('Password').fill(test.product.password)
    await page.getByRole('button', { name: 'Sign in', exact: true }).click()
    await page.waitForURL((url) => url.search === '?cavity=3&colour=BU%2FWH')
    await page.getByText('C12-3').first().waitFor()
    await context.close()
  })

  it('finds a circuit by its code and opens it', async () => {
    const { page, context } = await visitAs('noor@alderlane.example')
    await page.getByLabel('Trouble code').locator('visible=true').fill('B1A31')
    const row = page.getByRole('region', { name: 'Circuits found' }).getByRole('link')
    await expect.poll(() => row.count(), patient).toBe(1)
    expect(new URL(page.url()).search).toBe('?code=B1A31')
    await row.click()
    await page.waitForURL(/\/circuits\/[0-9a-f-]{36}$/)
    await page.getByRole('heading', { level: 1, name: lampRequestLine.title }).waitFor()
    await context.close()
  })

  it('refuses a connector that differs, and brings the circuit in with the one that is kept', async () => {
    const { page, context } = await visitAs('noor@alderlane.example')
    await page.goto('/circuits/import')
    const changed = structuredClone(lampRequestLine) as { title: string; connectors: { location?: string }[] }
    changed.title = 'Load space lamp request, second drawing'
    for (const connector of changed.connectors) connector.location = 'somewhere else'
    await page.getByLabel('Circuit document, JSON').fill(JSON.stringify(changed))
    await page.getByRole('button', { name: 'Bring it in' }).click()
    await page
      .getByText(/"somewhere else" in this document/)
      .first()
      .waitFor()
    await page.getByText("Keep the vehicle's").click()
    await page.getByRole('button', { name: 'Bring it in' }).click()
    await page.getByRole('heading', { name: `${changed.title} is in the library` }).waitFor()

    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: 'Save the document' }).click(),
    ])
    const exported = openCircuit(JSON.parse(await readFile(await download.path(), 'utf8')))
    expect(exported.ok && exported.value.title).toBe(changed.title)
    expect(exported.ok && exported.value.connectors.map((connector) => connector.location)).not.toContain(
      'somewhere else',
    )
    await context.close()
  })

  it('asks to sign in again over the page when the session has ended, and goes on from there', async () => {
    const { page, context } = await visitAs('noor@alderlane.example')
    await page.waitForLoadState('networkidle')
    await context.clearCookies()
    await page.getByLabel('Trouble code').locator('visible=true').fill('B1A31')
    const dialog = page.getByRole('dialog', { name: 'Your session has ended' })
    await dialog.waitFor()
    await dialog.getByLabel('Password').fill(test.product.password)
    await dialog.getByRole('button', { name: 'Sign in', exact: true }).click()
    await dialog.waitFor({ state: 'hidden' })
    const rows = page.getByRole('region', { name: 'Circuits found' }).getByRole('link')
    // Every circuit with the code, and no other: the test before may have brought in a second drawing.
    const onlyThose = async () => {
      const texts = await rows.allInnerTexts()
      return texts.length > 0 && texts.every((text) => text.includes('B1A31'))
    }
    await expect.poll(onlyThose, patient).toBe(true)
    await context.close()
  })

  it('lets a person of two organisations change over, and signs out', async () => {
    const { page, context } = await visitAs('kim@alderlane.example')
    const opener = page.getByRole('button', { name: /Alder Lane Garage|Marl Street College/ }).first()
    const before = (await opener.textContent()) ?? ''
    await opener.click()
    const other = before.includes('Alder') ? 'Marl Street College' : 'Alder Lane Garage'
    await page.getByRole('button', { name: other }).click()
    await page.getByRole('button', { name: other, expanded: false }).waitFor()
    const signOut = page.getByRole('button', { name: 'Sign out' })
    // The page of the other shop is loaded anew: a click may come before its buttons are alive.
    const menuOpens = async () => {
      if (await signOut.isVisible()) return true
      await page.getByRole('button', { name: other, expanded: false }).click()
      return signOut.waitFor({ timeout: 2000 }).then(
        () => true,
        () => false,
      )
    }
    await expect.poll(menuOpens, patient).toBe(true)
    await signOut.click()
    await page.waitForURL((url) => url.pathname === '/')
    await page.goto('/circuits')
    expect(new URL(page.url()).pathname).toBe('/sign-in')
    await context.close()
  })

  it('offers a student nothing that a student may not do', async () => {
    const { page, context } = await visitAs('piet@alderlane.example')
    await page.getByRole('region', { name: 'Circuits found' }).waitFor()
    expect(await page.getByRole('link', { name: 'Bring in a circuit' }).count()).toBe(0)
    expect((await page.goto('/circuits/import'))?.status()).toBe(404)
    await context.close()
  })

  it.each(['laptop', 'tablet', 'phone'] as const)(
    'can be read by a screen reader and does not scroll sideways on a %s',
    async (width) => {
      const { page, context } = await visitAs('noor@alderlane.example', width)
      for (const address of ['/circuits', '/circuits?cavity=3', '/circuits/import', '/', '/sign-up']) {
        await page.goto(address, { waitUntil: 'networkidle' })
        expect({ address, violations: await violations(page) }).toEqual({ address, violations: [] })
        const sideways = await page.evaluate(
          () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
        )
        expect({ address, sideways }).toEqual({ address, sideways: 0 })
      }
      await context.close()
    },
  )

  it('answers 404 where a circuit or a trace is unknown or belongs to somebody else', async () => {
    const read = async (context: BrowserContext, path: string) => (await context.request.get(path)).json()
    const school = await visitAs('bo@marlstreet.example')
    const foreign = (await read(school.context, '/api/v1/circuits')).rows[0].circuitId
    await school.context.close()
    const { context } = await visitAs('noor@alderlane.example')
    const { id: trace, circuitId: circuit } = (await read(context, '/api/v1/traces')).rows[0]
    const other = (await read(context, '/api/v1/circuits')).rows
      .map((row: { circuitId: string }) => row.circuitId)
      .find((id: string) => id !== circuit)
    const nowhere = '0d0e0000-0000-4000-8000-00000000ffff'
    const status = async (path: string) => [path, (await context.request.get(path)).status()]
    for (const path of [
      `/circuits/${circuit}`,
      `/circuits/${circuit}/trace`,
      `/circuits/${circuit}/traces/${trace}`,
    ])
      expect(await status(path)).toEqual([path, 200])
    for (const id of [foreign, nowhere, 'nowhere', '%00'])
      for (const path of [`/circuits/${id}`, `/circuits/${id}/trace`, `/circuits/${id}/traces/${trace}`])
        expect(await status(path)).toEqual([path, 404])
    for (const path of [
      `/circuits/${circuit}/traces/${nowhere}`,
      `/circuits/${circuit}/traces/nothing`,
      `/circuits/${other}/traces/${trace}`,
    ])
      expect(await status(path)).toEqual([path, 404])
    await context.close()
    const student = await visitAs('piet@alderlane.example')
    const theirs = `/circuits/${circuit}/traces/${trace}`
    expect((await student.context.request.get(theirs)).status()).toBe(404)
    await student.context.close()
  })
})
