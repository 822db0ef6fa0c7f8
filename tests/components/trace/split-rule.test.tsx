import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { describe, expect, it, vi } from 'vitest'
import { SplitRule } from '@/components/trace/rule/split-rule'
import { restCondition } from '@/diagrams/document/condition-schema'
import { pathOrder } from '@/diagrams/drawing/path-order'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { samples } from '@/diagrams/samples/all-samples'

const circuit = samples[0] as (typeof samples)[number]
const unread = evaluate({ circuit, readings: [], codes: [], priors: 'trade' })
const legs = pathOrder(circuit, new Map())
const order = legs.flatMap((leg) => leg.sites)

/** The answer with these places left and all others proved good. */
function left(sites: string[], verdict: 'faulty' | 'in-question' = 'in-question'): Answer {
  return {
    ...unread,
    outcome: verdict === 'faulty' ? 'located' : 'narrowed',
    sites: unread.sites.map((one) => ({
      ...one,
      verdict: sites.includes(one.site) ? verdict : 'proved-good',
      probability: sites.includes(one.site) ? 1 / sites.length : 0,
      clearedBy: sites.includes(one.site) ? [] : ['R1'],
    })),
  }
}

function show(answer: Answer, started: boolean, outcomes: Answer['next'][number]['outcomes'] = []) {
  const onPlace = vi.fn()
  const next = {
    kind: 'volts' as const,
    red: 'x.y',
    black: 'chassis',
    condition: restCondition,
    bits: 1,
    minutes: 2,
  }
  render(
    <SplitRule
      circuit={circuit}
      legs={legs}
      answer={answer}
      started={started}
      next={outcomes.length > 0 ? { ...next, outcomes, says: '' } : null}
      nextTitle="C12 cavity 3"
      onPlace={onPlace}
    />,
  )
  return onPlace
}

describe('the split rule on screen', () => {
  it('names every place left and speaks its verdict', async () => {
    const three = order.slice(4, 7)
    const onPlace = show(left(three), true)
    const cells = three.map((site) => document.querySelector(`[data-site="${site}"]`))
    expect(cells.map((cell) => cell?.getAttribute('aria-label'))).toEqual(
      three.map(() => expect.stringMatching(/, in question$/)),
    )
    await userEvent.click(cells[1] as Element)
    expect(onPlace).toHaveBeenCalledWith(three[1])
  })

  it('tells legs apart that end in the same part, so that none leaves a stale copy behind', () => {
    const sender = samples.find((one) => one.title === 'Fuel level sender') as (typeof samples)[number]
    const own = pathOrder(sender, new Map())
    expect(new Set(own.map((leg) => leg.name)).size).toBeLessThan(own.length)
    const complaints = vi.spyOn(console, 'error').mockImplementation(() => undefined)
    const answer = evaluate({ circuit: sender, readings: [], codes: [], priors: 'trade' })
    render(
      <SplitRule
        circuit={sender}
        legs={own}
        answer={answer}
        started={false}
        next={null}
        nextTitle=""
        onPlace={() => undefined}
      />,
    )
    expect(complaints.mock.calls.filter(([words]) => String(words).includes('same key'))).toEqual([])
    complaints.mockRestore()
  })

  it('tells how many places a run has proved good, without their names', () => {
    show(left(order.slice(4, 7)), true)
    const runs = screen.getAllByRole('button', { name: /proved good$/ })
    const counted = runs.reduce(
      (sum, run) => sum + Number.parseInt(run.getAttribute('aria-label') ?? '0', 10),
      0,
    )
    expect(counted).toBe(order.length - 3)
  })

  it('marks the cut and what each side of it would mean', () => {
    const three = order.slice(4, 7)
    show(left(three), true, [
      { about: '12.6 V', probability: 0.5, leaves: three.slice(2) },
      { about: '0 V', probability: 0.5, leaves: three.slice(0, 2) },
    ])
    expect(screen.getByText('Next split: C12 cavity 3')).toBeInTheDocument()
    expect(screen.getByText(/0 V: .*in these 2/)).toBeInTheDocument()
    expect(screen.getByText(/12.6 V: .*in these 1/)).toBeInTheDocument()
  })

  it('says place and mode of the faulty one', () => {
    const [site] = order.filter((one) => one.startsWith('wire:'))
    show(left([site ?? ''], 'faulty'), true)
    expect(document.querySelector(`[data-site="${site}"]`)?.getAttribute('aria-label')).toMatch(/, faulty, /)
  })

  it('judges nothing before the first reading', () => {
    show(unread, false)
    expect(screen.queryAllByRole('button', { name: /in question|proved good|faulty/ })).toEqual([])
    expect(screen.getAllByRole('button', { name: /not judged yet$/ }).length).toBeGreaterThan(0)
  })
})
