import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useState } from 'react'
import { expect, test } from 'vitest'
import { ColourPalette } from '@/components/circuits/colour-palette'
import {
  cavityProblem,
  findersQuery,
  findersWords,
  noFinders,
  readFinders,
} from '@/components/circuits/finders'
import { circuitSearchSchema } from '@/lib/shared/api/circuits'

test('an address read back gives the same finders', () => {
  const finders = { ...noFinders, code: 'B1042-13', connector: 'C12', cavity: '3', colour: 'BU/WH' }
  expect(readFinders(new URLSearchParams(findersQuery(finders)))).toEqual(finders)
})

test('what the finders ask is what the search takes', () => {
  const query = findersQuery({
    name: 'lamp',
    code: 'B1042',
    connector: 'C12',
    cavity: '12',
    colour: 'BU/',
    system: 'Body',
  })
  expect(circuitSearchSchema.safeParse(Object.fromEntries(new URLSearchParams(query))).success).toBe(true)
})

test.each(['0', '1000', '-1', '3a', '1.5'])(
  'cavity %s is refused under the field and not asked for',
  (text) => {
    expect(cavityProblem(text)).toContain('from 1 to 999')
    expect(findersQuery({ ...noFinders, cavity: text })).toBe('')
  },
)

test('the question is said in words', () => {
  expect(findersWords({ ...noFinders, cavity: '3', colour: 'BU/WH' })).toBe('cavity 3, a BU/WH wire')
  expect(findersWords({ ...noFinders, colour: 'BK/', system: 'Lamps' })).toBe('a plain BK wire, in Lamps')
})

test('a wire colour is picked base first, then stripe, and each can be taken back', async () => {
  function Palette() {
    const [colour, setColour] = useState('')
    return (
      <>
        <ColourPalette colour={colour} onChange={setColour} />
        <output>{colour || 'any'}</output>
      </>
    )
  }
  render(<Palette />)
  const shown = () => screen.getByRole('status').textContent
  await userEvent.click(screen.getByRole('button', { name: 'Base blue' }))
  expect(shown()).toBe('BU')
  await userEvent.click(screen.getByRole('button', { name: 'Stripe white' }))
  expect(shown()).toBe('BU/WH')
  expect(screen.getByRole('button', { name: 'Stripe white' })).toHaveAttribute('aria-pressed', 'true')
  await userEvent.click(screen.getByRole('button', { name: 'Stripe white' }))
  expect(shown()).toBe('BU')
  await userEvent.click(screen.getByRole('button', { name: 'None' }))
  expect(shown()).toBe('BU/')
  await userEvent.click(screen.getByRole('button', { name: 'Base BU, change it' }))
  expect(shown()).toBe('any')
})
