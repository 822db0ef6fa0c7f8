import { describe, expect, it } from 'vitest'
import { restCondition } from '@/diagrams/document/condition-schema'
import { pointName } from '@/diagrams/document/points'
import { samples } from '@/diagrams/samples/all-samples'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'
import { signIn } from './support/sign-in'
import { takePictures } from './support/take-pictures'
import { withBrowser } from './support/with-browser'

const circuit = samples.find((one) => one.nodes.some((node) => node.kind === 'relay')) ?? samples[0]

describe('a circuit being operated', () => {
  const test = withBrowser()

  it('shows at every point the volts that the solver gives it, whatever the controls say', async () => {
    if (!circuit) throw new Error('there is no sample')
    const { page, context } = await test.visit()
    const failures: string[] = []
    page.on('pageerror', (error) => failures.push(error.message))
    await signIn(page, 'noor@alderlane.example', test.product.password)
    await page.goto(`/circuits?name=${encodeURIComponent(circuit.title)}`)
    await page
      .getByRole('link', { name: new RegExp(circuit.title) })
      .first()
      .click()
    await page.waitForURL(/\/circuits\/[0-9a-f-]{36}$/)
    const setting: Record<string, string> = {}
    for (const control of circuit.controls) {
      const position = control.positions.at(-1) ?? control.rest
      setting[control.id] = position
      await page
        .getByRole('group', { name: control.label || control.id })
        .getByText(position, { exact: true })
        .click()
    }
    const solved = solveOperatingPoint(circuit, { ...restCondition, controls: setting })
    if (!solved.ok) throw new Error(solved.problem.message)
    const rows = page.getByRole('region', { name: 'Points, volts' }).getByRole('listitem')
    const shown = await rows.allInnerTexts()
    expect(shown.length).toBeGreaterThan(10)
    for (const text of shown) {
      const [name = '', now] = text.split('\n').map((part) => part.trim())
      const points = [...solved.value.volts].filter(([point]) => pointName(circuit, point) === name)
      expect(
        points.map(([, volts]) => volts.toFixed(1)),
        name,
      ).toContain(now)
    }
    await takePictures(page, 'operate')
    expect(failures).toEqual([])
    await context.close()
  })
})
