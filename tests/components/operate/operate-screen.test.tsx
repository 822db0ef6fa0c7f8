import { configure, render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { describe, expect, it } from 'vitest'
import { OperateScreen } from '@/components/operate/operate-screen'
import { restCondition } from '@/diagrams/document/condition-schema'
import { pointName } from '@/diagrams/document/points'
import { samples } from '@/diagrams/samples/all-samples'
import { solveOperatingPoint } from '@/diagrams/solver/operating-point'

configure({ asyncUtilTimeout: 10_000 })

const circuit = samples[0] as (typeof samples)[number]
const [control] = circuit.controls
const turned = control?.positions.find((position) => position !== control.rest) ?? ''
const solved = (controls: Record<string, string>) => {
  const point = solveOperatingPoint(circuit, { ...restCondition, controls })
  if (!point.ok) throw new Error(point.problem.message)
  return point.value
}
const before = solved({})
const after = solved({ [control?.id ?? '']: turned })
const moved = [...after.volts].find(
  ([point, volts]) => !point.endsWith(':part') && Math.abs(volts - (before.volts.get(point) ?? volts)) > 1,
)?.[0]

const rowOf = (point: string) =>
  within(screen.getByRole('region', { name: 'Points, volts' })).getByRole('button', {
    name: new RegExp(`^${pointName(circuit, point)}`),
  })

describe('operating a circuit', () => {
  it('shows the volts of every point and, once a control is turned, those before beside them', async () => {
    const person = userEvent.setup()
    render(<OperateScreen circuitId="c" circuit={circuit} />)
    expect(moved).toBeDefined()
    const point = moved ?? ''
    expect(rowOf(point)).toHaveTextContent((before.volts.get(point) ?? 0).toFixed(1))
    await person.click(
      within(screen.getByRole('group', { name: control?.label })).getByRole('radio', { name: turned }),
    )
    const row = rowOf(point)
    expect(row).toHaveTextContent((after.volts.get(point) ?? 0).toFixed(1))
    expect(row).toHaveTextContent((before.volts.get(point) ?? 0).toFixed(1))
    expect(screen.getByText(`${control?.label} ${control?.rest}`)).toBeInTheDocument()
  })

  it('puts a meter between two points that are tapped', async () => {
    const person = userEvent.setup()
    render(<OperateScreen circuitId="c" circuit={circuit} />)
    const fed = [...before.volts].find(([point, volts]) => point.includes('.') && volts > 12)?.[0] ?? ''
    await person.click(rowOf(fed))
    const readout = within(screen.getByRole('region', { name: 'Points, volts' }))
    expect(readout.getByText(/^12\.\d\d V$/)).toBeInTheDocument()
  })

  it('takes the volts away from what a pulled fuse feeds', async () => {
    const person = userEvent.setup()
    render(<OperateScreen circuitId="c" circuit={circuit} />)
    const fuse = circuit.nodes.find((node) => node.kind === 'fuse')
    const fed = `${fuse?.id}.out`
    expect(Number(before.volts.get(fed))).toBeGreaterThan(12)
    HTMLDialogElement.prototype.showModal ??= function (this: HTMLDialogElement) {
      this.open = true
    }
    HTMLDialogElement.prototype.close ??= function (this: HTMLDialogElement) {
      this.open = false
    }
    await person.click(screen.getByRole('button', { name: /^Unplug/ }))
    await person.click(
      within(screen.getByRole('group', { name: fuse?.label })).getByRole('radio', { name: 'Out' }),
    )
    // Now, and before it was pulled.
    expect(rowOf(fed)).toHaveTextContent(/out0\.012\.6$/)
  })
})
