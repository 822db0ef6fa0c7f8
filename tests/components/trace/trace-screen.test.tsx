import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { configure, render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { TraceScreen } from '@/components/trace/trace-screen'
import { evaluate } from '@/diagrams/evaluate'
import { samples } from '@/diagrams/samples/all-samples'
import type { Asked } from '@/lib/client/evaluator/messages'
import { WholeQuestions } from '@/lib/client/evaluator/whole-question'
import type { Trace } from '@/lib/shared/api/traces'

vi.mock('next/navigation', () => ({ useRouter: () => ({ push: vi.fn(), refresh: vi.fn() }) }))

// The evaluator works in the same thread here, and a busy machine takes its time.
configure({ asyncUtilTimeout: 10_000 })

const circuit = samples[0] as (typeof samples)[number]
const traceId = '3f0c1f86-5b1d-4a52-9f3e-0d2f6a4f5c11'
const code = circuit.codes[0]

function makeTrace(more: Partial<Trace> = {}): Trace {
  return {
    id: traceId,
    circuit: { id: '7a0c1f86-5b1d-4a52-9f3e-0d2f6a4f5c22', revision: 3, document: circuit },
    vehicle: circuit.vehicle,
    complaint: 'Lamp stays dark.',
    codes: code ? [`${code.code}-${code.failureType}`] : [],
    readings: [],
    cautionsAnsweredAt: null,
    finding: null,
    proof: null,
    odds: null,
    symptoms: [],
    state: 'open',
    by: 'Noor',
    mine: true,
    startedAt: '2026-12-01T09:00:00.000Z',
    updatedAt: '2026-12-01T09:00:00.000Z',
    ...more,
  }
}

/** The evaluator without a thread: jsdom has none. It answers later, as a thread would. */
class SameThreadWorker {
  onmessage: ((event: MessageEvent) => void) | null = null
  onerror: ((event: ErrorEvent) => void) | null = null
  private readonly questions = new WholeQuestions()
  postMessage(asked: Asked) {
    const question = this.questions.open(asked)
    const { number } = asked
    setTimeout(
      () => this.onmessage?.({ data: { number, ok: true, answer: evaluate(question) } } as MessageEvent),
      0,
    )
  }
  terminate() {
    this.onmessage = null
  }
}

/** The server's side of a trace, kept in memory; `away` is a network that carries nothing. */
function serve(trace: Trace) {
  const server = { trace, away: false, calls: [] as string[] }
  vi.stubGlobal('fetch', async (address: string, init: RequestInit = {}) => {
    server.calls.push(`${init.method ?? 'GET'} ${address}`)
    if (server.away) throw new TypeError('network away')
    const reading = address.match(/\/readings\/(.+)$/)?.[1]
    const others = server.trace.readings.filter((one) => one.id !== reading)
    if (reading && init.method === 'PUT')
      server.trace = { ...server.trace, readings: [...others, JSON.parse(String(init.body))] }
    if (reading && init.method === 'DELETE') server.trace = { ...server.trace, readings: others }
    if (address.endsWith('/cautions'))
      server.trace = { ...server.trace, cautionsAnsweredAt: '2026-12-01T09:05:00.000Z' }
    return new Response(JSON.stringify(server.trace), { status: 200 })
  })
  return server
}

function show(trace: Trace) {
  const client = new QueryClient({ defaultOptions: { queries: { retry: false, staleTime: 60_000 } } })
  return render(
    <QueryClientProvider client={client}>
      <TraceScreen initial={trace} />
    </QueryClientProvider>,
  )
}

const meter = () => screen.getByRole('textbox', { name: /^Meter/ })
const nextCard = async () => within(await screen.findByRole('region', { name: 'Next split' }))

beforeEach(() => {
  vi.stubGlobal('Worker', SameThreadWorker)
  localStorage.clear()
})
afterEach(() => vi.unstubAllGlobals())

describe('a trace on screen', () => {
  it('shows a dash until the evaluator has answered, then every place and the next split', async () => {
    serve(makeTrace())
    show(makeTrace())
    expect(screen.getByText('-', { selector: 'output' })).toBeInTheDocument()
    await nextCard()
    const all = evaluate({ circuit, readings: [], codes: [], priors: 'trade' }).sites.length
    expect(screen.getByText(String(all), { selector: 'output' })).toBeInTheDocument()
  })

  it('says quietly how far an answer has come that takes its time, and no more once it is there', async () => {
    const threads: SlowWorker[] = []
    class SlowWorker extends SameThreadWorker {
      private readonly asked: Asked[] = []
      constructor() {
        super()
        threads.push(this)
      }
      override postMessage(asked: Asked) {
        this.asked.push(asked)
        const progress = { stage: 'planning', done: 3, of: 8 }
        setTimeout(() => this.onmessage?.({ data: { number: asked.number, progress } } as MessageEvent), 0)
      }
      finish() {
        for (const asked of this.asked) super.postMessage(asked)
      }
    }
    vi.stubGlobal('Worker', SlowWorker)
    serve(makeTrace())
    show(makeTrace())
    expect(await screen.findByText('Next split: 37 %')).toBeInTheDocument()
    for (const thread of threads) thread.finish()
    await nextCard()
    expect(screen.queryByText(/37 %/)).not.toBeInTheDocument()
  })

  it('takes digits typed anywhere, lights the outcome they fall in, and logs the reading', async () => {
    const person = userEvent.setup()
    const server = serve(makeTrace())
    show(makeTrace())
    const card = await nextCard()
    await person.click(card.getByRole('button', { name: 'Set the meter for this' }))
    expect(card.getByText('The meter is set for this')).toBeInTheDocument()
    const [first] = evaluate({ circuit, readings: [], codes: makeTrace().codes, priors: 'trade' }).next
    const [outcome] = first?.outcomes.filter((one) => one.low !== undefined) ?? []
    const value = Math.max(0, ((outcome?.low ?? 0) + (outcome?.high ?? 0)) / 2).toFixed(2)
    await person.keyboard(value)
    expect(meter()).toHaveValue(value)
    expect(card.getByText(outcome?.about ?? '').closest('li')).toHaveAttribute('data-lit', 'true')
    await person.keyboard('{Enter}')
    await waitFor(() => expect(server.trace.readings).toHaveLength(1))
    expect(server.trace.readings[0]).toMatchObject({
      kind: first?.kind,
      red: first?.red,
      value: Number(value),
      condition: first?.condition,
    })
    expect((await screen.findAllByText(/^Saved \d\d:\d\d$/)).length).toBeGreaterThan(0)
    expect(meter()).toHaveValue('')
  })

  it('puts the leads on two points that are pressed on the sheet', async () => {
    const person = userEvent.setup()
    serve(makeTrace())
    show(makeTrace())
    const points = within(screen.getByRole('group', { name: 'Points of the circuit' })).getAllByRole('button')
    points[0]?.focus()
    await person.keyboard('{Enter}')
    await person.keyboard(']')
    await person.keyboard('{Enter}')
    const names = points.slice(0, 2).map((point) => point.getAttribute('aria-label') ?? '')
    expect(screen.getByRole('button', { name: new RegExp(`Red lead.*${names[0]}`) })).toBeInTheDocument()
    expect(screen.getByRole('button', { name: new RegExp(`Black lead.*${names[1]}`) })).toBeInTheDocument()
  })

  it('refuses a slipped decimal point in words and keeps what was typed', async () => {
    const person = userEvent.setup()
    const server = serve(makeTrace())
    show(makeTrace())
    const points = within(screen.getByRole('group', { name: 'Points of the circuit' })).getAllByRole('button')
    points[0]?.focus()
    await person.keyboard('{Enter}')
    await person.type(meter(), '124.5{Enter}')
    expect(await screen.findByText(/124.5 is above this circuit's 12.6. Was it 12.45/)).toBeInTheDocument()
    expect(meter()).toHaveValue('124.5')
    expect(server.trace.readings).toHaveLength(0)
    await person.click(screen.getByRole('button', { name: 'Use 12.45' }))
    expect(meter()).toHaveValue('12.45')
  })

  it('keeps readings on the tablet while the network is away, says so, and shows them after a reload', async () => {
    const person = userEvent.setup()
    const server = serve(makeTrace())
    server.away = true
    const first = show(makeTrace())
    const points = within(screen.getByRole('group', { name: 'Points of the circuit' })).getAllByRole('button')
    points[0]?.focus()
    await person.keyboard('{Enter}')
    await person.type(meter(), '12.5{Enter}')
    expect((await screen.findAllByText('Offline, 1 reading kept on this tablet')).length).toBeGreaterThan(0)
    first.unmount()
    show(makeTrace())
    expect((await screen.findAllByText('R1')).length).toBeGreaterThan(0)
    server.away = false
    window.dispatchEvent(new Event('online'))
    await waitFor(() => expect(server.trace.readings).toHaveLength(1))
    expect((await screen.findAllByText(/^Saved/)).length).toBeGreaterThan(0)
  })

  it('undoes the last reading and redoes it', async () => {
    const person = userEvent.setup()
    const server = serve(makeTrace())
    show(makeTrace())
    const points = within(screen.getByRole('group', { name: 'Points of the circuit' })).getAllByRole('button')
    points[0]?.focus()
    await person.keyboard('{Enter}')
    await person.type(meter(), '12.5{Enter}')
    await waitFor(() => expect(server.trace.readings).toHaveLength(1))
    await person.click(screen.getByRole('button', { name: 'Undo last' }))
    await waitFor(() => expect(server.trace.readings).toHaveLength(0))
    await person.click(screen.getByRole('button', { name: 'Redo' }))
    await waitFor(() => expect(server.trace.readings).toHaveLength(1))
  })

  it('wants the cautions answered before the first reading', async () => {
    const person = userEvent.setup()
    const careful = { ...circuit, cautions: ['airbag' as const] }
    const trace = makeTrace({ circuit: { ...makeTrace().circuit, document: careful } })
    const server = serve(trace)
    HTMLDialogElement.prototype.showModal ??= function (this: HTMLDialogElement) {
      this.open = true
    }
    HTMLDialogElement.prototype.close ??= function (this: HTMLDialogElement) {
      this.open = false
    }
    show(trace)
    expect(await screen.findByText(/Never put a meter on an igniter/)).toBeInTheDocument()
    await person.click(screen.getByRole('button', { name: 'This is done and held to' }))
    await waitFor(() => expect(server.trace.cautionsAnsweredAt).not.toBeNull())
  })

  const withDialogs = () => {
    HTMLDialogElement.prototype.showModal ??= function (this: HTMLDialogElement) {
      this.open = true
    }
    HTMLDialogElement.prototype.close ??= function (this: HTMLDialogElement) {
      this.open = false
    }
  }

  it('notes what a module reports of its input', async () => {
    withDialogs()
    const person = userEvent.setup()
    const server = serve(makeTrace())
    show(makeTrace())
    await person.click(screen.getByRole('radio', { name: 'Sees' }))
    await person.click(screen.getByRole('button', { name: /The module reports its input/ }))
    const list = within(await screen.findByRole('dialog', { name: 'Which input of a module' }))
    await person.click(list.getByRole('button', { name: 'Body module pin 5' }))
    await person.click(screen.getByRole('radio', { name: 'Low' }))
    await person.click(screen.getByRole('button', { name: 'Enter reading' }))
    await waitFor(() => expect(server.trace.readings).toHaveLength(1))
    expect(server.trace.readings[0]).toMatchObject({ kind: 'sees', pin: 'body.5', value: 'low' })
  })

  it('takes still, least and most of a reading while the harness is moved, and asks for the one that is missing', async () => {
    const person = userEvent.setup()
    const server = serve(makeTrace())
    show(makeTrace())
    const points = within(screen.getByRole('group', { name: 'Points of the circuit' })).getAllByRole('button')
    points[0]?.focus()
    await person.keyboard('{Enter}')
    await person.click(screen.getByRole('button', { name: 'Harness still' }))
    await person.type(meter(), '12.5{Enter}')
    expect(await screen.findByText(/Type the least that the meter showed/)).toBeInTheDocument()
    expect(screen.getByRole('radio', { name: 'Least, not typed yet' })).toBeChecked()
    await person.type(meter(), '0.2')
    await person.click(screen.getByRole('radio', { name: 'Most, not typed yet' }))
    await person.type(meter(), '12.5{Enter}')
    await waitFor(() => expect(server.trace.readings).toHaveLength(1))
    expect(server.trace.readings[0]).toMatchObject({ value: 12.5, moved: true, low: 0.2, high: 12.5 })
    expect((await screen.findAllByText('moved 0.20 to 12.50')).length).toBeGreaterThan(0)
    expect(screen.getByRole('button', { name: 'Harness still' })).toHaveAttribute('aria-pressed', 'false')
  })

  it('puts a test lamp in for a reading, in its condition and in its words', async () => {
    withDialogs()
    const person = userEvent.setup()
    const server = serve(makeTrace())
    show(makeTrace())
    await person.click(screen.getByRole('button', { name: 'Put in nothing' }))
    const dialog = within(await screen.findByRole('dialog', { name: 'Put in for this reading' }))
    expect(dialog.getByText(/service information comes first/)).toBeInTheDocument()
    await person.click(dialog.getByRole('button', { name: 'Put it in' }))
    expect(dialog.getByText('Pick both ends first.')).toBeInTheDocument()
    await person.click(dialog.getByRole('radio', { name: 'Test lamp' }))
    for (const [end, title, point] of [
      [/^From/, 'From which point', /^F11 out/],
      [/^To/, 'To which point', /^chassis/],
    ] as const) {
      await person.click(dialog.getByRole('button', { name: end }))
      const list = within(await screen.findByRole('dialog', { name: title }))
      await person.click(list.getByRole('button', { name: point }))
    }
    await person.click(dialog.getByRole('button', { name: 'Put it in' }))
    expect(dialog.getByText('Test lamp from F11 out to chassis')).toBeInTheDocument()
    await person.click(dialog.getByRole('button', { name: 'Done' }))
    expect(screen.getByRole('button', { name: 'Put in test lamp' })).toBeInTheDocument()
    const points = within(screen.getByRole('group', { name: 'Points of the circuit' })).getAllByRole('button')
    points[0]?.focus()
    await person.keyboard('{Enter}')
    await person.type(meter(), '12.1{Enter}')
    await waitFor(() => expect(server.trace.readings).toHaveLength(1))
    expect(server.trace.readings[0]!.condition.added).toEqual([{ from: 'f11.out', to: 'chassis', ohms: 48 }])
    expect((await screen.findAllByText(/test lamp from F11 out to chassis/)).length).toBeGreaterThan(0)
  })
})
