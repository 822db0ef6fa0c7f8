import { render, screen, within } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { VerdictCard } from '@/components/trace/verdict-card'
import { evaluate } from '@/diagrams/evaluate'
import type { Answer } from '@/diagrams/faults/answer'
import { samples } from '@/diagrams/samples/all-samples'

const circuit = samples.find((sample) => sample.title === 'Load space lamp request')!
const unread = evaluate({ circuit, readings: [], codes: [], priors: 'trade' })

describe('the verdict', () => {
  it('on two faults letters them and names the readings that speak of each', () => {
    const answer: Answer = {
      ...unread,
      outcome: 'two-faults',
      pairs: [
        {
          sites: ['wire:w6', 'part:g1'],
          modes: ['open', 'resistive'],
          ohms: [null, 1.8],
          readings: [['R1', 'R2'], ['R4']],
          probability: 0.97,
        },
      ],
      says: 'Two faults. A: Open. B: Bad joint. No single fault gives these readings together.',
    }
    render(<VerdictCard circuit={circuit} answer={answer} />)
    expect(screen.getByRole('heading', { name: 'Two faults' })).toBeInTheDocument()
    const [a, b] = screen.getAllByRole('listitem')
    expect(within(a!).getByText('A')).toBeInTheDocument()
    expect(within(a!).getByText(/^Open in wire/)).toBeInTheDocument()
    expect(within(a!).getByText('R1, R2')).toBeInTheDocument()
    expect(within(b!).getByText('Bad joint at G1: about 1.8 ohm')).toBeInTheDocument()
    expect(within(b!).getByText('R4')).toBeInTheDocument()
  })

  it('on places that cannot be told apart brackets them once and keeps what would separate them', () => {
    const group = ['pin:body.5', 'contact:body.5']
    const answer: Answer = {
      ...unread,
      outcome: 'located',
      sites: unread.sites
        .filter((site) => group.includes(site.site))
        .map((site) => ({ ...site, verdict: 'faulty' as const })),
      inseparable: [group],
      says: 'Open at Body module pin 5. 12.5 V goes in. Body module pin 5 and contact at Body module pin 5 look the same from outside and cannot be told apart by any reading. Look at the contact first.',
    }
    render(<VerdictCard circuit={circuit} answer={answer} />)
    expect(screen.getAllByText(/cannot be told apart/)).toHaveLength(1)
    expect(screen.getByText(/12\.5 V goes in\. Look at the contact first\./)).toBeInTheDocument()
  })
})
