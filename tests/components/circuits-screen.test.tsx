import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, beforeEach, expect, test, vi } from 'vitest'
import { CircuitsScreen } from '@/components/circuits/circuits-screen'
import { noFinders } from '@/components/circuits/finders'
import type { CircuitPage, CircuitRow } from '@/lib/shared/api/circuits'
import type { TraceRow } from '@/lib/shared/api/traces'

const row: CircuitRow = {
  key: 'c1',
  kind: 'circuit',
  circuitId: 'c1',
  title: 'Step lamp',
  vehicle: 'Example van',
  system: 'Body',
  code: 'B1234-14',
  cavity: null,
  wire: null,
  carries: 'Step lamp request line',
  updatedAt: '2026-12-01T12:00:00.000Z',
}
const cavityRow: CircuitRow = {
  ...row,
  key: 'c1/w4/a',
  kind: 'cavity',
  cavity: { vehicleId: 'v1', connectorId: 'c7', connector: 'C7', number: 2 },
  wire: { id: 'w4', colour: 'GN/YE', mm2: 0.5 },
  carries: 'Door module pin 4 to Body module pin 12',
}
const pageOf = (rows: CircuitRow[], more: Partial<CircuitPage> = {}): CircuitPage => ({
  rows,
  nextCursor: null,
  found: { rows: rows.length, circuits: rows.length },
  systems: [{ system: 'Body', circuits: 1 }],
  circuits: 1,
  ...more,
})
const trace: TraceRow = {
  id: 't1',
  circuitId: 'c1',
  title: 'Step lamp',
  vehicle: 'Example van',
  complaint: 'dark',
  codes: ['B1234-14'],
  readings: 2,
  state: 'open',
  by: 'Noor',
  updatedAt: '2026-12-01T12:00:00.000Z',
  progress: {
    outcome: 'narrowed',
    places: 20,
    left: 6,
    says: '6 places left of 20.',
    next: 'C7 cavity 2, door side. Back-probe volts to chassis. About 3 minutes.',
  },
}

let asked: string[]
let answer: (address: string) => unknown
beforeEach(() => {
  asked = []
  answer = (address) => (address.includes('/traces') ? { rows: [] } : pageOf([row]))
  vi.stubGlobal('fetch', async (address: string) => {
    asked.push(address)
    const body = answer(address)
    if (body instanceof Error) throw body
    return new Response(JSON.stringify(body))
  })
})
afterEach(() => vi.unstubAllGlobals())

function show(initialPage: CircuitPage | null, mayCreate = true) {
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <CircuitsScreen initialFinders={noFinders} initialPage={initialPage} mayCreate={mayCreate} />
    </QueryClientProvider>,
  )
}
const found = () => within(screen.getByRole('region', { name: 'Circuits found' }))

test('every circuit is a row that leads to it', () => {
  show(pageOf([row]))
  expect(found().getByRole('link', { name: /Step lamp/ })).toHaveAttribute('href', '/circuits/c1')
  expect(found().getByRole('status')).toHaveTextContent('1 circuit')
})

test('typing a cavity asks the server once it rests, and the rows become cavities', async () => {
  answer = (address) => (address.includes('cavity=2') ? pageOf([cavityRow]) : pageOf([row]))
  show(pageOf([row]))
  await userEvent.type(screen.getAllByLabelText('Cavity')[0] as HTMLElement, '2')
  await waitFor(() => expect(found().getByRole('status')).toHaveTextContent('1 cavity fits'))
  expect(asked.some((address) => address.includes('cavity=2'))).toBe(true)
  const link = found().getByRole('link')
  expect(link).toHaveTextContent('C7-2')
  expect(link).toHaveTextContent('green with a yellow stripe')
  expect(location.search).toBe('?cavity=2')
})

test('a search that finds nothing offers to take the finders away', async () => {
  answer = (address) => (address.includes('code=') ? pageOf([], { circuits: 1 }) : pageOf([row]))
  show(pageOf([row]))
  await userEvent.type(screen.getAllByLabelText('Trouble code')[0] as HTMLElement, 'p0999')
  await waitFor(() => expect(found().getByRole('status')).toHaveTextContent('Nothing fits'))
  await userEvent.click(screen.getByRole('button', { name: 'Clear the finders' }))
  await waitFor(() => expect(found().getByRole('status')).toHaveTextContent('1 circuit'))
})

test('a library without circuits offers to bring one in, to those who may', () => {
  show(pageOf([], { circuits: 0, systems: [] }))
  expect(screen.getByText('No circuits yet.')).toBeInTheDocument()
  expect(screen.getByRole('link', { name: 'Bring one in' })).toHaveAttribute('href', '/circuits/import')
})

test('a student is not offered what a student may not do', () => {
  show(pageOf([], { circuits: 0, systems: [] }), false)
  expect(screen.getByText('No circuits yet.')).toBeInTheDocument()
  expect(screen.queryByRole('link', { name: 'Bring one in' })).not.toBeInTheDocument()
})

test('a server that does not answer leaves a sentence and a way to try again', async () => {
  answer = () => new TypeError('no network')
  show(null)
  expect(await screen.findByText('The circuits could not be read.')).toBeInTheDocument()
  answer = (address) => (address.includes('/traces') ? { rows: [] } : pageOf([row]))
  await userEvent.click(screen.getByRole('button', { name: 'Try again' }))
  expect(await screen.findByRole('link', { name: /Step lamp/ })).toBeInTheDocument()
})

test('the next page is added under the rows, and the count says how many there are', async () => {
  const firstPage = pageOf([row], { nextCursor: 'more', found: { rows: 2, circuits: 2 }, circuits: 2 })
  const second = { ...row, key: 'c2', circuitId: 'c2', title: 'Reading lamp' }
  answer = (address) =>
    address.includes('cursor=more')
      ? pageOf([second], { found: { rows: 2, circuits: 2 } })
      : address.includes('/traces')
        ? { rows: [] }
        : firstPage
  show(firstPage)
  expect(screen.getByText('1 of 2 shown')).toBeInTheDocument()
  await userEvent.click(screen.getByRole('button', { name: 'Show more' }))
  expect(await found().findByRole('link', { name: /Reading lamp/ })).toBeInTheDocument()
  expect(screen.queryByRole('button', { name: 'Show more' })).not.toBeInTheDocument()
})

test('a trace left open says how many places are left and leads back into it', async () => {
  answer = (address) => (address.includes('/traces') ? { rows: [trace] } : pageOf([row]))
  show(pageOf([row]))
  const open = within(await screen.findByRole('region', { name: /Traces left open/ }))
  expect(open.getByRole('link')).toHaveAttribute('href', '/circuits/c1/traces/t1')
  expect(open.getByText('6 places left')).toBeInTheDocument()
  expect(open.getAllByText('Next: C7 cavity 2, door side').length).toBeGreaterThan(0)
})

test('the slash key goes to the search by name', async () => {
  show(pageOf([row]))
  await userEvent.keyboard('/')
  expect(screen.getAllByLabelText('Name, part or signal')[0]).toHaveFocus()
})
