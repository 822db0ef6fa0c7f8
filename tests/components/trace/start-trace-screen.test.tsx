import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, describe, expect, it, vi } from 'vitest'
import { StartTraceScreen } from '@/components/trace/start/start-trace-screen'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { samples } from '@/diagrams/samples/all-samples'

vi.mock('next/navigation', () => ({ useRouter: () => ({ push: vi.fn(), refresh: vi.fn() }) }))
afterEach(() => vi.unstubAllGlobals())

const named = (title: string) => samples.find((sample) => sample.title === title)!
const circuitId = '7a0c1f86-5b1d-4a52-9f3e-0d2f6a4f5c22'

/** What the screen sends when it starts a trace. */
function show(circuit: Circuit) {
  const sent: Record<string, unknown>[] = []
  vi.stubGlobal('fetch', async (_: string, init: RequestInit = {}) => {
    if (init.method === 'POST') sent.push(JSON.parse(String(init.body)))
    return new Response(JSON.stringify({ rows: [] }), { status: 200 })
  })
  render(
    <QueryClientProvider client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}>
      <StartTraceScreen circuitId={circuitId} circuit={circuit} />
    </QueryClientProvider>,
  )
  return sent
}

describe('the start of a trace', () => {
  it('takes what the driver tells of each load, and the step at which it stops', async () => {
    const person = userEvent.setup()
    const lamps = named('Trailer stop and tail lamps')
    const sent = show(lamps)
    const told = within(screen.getByRole('group', { name: 'What it does' }))
    const left = within(told.getByRole('group', { name: /^E1 left stop works/ }))
    await person.click(left.getByRole('radio', { name: 'Does not' }))
    const tail = within(told.getByRole('group', { name: /^E3 left tail works/ }))
    await person.click(tail.getByRole('radio', { name: 'Always' }))
    await person.click(tail.getByRole('radio', { name: 'Weakly' }))
    if (lamps.sequence[1]) await person.click(told.getByRole('button', { name: /^Step 2/ }))
    await person.click(screen.getByRole('button', { name: 'Start the trace' }))
    await waitFor(() => expect(sent).toHaveLength(1))
    const ids = (label: string) => lamps.nodes.find((node) => node.label === label)!.id
    expect(sent[0]!.symptoms).toEqual([
      { node: ids('E1 left stop'), does: 'not-work' },
      { node: ids('E3 left tail'), does: 'weakly' },
      ...(lamps.sequence[1] ? [{ step: lamps.sequence[1].id }] : []),
    ])
  })

  it('lets what was told be taken back', async () => {
    const person = userEvent.setup()
    const fan = named('Two-speed cooling fan')
    const sent = show(fan)
    const told = within(screen.getByRole('group', { name: 'What it does' }))
    const motor = within(told.getByRole('group', { name: /^M1 cooling fan works/ }))
    await person.click(motor.getByRole('radio', { name: 'Does not' }))
    await person.click(motor.getByRole('radio', { name: 'Not told' }))
    const step = told.getByRole('button', { name: /^Step 1/ })
    await person.click(step)
    expect(step).toHaveAttribute('aria-pressed', 'true')
    await person.click(step)
    await person.click(screen.getByRole('button', { name: 'Start the trace' }))
    await waitFor(() => expect(sent).toHaveLength(1))
    expect(sent[0]!.symptoms).toEqual([])
  })

  it('asks nothing of a circuit without loads and without a sequence', () => {
    show({ ...named('Bus pair and diagnostic connector'), sequence: [] })
    expect(screen.queryByRole('group', { name: 'What it does' })).not.toBeInTheDocument()
  })
})
