import { mkdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import { pointName } from '@/diagrams/document/points'
import type { Probe, Reading, ReadingValue } from '@/diagrams/document/reading-schema'
import { evaluate } from '@/diagrams/evaluate'
import type { Odds } from '@/diagrams/faults/odds-schema'
import { samples } from '@/diagrams/samples/all-samples'
import { measure } from '@/diagrams/solver/meter'
import type { PlantedFault } from '@/diagrams/solver/planted-fault'
import { probeOf } from '../support/trace-fault'
import { signIn } from './support/sign-in'
import { pictureFolder, takePictures } from './support/take-pictures'
import { schemes, widths } from './support/widths'
import { withBrowser } from './support/with-browser'

const circuit = samples[0] as (typeof samples)[number]
const code = circuit.codes[0]
const codeText = `${code?.code}${code?.failureType ? `-${code.failureType}` : ''}`

describe('a trace from a trouble code to a proved repair', () => {
  const test = withBrowser()

  async function startTrace(page: Page): Promise<void> {
    await signIn(page, 'noor@alderlane.example', test.product.password)
    await page.goto(`/circuits?code=${code?.code}`)
    await page
      .getByRole('link', { name: new RegExp(circuit.title) })
      .first()
      .click()
    await page.waitForURL(/\/circuits\/[0-9a-f-]{36}$/)
    await page.getByRole('link', { name: 'Trace', exact: true }).click()
    await page.waitForURL(/\/trace$/)
    await page.getByLabel('Complaint').fill('The load space lamp stays dark.')
    await page.getByRole('button', { name: new RegExp(codeText) }).click()
    await page.getByRole('button', { name: 'Start the trace' }).click()
    await page.waitForURL(/\/traces\//)
  }

  /** Follows the planner with a fault planted, on the screen, until the evaluator has located it or `most` are taken. */
  async function trace(
    page: Page,
    fault: PlantedFault,
    most: number,
    after?: (readings: number) => Promise<unknown>,
  ): Promise<Reading[]> {
    const readings: Reading[] = []
    const odds = await oddsOf(page)
    for (;;) {
      await page.locator('[data-outcome="narrowed"], [data-outcome="located"]').first().waitFor()
      const answer = evaluate({ circuit, readings, codes: [codeText], priors: 'trade', odds })
      await page.locator(`[data-outcome="${answer.outcome}"]`).first().waitFor()
      if (answer.outcome === 'located' || readings.length >= most) return readings
      const [next] = answer.next
      if (!next) return readings
      const probe = probeOf(next)
      const value = shown(probe, fault)
      await page.getByRole('button', { name: 'Set the meter for this' }).click()
      await enter(page, value)
      readings.push({ id: `R${readings.length + 1}`, ...probe, value } as Reading)
      await page.locator('[data-queue="idle"]').first().waitFor({ state: 'attached' })
      await page.getByText(`${readings.length}, newest first`).waitFor()
      await after?.(readings.length)
    }
  }

  it('locates an open wire in at most four readings, comes back whole, is proved and saved as PNG', async () => {
    const { page, context } = await test.visit()
    const failures: string[] = []
    page.on('pageerror', (error) => failures.push(error.message))
    await startTrace(page)
    await page.locator('[data-outcome="narrowed"]').first().waitFor()
    await takePictures(page, 'trace-before')

    const wire = circuit.wires.find((one) => one.from.startsWith('c12-3') || one.to.startsWith('c12-3'))
    const fault: PlantedFault = { site: `wire:${wire?.id}`, mode: 'open' }
    const readings = await trace(page, fault, 8, async (taken) => {
      if (taken !== 2) return
      await page.locator('[data-outcome="narrowed"]').first().waitFor()
      await takePictures(page, 'trace-narrowed')
    })
    const cell = page.locator(`[data-site="${fault.site}"]`)
    await cell.waitFor()
    expect(await cell.getAttribute('aria-label')).toMatch(/faulty, open$/)
    await takePictures(page, 'trace-located')

    await page.reload()
    await page.locator('[data-outcome="located"]').first().waitFor()
    expect(await page.getByText(`${readings.length}, newest first`).count()).toBe(1)
    await page.locator(`[data-site="${fault.site}"]`).waitFor()

    await page.getByRole('button', { name: 'Record and prove the repair' }).click()
    const dialog = page.getByRole('dialog')
    expect(await dialog.getByLabel('What was found, place').inputValue()).toBe(fault.site)
    expect(await dialog.getByLabel('How it failed').inputValue()).toBe('open')
    await dialog.getByText('Yes', { exact: true }).click()
    await dialog.getByLabel('What was repaired, notes').fill('Chafed through at the sill, spliced and taped.')
    await dialog.getByRole('button', { name: 'Record what was found' }).click()
    await dialog.getByRole('heading', { name: 'Prove the repair' }).waitFor()
    const proving = dialog.getByLabel('The meter shows now')
    const number = (await dialog.getByLabel('Reading to take again').count())
      ? await dialog.getByLabel('Reading to take again').inputValue()
      : 'R1'
    const again = readings[Number(number.slice(1)) - 1] as Reading
    const { id: _, value: __, ...probe } = again
    const good = shown(probe as Probe)
    if (typeof good === 'number' || good === 'OL') await proving.fill(String(good))
    else
      await dialog
        .getByRole('group', { name: probe.kind === 'sees' ? 'The module sees now' : 'It now' })
        .getByText(good === 'high' ? 'High' : good === 'low' ? 'Low' : good ? 'Works' : 'Does not', {
          exact: true,
        })
        .click()
    await dialog.getByText('Works', { exact: true }).last().click()
    await dialog.getByRole('button', { name: 'Record the proof' }).click()
    await page.getByText('The repair is proved').waitFor()

    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Save as PNG' }).click(),
    ])
    expect(download.suggestedFilename()).toMatch(/^[a-z0-9-]+-B[0-9A-F]{4}-[0-9A-F]{2}-\d{4}-\d\d-\d\d\.png$/)
    mkdirSync(pictureFolder, { recursive: true })
    const file = path.join(pictureFolder, 'trace.png')
    await download.saveAs(file)
    const picture = await look(page, file)
    expect(picture.width).toBeGreaterThanOrEqual(2000)
    expect(picture.height).toBeGreaterThanOrEqual(1000)
    // A blank picture has one colour; a drawing with marks and words on white has many, and is mostly light.
    expect(picture.colours).toBeGreaterThan(50)
    expect(picture.lightShare).toBeGreaterThan(0.8)
    expect(failures).toEqual([])
    expect(readings.length).toBeLessThanOrEqual(4)
    await context.close()
  })

  it('names a short to ground as the cause and the fuse it has blown as the consequence', async () => {
    const { page, context } = await test.visit()
    await startTrace(page)
    const fuse = circuit.nodes.findLast((node) => node.kind === 'fuse')
    const wire = circuit.wires.find((one) => one.from === `${fuse?.id}.out`)
    const fault: PlantedFault = { site: `wire:${wire?.id}`, mode: 'short-to-ground', ohms: 0.1 }
    await trace(page, fault, 8)
    const cell = page.locator(`[data-site="${fault.site}"]`)
    await cell.waitFor()
    expect(await cell.getAttribute('aria-label')).toMatch(/faulty, short to ground$/)
    await page.getByText(`${fuse?.label} has blown because of it.`).waitFor()
    await takePictures(page, 'trace-blown-fuse')
    await context.close()
  })

  for (const [words, mode, ohms] of [
    ['an open', 'open', undefined],
    ['a short to ground', 'short-to-ground', 0.1],
  ] as const)
    it(`locates ${words} with ohms alone, both ends of the wire unplugged`, async () => {
      const { page, context } = await test.visit()
      await startTrace(page)
      const wire = circuit.wires.find((one) => one.to.startsWith('c12-3'))
      if (!wire) throw new Error('the link has no wire to C12 cavity 3')
      const fault: PlantedFault = { site: `wire:${wire.id}`, mode, ...(ohms === undefined ? {} : { ohms }) }
      const ends = connectorsOf(wire)
      await page.getByRole('group', { name: 'What to measure' }).getByText('Ohms').click()
      await page.locator(`[data-point="${wire.from}"]`).click()
      await page.getByText('Ohms needs the battery disconnected', { exact: false }).first().waitFor()
      const battery = page.locator('[data-control="battery"]')
      while (!(await battery.innerText()).includes('off')) await battery.click()
      await page.locator('[data-control="unplugged"]').click()
      for (const id of ends) {
        const name = circuit.connectors.find((one) => one.id === id)?.label ?? id
        await page.getByRole('dialog').getByRole('group', { name }).getByText('Out').click()
      }
      await page.getByRole('button', { name: 'Done' }).click()
      const condition = { controls: {}, unplugged: ends, battery: false, charging: false, added: [] }
      // End to end, to chassis, to the neighbouring cavity.
      const leads: [string, string][] = [
        [wire.from, wire.to],
        [wire.from, 'chassis'],
        [wire.from, 'cab.8'],
      ]
      for (const [index, [red, black]] of leads.entries()) {
        await put(page, 'Red lead', red)
        await put(page, 'Black lead', black)
        await enter(page, shown({ kind: 'ohms', red, black, condition }, fault))
        await page.getByText(`${index + 1}, newest first`).waitFor()
        await page.locator('[data-queue="idle"]').first().waitFor({ state: 'attached' })
      }
      await page.locator('[data-outcome="located"]').first().waitFor()
      const cell = page.locator(`[data-site="${fault.site}"]`)
      expect(await cell.getAttribute('aria-label')).toMatch(
        new RegExp(`faulty, ${mode.replaceAll('-', ' ')}$`),
      )
      await context.close()
    })

  it('takes what the driver tells, a moved harness, what a module sees and a lead put in', async () => {
    const { page, context } = await test.visit()
    const failures: string[] = []
    page.on('pageerror', (error) => failures.push(error.message))
    const mirrors = samples.find((sample) => sample.title === 'Heated mirrors') as typeof circuit
    await signIn(page, 'noor@alderlane.example', test.product.password)
    await page.goto(`/circuits?code=${mirrors.codes[0]?.code}`)
    await page
      .getByRole('link', { name: new RegExp(mirrors.title) })
      .first()
      .click()
    await page.waitForURL(/\/circuits\/[0-9a-f-]{36}$/)
    await page.getByRole('link', { name: 'Trace', exact: true }).click()
    await page.waitForURL(/\/trace$/)
    await page.getByLabel('Complaint').fill('Right mirror stays misted.')
    const told = page.getByRole('group', { name: 'What it does' })
    await told.getByText('Does not', { exact: true }).first().click()
    await told.getByRole('button', { name: /^Step 2/ }).click()
    await takePictures(page, 'trace-start')
    await page.getByRole('button', { name: 'Start the trace' }).click()
    await page.waitForURL(/\/traces\//)
    // Told, and weighed before the first reading.
    await page.locator('[data-outcome="narrowed"]').first().waitFor()
    await page.getByRole('button', { name: 'This is done and held to' }).click()

    await page.getByRole('group', { name: 'What to measure' }).getByText('Volts').click()
    await put(page, 'Red lead', 'c12-5.a', mirrors)
    await page.locator('[data-control="harness"]').click()
    await page.getByRole('textbox', { name: /^Meter/ }).fill('12.5')
    await page.getByRole('radio', { name: /^Least/ }).check()
    await page.getByRole('textbox', { name: /^Meter/ }).fill('0.2')
    await page.getByRole('radio', { name: /^Most/ }).check()
    await page.getByRole('textbox', { name: /^Meter/ }).fill('12.5')
    await takePictures(page, 'trace-moved')
    const size = page.viewportSize()
    await page.setViewportSize(widths.phone)
    await page.getByRole('button', { name: 'Take the reading' }).click()
    const entry = page.getByRole('dialog', { name: 'Take the reading' })
    await entry.getByRole('radio', { name: /^Least/ }).waitFor()
    for (const colorScheme of schemes) {
      await page.emulateMedia({ colorScheme })
      await page.screenshot({ path: path.join(pictureFolder, `trace-entry-moved-390-${colorScheme}.png`) })
    }
    await page.emulateMedia({ colorScheme: 'light' })
    await entry.getByRole('button', { name: 'Back to the trace' }).click()
    if (size) await page.setViewportSize(size)
    await page.getByRole('textbox', { name: /^Meter/ }).press('Enter')
    await page.getByText('moved 0.20 to 12.50').first().waitFor()

    await page.locator('[data-control="put-in"]').click()
    const dialog = page.getByRole('dialog', { name: 'Put in for this reading' })
    await dialog.getByText('Test lamp', { exact: true }).click()
    for (const [end, point] of [
      ['From', 'c12-5.a'],
      ['To', 'chassis'],
    ] as const) {
      await dialog.getByRole('button', { name: new RegExp(`^${end}`) }).click()
      const list = page.getByRole('dialog', { name: new RegExp(`${end} which point`, 'i') })
      await list
        .getByRole('button', { name: pointName(mirrors, point), exact: false })
        .first()
        .click()
    }
    await dialog.getByRole('button', { name: 'Put it in' }).click()
    await dialog.getByText(/^Test lamp from C12 cavity 5/).waitFor()
    await takePictures(page, 'trace-put-in')
    await dialog.getByRole('button', { name: 'Done' }).click()

    await page.getByRole('group', { name: 'What to measure' }).getByText('Sees').click()
    await page.getByRole('button', { name: /The module reports its input/ }).click()
    await page.getByRole('dialog').getByRole('button', { name: /pin/ }).first().click()
    await takePictures(page, 'trace-sees')
    await enter(page, 'high')
    await page.getByText('2, newest first').waitFor()
    await page
      .getByText(/test lamp from C12 cavity 5/)
      .first()
      .waitFor()
    expect(failures).toEqual([])
    await context.close()
  })

  it('keeps readings through a lost network and a reload, and sends them when it is back', async () => {
    const { page, context } = await test.visit()
    await startTrace(page)
    await page.locator('[data-outcome="narrowed"]').first().waitFor()
    const odds = await oddsOf(page)
    await page.route('**/api/v1/traces/**', (route) => route.abort())
    await page.getByRole('button', { name: 'Set the meter for this' }).click()
    const [next] = evaluate({ circuit, readings: [], codes: [codeText], priors: 'trade', odds }).next
    if (!next) throw new Error('the planner has nothing to ask')
    await enter(page, shown(probeOf(next)))
    await page.getByText('Offline, 1 reading kept on this tablet').first().waitFor()
    await page.reload()
    await page.getByText('1, newest first').waitFor()
    await page.unroute('**/api/v1/traces/**')
    await page.evaluate(() => window.dispatchEvent(new Event('online')))
    await page.locator('[data-queue="idle"]').first().waitFor({ state: 'attached' })
    // A device that has never seen it shows it from the server.
    await page.evaluate(() => localStorage.clear())
    await page.reload()
    await page.getByText('1, newest first').waitFor()
    await context.close()
  })
})

/** The odds of the organisation that the trace on the page starts from. */
async function oddsOf(page: Page): Promise<Odds | undefined> {
  const id = /\/traces\/([0-9a-f-]{36})/.exec(page.url())?.[1]
  const answered = await page.request.get(`/api/v1/traces/${id}`)
  const trace = (await answered.json()) as { odds: Odds | null }
  return trace.odds ?? undefined
}

/** Size of a picture and what it is painted with, as the browser itself decodes it. */
async function look(page: Page, file: string) {
  const address = `data:image/png;base64,${readFileSync(file).toString('base64')}`
  return page.evaluate(async (source) => {
    const image = new Image()
    image.src = source
    await image.decode()
    const { naturalWidth: width, naturalHeight: height } = image
    const canvas = new OffscreenCanvas(width, height)
    const pen = canvas.getContext('2d')
    if (!pen) throw new Error('no canvas')
    pen.drawImage(image, 0, 0)
    const { data } = pen.getImageData(0, 0, width, height)
    const colours = new Set<number>()
    let light = 0
    for (let at = 0; at < data.length; at += 4) {
      const [red = 0, green = 0, blue = 0] = data.subarray(at, at + 3)
      colours.add((red >> 3) * 1024 + (green >> 3) * 32 + (blue >> 3))
      if (red > 225 && green > 225 && blue > 225) light++
    }
    return { width, height, colours: colours.size, lightShare: light / (data.length / 4) }
  }, address)
}

/** The connectors at both ends of a wire. */
function connectorsOf(wire: { from: string; to: string }): string[] {
  return [wire.from, wire.to].flatMap((end) => {
    const node = circuit.nodes.find((one) => end.startsWith(`${one.id}.`))
    return node?.connector ? [node.connector] : []
  })
}

/** Puts a lead by its list: what the sheet's points do with a finger. */
async function put(page: Page, lead: 'Red lead' | 'Black lead', point: string, of = circuit): Promise<void> {
  const name = pointName(of, point)
  await page.getByRole('button', { name: new RegExp(`^${lead}`) }).click()
  await page.getByRole('dialog').getByLabel('Find').fill(name)
  await page.getByRole('dialog').getByRole('button', { name, exact: false }).first().click()
}

/** What the meter shows: of the good circuit when no fault is given, to the digits that can be typed. */
function shown(probe: Probe, fault?: PlantedFault): ReadingValue {
  const measured = measure(circuit, probe, fault)
  if (!measured.ok) throw new Error(measured.problem.message)
  return typeof measured.value === 'number' ? Number(measured.value.toFixed(3)) : measured.value
}

async function enter(page: Page, value: ReadingValue): Promise<void> {
  if (typeof value === 'boolean' || value === 'high' || value === 'low') {
    const [group, words] =
      typeof value === 'boolean'
        ? ['Does it work', value ? 'Works' : 'Does not']
        : ['The module sees', value === 'high' ? 'High' : 'Low']
    await page.getByRole('group', { name: group }).getByText(words, { exact: true }).click()
    await page.getByRole('button', { name: 'Enter reading' }).first().click()
    return
  }
  const meter = page.getByRole('textbox', { name: /^Meter/ })
  await meter.fill(String(value))
  await meter.press('Enter')
}
