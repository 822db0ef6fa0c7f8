import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, expect, test, vi } from 'vitest'
import { SignInForm } from '@/components/account/sign-in-form'
import { errors } from '@/lib/shared/errors'

/** The server as the form meets it: what was sent, and what it answers. */
const server = vi.hoisted(() => ({
  sent: [] as unknown[][],
  answer: (): Promise<unknown> => Promise.resolve(undefined),
}))
vi.mock('next-auth/react', () => ({
  signIn: (...sent: unknown[]) => {
    server.sent.push(sent)
    return server.answer()
  },
}))
beforeEach(() => {
  server.sent = []
})

async function fill(email: string, password: string) {
  if (email) await userEvent.type(screen.getByLabelText('E-mail'), email)
  if (password) await userEvent.type(screen.getByLabelText('Password'), password)
  await userEvent.click(screen.getByRole('button', { name: 'Sign in' }))
}

test('with address and password one is signed in', async () => {
  server.answer = () => Promise.resolve({ ok: true, error: null })
  const onSignedIn = vi.fn()
  render(<SignInForm onSignedIn={onSignedIn} />)
  await fill('noor@shop.example', 'a long enough one')
  expect(onSignedIn).toHaveBeenCalledOnce()
  expect(server.sent).toEqual([
    [
      'credentials',
      {
        email: 'noor@shop.example',
        password: 'a long enough one',
        redirect: false,
      },
    ],
  ])
})

test('an empty form says what each field needs, and focus goes to the first', async () => {
  render(<SignInForm onSignedIn={() => expect.unreachable()} />)
  await fill('', '')
  expect(screen.getByLabelText('E-mail')).toHaveAccessibleDescription(
    'Expected an address such as name@shop.example.',
  )
  expect(screen.getByLabelText('Password')).toHaveAccessibleDescription('Type the password.')
  expect(screen.getByLabelText('E-mail')).toHaveFocus()
  expect(server.sent).toEqual([])
})

test.each(['wrong-sign-in', 'too-many-attempts', 'database-away'] as const)(
  'when the server answers %s, its sentence is shown and what was typed stays',
  async (code) => {
    server.answer = () => Promise.resolve({ ok: false, error: code })
    render(<SignInForm onSignedIn={() => expect.unreachable()} />)
    await fill('noor@shop.example', 'not the right one')
    expect(await screen.findByRole('alert')).toHaveTextContent(errors[code].sentence)
    expect(screen.getByLabelText('E-mail')).toHaveValue('noor@shop.example')
    expect(screen.getByLabelText('Password')).toHaveValue('not the right one')
  },
)

test('a server that does not answer is said so', async () => {
  server.answer = () => Promise.reject(new TypeError('no network'))
  render(<SignInForm onSignedIn={() => expect.unreachable()} />)
  await fill('noor@shop.example', 'a long enough one')
  expect(await screen.findByRole('alert')).toHaveTextContent('The server did not answer.')
})

test('sent before the page has woken up, the form does not put the password into the address', () => {
  const { container } = render(<SignInForm onSignedIn={() => undefined} />)
  expect(container.querySelector('form')).toHaveAttribute('method', 'post')
})
