import { render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test, vi } from 'vitest'
import { ActorProvider, type ActorView } from '@/components/shell/actor-context'
import { ModeSwitch } from '@/components/shell/mode-switch'
import { RunningHead } from '@/components/shell/running-head'
import { themeKey } from '@/components/shell/theme'
import type { ChooseMembership } from '@/lib/shared/api/account'
import { succeed } from '@/lib/shared/result'

const actor: ActorView = {
  name: 'Noor Aske',
  email: 'noor@shop.example',
  role: 'technician',
  organisation: { id: 'o1', name: 'Wrenfield depot' },
  memberships: [
    { organisationId: 'o1', organisation: 'Wrenfield depot', role: 'technician' },
    { organisationId: 'o2', organisation: 'Harrow Lane school', role: 'student' },
  ],
}

test('only places that work stand in the head, and the one in use is marked', () => {
  render(<RunningHead />)
  const links = within(screen.getByRole('navigation', { name: 'Places' })).getAllByRole('link')
  expect(links.map((link) => link.textContent)).toEqual(['Circuits'])
  expect(links[0]).toHaveAttribute('aria-current', 'page')
})

test('with a circuit open the head names it, its vehicle and its code, and leads back', () => {
  render(
    <RunningHead
      circuit={{ title: 'Step lamp', vehicle: 'Example van', code: 'B1234-14' }}
      saved="Saved 14:02"
      modes={
        <ModeSwitch
          current="trace"
          modes={[
            { id: 'operate', label: 'Operate', href: '/circuits/c1' },
            { id: 'trace', label: 'Trace', href: '/circuits/c1/trace' },
          ]}
        />
      }
    />,
  )
  expect(screen.getByRole('heading', { level: 1, name: 'Step lamp' })).toBeInTheDocument()
  expect(screen.getByText('Example van')).toBeInTheDocument()
  expect(screen.getByText('B1234-14')).toBeInTheDocument()
  expect(screen.getByRole('link', { name: 'Back to Circuits' })).toHaveAttribute('href', '/circuits')
  expect(screen.getAllByText('Saved 14:02').length).toBeGreaterThan(0)
  expect(screen.getAllByRole('link', { name: 'Trace' })[0]).toHaveAttribute('aria-current', 'page')
})

test("the shop's name opens who is signed in, in which role, and Escape closes it again", async () => {
  render(
    <ActorProvider actor={actor}>
      <RunningHead />
    </ActorProvider>,
  )
  const opener = screen.getByRole('button', { name: 'Wrenfield depot' })
  await userEvent.click(opener)
  expect(screen.getByText('Noor Aske')).toBeVisible()
  expect(screen.getByText('Technician at Wrenfield depot')).toBeVisible()
  expect(screen.getByRole('button', { name: 'Sign out' })).toBeVisible()
  await userEvent.keyboard('{Escape}')
  expect(screen.getByText('Noor Aske')).not.toBeVisible()
  expect(opener).toHaveFocus()
})

test('the other shop of a person is offered and can be gone to', async () => {
  const choose = vi.fn(async (_input: ChooseMembership) => succeed(null))
  render(
    <ActorProvider actor={actor} choose={choose}>
      <RunningHead />
    </ActorProvider>,
  )
  await userEvent.click(screen.getByRole('button', { name: 'Wrenfield depot' }))
  await userEvent.click(screen.getByRole('button', { name: 'Harrow Lane school' }))
  expect(choose).toHaveBeenCalledWith({ organisationId: 'o2' })
})

test('light, dark or as the device: the choice is kept on the device', async () => {
  localStorage.clear()
  render(
    <ActorProvider actor={actor}>
      <RunningHead />
    </ActorProvider>,
  )
  await userEvent.click(screen.getByRole('button', { name: 'Wrenfield depot' }))
  expect(screen.getByRole('radio', { name: 'As device' })).toBeChecked()
  await userEvent.click(screen.getByRole('radio', { name: 'Dark' }))
  expect(localStorage.getItem(themeKey)).toBe('dark')
  await userEvent.click(screen.getByRole('radio', { name: 'As device' }))
  expect(localStorage.getItem(themeKey)).toBeNull()
})
