import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, beforeEach, expect, test, vi } from 'vitest'
import { ImportScreen } from '@/components/circuits/import-screen'
import { lampRequestLine } from '@/diagrams/samples/lamp-request-line'
import { samples } from '@/diagrams/samples/all-samples'

const circuit = samples.find((sample) => sample.title === lampRequestLine.title)

/** The server as the screen meets it: what was asked, and the answers it gives in turn. */
let asked: { connectors: string; id: string }[]
let answers: { status: number; body: unknown }[]
beforeEach(() => {
  asked = []
  vi.stubGlobal('fetch', async (_url: string, init: RequestInit) => {
    asked.push(JSON.parse(String(init.body)))
    const answer = answers.shift()
    if (!answer) throw new TypeError('no network')
    return new Response(JSON.stringify(answer.body), { status: answer.status })
  })
})
afterEach(() => vi.unstubAllGlobals())

const stored = {
  status: 200,
  body: {
    id: '4b7e1f0a-3c55-4f0e-9d0c-6a2b1c3d4e5f',
    revision: 1,
    document: circuit,
    vehicleId: '0d6f3a52-8f4b-4f0b-8a4e-1b2c3d4e5f60',
    mine: true,
    may: { edit: true, delete: true },
    savedBy: 'Noor',
    createdAt: '2026-12-01T12:00:00.000Z',
    updatedAt: '2026-12-01T12:00:00.000Z',
  },
}

async function paste(text: string) {
  render(
    <QueryClientProvider client={new QueryClient()}>
      <ImportScreen />
    </QueryClientProvider>,
  )
  await userEvent.click(screen.getByLabelText('Circuit document, JSON'))
  await userEvent.paste(text)
}

test('a sound document is summed up, brought in and can be opened', async () => {
  answers = [stored]
  await paste(JSON.stringify(lampRequestLine))
  expect(screen.getByRole('heading', { name: lampRequestLine.title })).toBeInTheDocument()
  await userEvent.click(screen.getByRole('button', { name: 'Bring it in' }))
  expect(await screen.findByText(`${lampRequestLine.title} is in the library`)).toBeInTheDocument()
  expect(screen.getByRole('link', { name: 'Operate it' })).toHaveAttribute(
    'href',
    `/circuits/${stored.body.id}`,
  )
  expect(asked).toMatchObject([{ connectors: 'refuse' }])
})

test('every problem stands with its path, and nothing is sent', async () => {
  const wrong = structuredClone(lampRequestLine) as unknown as { wires: { to: string }[]; colour: string }
  ;(wrong.wires[0] as { to: string }).to = 'nowhere.in'
  await paste(JSON.stringify(wrong))
  const problems = screen.getByRole('alert')
  expect(within(problems).getByText('wires.0.to')).toBeInTheDocument()
  expect(screen.queryByRole('button', { name: 'Bring it in' })).not.toBeInTheDocument()
  expect(asked).toEqual([])
})

test('text that is not JSON is refused in a sentence', async () => {
  await paste('{ "format": "halfsplit-circuit", ')
  expect(screen.getByRole('alert')).toHaveTextContent('This is not JSON.')
})

test('connectors that differ are shown, and the choice goes with the same id', async () => {
  const difference = 'connector C12: cavities 12 in the vehicle, 8 in this document'
  answers = [
    {
      status: 409,
      body: {
        error: { code: 'connector-differs', message: difference, path: 'document', details: [difference] },
      },
    },
    stored,
  ]
  await paste(JSON.stringify(lampRequestLine))
  await userEvent.click(screen.getByRole('button', { name: 'Bring it in' }))
  expect(await screen.findByText(difference)).toBeInTheDocument()
  expect(screen.getByRole('button', { name: 'Bring it in' })).toBeDisabled()
  await userEvent.click(screen.getByRole('radio', { name: "Keep the vehicle's" }))
  await userEvent.click(screen.getByRole('button', { name: 'Bring it in' }))
  expect(await screen.findByText(/is in the library/)).toBeInTheDocument()
  expect(asked.map((request) => request.connectors)).toEqual(['refuse', 'keep'])
  expect(new Set(asked.map((request) => request.id)).size).toBe(1)
})

test('without a network the document stays and a sentence says so', async () => {
  answers = []
  await paste(JSON.stringify(lampRequestLine))
  await userEvent.click(screen.getByRole('button', { name: 'Bring it in' }))
  expect(await screen.findByText(/server cannot be reached/)).toBeInTheDocument()
  expect(screen.getByLabelText('Circuit document, JSON')).not.toHaveValue('')
})
