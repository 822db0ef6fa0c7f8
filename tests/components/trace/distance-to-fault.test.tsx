import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it } from 'vitest'
import { DistanceToFault } from '@/components/trace/distance/distance-to-fault'
import { distanceProbes } from '@/diagrams/distance-to-fault'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Answer } from '@/diagrams/faults/answer'
import { samples } from '@/diagrams/samples/all-samples'
import { conductorOhms } from '@/diagrams/distance/wire-resistance'

const circuit = samples[0] as Circuit
/** One between two connectors. */
const wire = circuit.wires.find(
  (one) => distanceProbes(circuit, one.id)[0]?.condition.unplugged.length === 2,
)!
const wholeOhms = wire.ohms ?? conductorOhms(0.01724, wire.length, wire.mm2)

function located(mode: 'short-to-ground' | 'open'): Answer {
  return {
    outcome: 'located',
    noFault: 0,
    sites: [
      {
        site: `wire:${wire.id}`,
        verdict: 'faulty',
        firm: false,
        clearedBy: [],
        says: '',
        probability: 1,
        modes: [{ mode, probability: 1, ohms: null, other: null, blows: [] }],
      },
    ],
    readings: [],
    next: [],
    inseparable: [],
    says: '',
  }
}

async function open(readings: Reading[] = []) {
  render(<DistanceToFault circuit={circuit} readings={readings} answer={located('short-to-ground')} />)
  const person = userEvent.setup()
  await person.click(screen.getByRole('button', { name: 'Distance to the fault' }))
  return person
}

beforeEach(() => {
  // jsdom draws no dialogs: it knows the element, not its opening.
  HTMLDialogElement.prototype.showModal = function () {
    this.open = true
  }
  HTMLDialogElement.prototype.close = function () {
    this.open = false
  }
})

describe('distance to the fault on screen', () => {
  it('is offered where a wire is shorted, and nowhere else', () => {
    const { container } = render(<DistanceToFault circuit={circuit} readings={[]} answer={located('open')} />)
    expect(container).toBeEmptyDOMElement()
  })

  it('says the place from ohms typed at both ends', async () => {
    const person = await open()
    const [near, far] = screen.getAllByRole('textbox')
    await person.type(near!, (0.25 * wholeOhms + 2).toFixed(4))
    expect(screen.getByRole('status')).toHaveTextContent(/One reading in ohms leaves|at most/)
    await person.type(far!, (0.75 * wholeOhms + 2).toFixed(4))
    expect(screen.getByRole('status')).toHaveTextContent(/do not say where the short lies/)
    const good = screen.getByRole('textbox', { name: 'The meter is good to' })
    await person.clear(good)
    await person.type(good, '0')
    expect(screen.getByRole('status')).toHaveTextContent(
      new RegExp(`^The short lies ${(0.25 * wire.length).toFixed(2)} m from .*, give or take `),
    )
  })

  it('says it from millivolts at a current, and takes a comma for the point', async () => {
    const person = await open()
    await person.click(screen.getByRole('radio', { name: 'Millivolts at a current' }))
    const [near, amps] = screen.getAllByRole('textbox')
    await person.type(near!, (0.4 * wholeOhms * 3 * 1000).toFixed(1).replace('.', ','))
    await person.type(amps!, '3')
    expect(screen.getByRole('status')).toHaveTextContent(
      new RegExp(`^The short lies ${(0.4 * wire.length).toFixed(2)} m from .*, give or take `),
    )
  })

  it('marks what is no figure and keeps it as it was typed', async () => {
    const person = await open()
    const [near] = screen.getAllByRole('textbox')
    await person.type(near!, '3..4')
    expect(near).toHaveValue('3..4')
    expect(near).toHaveAccessibleDescription('A figure, such as 3.4')
    expect(screen.getByRole('status')).toHaveTextContent('Type what the meter shows.')
  })

  it("uses the trace's own readings where they say it", async () => {
    const probes = distanceProbes(circuit, wire.id)
    const values = [0.5 * wholeOhms + 1, 0.5 * wholeOhms + 1, wholeOhms]
    const readings = probes.map(
      (probe, i) =>
        ({ id: `x${i}`, ...probe, value: values[i], accuracy: { percent: 0, floor: 0.001 } }) as Reading,
    )
    await open(readings)
    expect(screen.getByText(/^The short lies .* By R1, R2, R3 of this trace\.$/)).toBeInTheDocument()
  })
})
