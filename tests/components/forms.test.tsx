import { act, fireEvent, render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, test, vi } from 'vitest'
import { KitForm } from '@/components/account/kit-form'
import { PasswordForm } from '@/components/account/password-form'
import { SignInForm } from '@/components/account/sign-in-form'
import type { ActionResult } from '@/server/contract/errors'
import { descriptionOf, valueOf } from '../support/reading'

type Action = (before: ActionResult | null, form: FormData) => Promise<ActionResult>

const actions = vi.hoisted(() => ({
  signIn: vi.fn<Action>(),
  changePassword: vi.fn<Action>(),
  saveOwnKit: vi.fn<Action>(),
}))
vi.mock('@/server/actions/account', () => actions)
vi.mock('@/server/actions/kit', () => actions)

/** An answer of the server that comes when the test says so. */
function answerLater(action: { mockImplementationOnce: (work: Action) => unknown }) {
  let give: (result: ActionResult) => void = () => undefined
  action.mockImplementationOnce(
    () =>
      new Promise<ActionResult>((resolve) => {
        give = resolve
      }),
  )
  return async (result: ActionResult) => act(async () => give(result))
}

const REFUSED: ActionResult = {
  ok: false,
  message: 'E-mail and password do not belong together.',
}

beforeEach(() => {
  for (const action of Object.values(actions)) action.mockReset()
})

describe('a form', () => {
  test('says what is wrong beside the field, and the first wrong one has the focus', async () => {
    actions.signIn.mockResolvedValueOnce({
      ok: false,
      message: 'Two things are needed.',
      fields: { email: 'Give your e-mail address.', password: 'Give your password.' },
    })
    render(<SignInForm next={null} />)
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }))
    const email = screen.getByLabelText('E-mail')
    await waitFor(() => expect(document.activeElement).toBe(email))
    expect(descriptionOf(email)).toBe('Give your e-mail address.')
    expect(email.getAttribute('aria-invalid')).toBe('true')
    expect(descriptionOf(screen.getByLabelText('Password'))).toBe('Give your password.')
    expect(screen.getByRole('alert').textContent).toBe('Not done: Two things are needed.')
  })

  test('gives the focus to the sentence above it where no single field is wrong', async () => {
    actions.signIn.mockResolvedValueOnce(REFUSED)
    render(<SignInForm next={null} />)
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }))
    await waitFor(() => expect(document.activeElement).toBe(screen.getByRole('alert')))
    expect(screen.getByRole('alert').textContent).toBe(
      'Not done: E-mail and password do not belong together.',
    )
  })

  test('keeps what was typed when it comes back', async () => {
    actions.signIn.mockResolvedValueOnce(REFUSED)
    render(<SignInForm next="/tally" />)
    await userEvent.type(screen.getByLabelText('E-mail'), 'agnes@thorsby.example')
    await userEvent.type(screen.getByLabelText('Password'), 'not the password')
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }))
    await screen.findByText(/do not belong together/)
    expect(valueOf(screen.getByLabelText('E-mail'))).toBe('agnes@thorsby.example')
    expect(valueOf(screen.getByLabelText('Password'))).toBe('not the password')
    const sent = actions.signIn.mock.calls[0]?.[1]
    expect(Object.fromEntries(sent ?? [])).toEqual({
      email: 'agnes@thorsby.example',
      password: 'not the password',
      next: '/tally',
    })
  })

  test('is on its way once at most, says so, and can be sent again after its answer', async () => {
    const answer = answerLater(actions.signIn)
    const { container } = render(<SignInForm next={null} />)
    await userEvent.type(screen.getByLabelText('E-mail'), 'agnes@thorsby.example')
    await userEvent.type(screen.getByLabelText('Password'), 'harbour{Enter}')
    const button = screen.getByRole('button', { name: 'Signing in' })
    expect(button.getAttribute('aria-disabled')).toBe('true')
    await userEvent.click(button)
    const form = container.querySelector('form')
    if (form) fireEvent.submit(form)
    expect(actions.signIn).toHaveBeenCalledTimes(1)
    await answer(REFUSED)
    expect(screen.getByRole('button', { name: 'Sign in' }).getAttribute('aria-disabled')).toBe(
      'false',
    )
    actions.signIn.mockResolvedValueOnce(REFUSED)
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }))
    expect(actions.signIn).toHaveBeenCalledTimes(2)
  })

  test('sent before its script runs would be posted: nothing typed lands in the address', () => {
    const { container } = render(<SignInForm next={null} />)
    // React gives a form with an action of its own no address to go to; without one it would be this page's.
    expect(container.querySelector('form')?.getAttribute('action')).toMatch(/^javascript:throw/)
  })
})

test('a password can be shown and hidden again, by a button that names it', async () => {
  render(<SignInForm next={null} />)
  const password = screen.getByLabelText('Password')
  expect(password.getAttribute('type')).toBe('password')
  await userEvent.click(screen.getByRole('button', { name: 'Show password' }))
  expect(password.getAttribute('type')).toBe('text')
  await userEvent.click(screen.getByRole('button', { name: 'Hide password' }))
  expect(password.getAttribute('type')).toBe('password')
})

test('a changed password is said and no password stays in the fields', async () => {
  actions.changePassword.mockResolvedValueOnce({ ok: true, value: undefined })
  render(<PasswordForm email="agnes@thorsby.example" />)
  const fields = ['Present password', 'New password', 'New password once more']
  for (const label of fields) await userEvent.type(screen.getByLabelText(label), 'a few words here')
  await userEvent.click(screen.getByRole('button', { name: 'Change password' }))
  expect((await screen.findByRole('status')).textContent).toBe(
    'Done: Your password is changed. Other browsers are signed out.',
  )
  await waitFor(() => {
    for (const label of fields) expect(valueOf(screen.getByLabelText(label))).toBe('')
  })
})

describe('own kit', () => {
  const line = (item: string) => {
    const row = screen.getByText(item).closest('li')
    if (!row) throw new Error(`There is no line for ${item}.`)
    return within(row)
  }

  test('counts up and down, never below none, and keeps the focus at its end', async () => {
    render(<KitForm kit={{ dumbbell: 1 }} weights={{}} />)
    const less = line('Dumbbells').getByRole('button', { name: 'One less: Dumbbells' })
    await userEvent.click(less)
    expect(line('Dumbbells').getByRole('status').textContent).toBe('0')
    expect(less.getAttribute('aria-disabled')).toBe('true')
    await waitFor(() => expect(document.activeElement).toBe(less))
    await userEvent.click(less)
    expect(line('Dumbbells').getByRole('status').textContent).toBe('0')
  })

  test('tells what is not saved yet from what is', async () => {
    actions.saveOwnKit.mockResolvedValueOnce({ ok: true, value: undefined })
    const { rerender } = render(<KitForm kit={{ mat: 1 }} weights={{}} />)
    expect(screen.queryByText('Not saved yet.')).toBeNull()
    await userEvent.click(line('Bands').getByRole('button', { name: 'One more: Bands' }))
    expect(screen.getByText('Not saved yet.')).toBeTruthy()
    await userEvent.click(screen.getByRole('button', { name: 'Save my kit' }))
    const sent = Object.fromEntries(actions.saveOwnKit.mock.calls[0]?.[1] ?? [])
    expect(sent).toMatchObject({ mat: '1', band: '1', dumbbell: '0' })
    rerender(<KitForm kit={{ mat: 1, band: 1 }} weights={{}} />)
    expect(await screen.findByText('Your kit is saved.')).toBeTruthy()
  })

  test('asks what the pieces weigh, in kilograms or pounds, and keeps what cannot be read', async () => {
    actions.saveOwnKit.mockResolvedValueOnce({
      ok: false,
      message: 'Some of the weights cannot be read.',
      fields: { 'weights:dumbbell': '‘heavy’ is no weight.' },
    })
    render(<KitForm kit={{ dumbbell: 2 }} weights={{ dumbbell: [8, 8] }} />)
    const field = screen.getByLabelText('What your dumbbells weigh')
    expect(valueOf(field)).toBe('2 × 8 kg')
    await userEvent.clear(field)
    await userEvent.type(field, '8, 8')
    expect(screen.queryByText('Not saved yet.')).toBeNull()
    await userEvent.clear(field)
    await userEvent.type(field, 'heavy')
    expect(screen.getByText('Not saved yet.')).toBeTruthy()
    await userEvent.click(screen.getByRole('button', { name: 'Save my kit' }))
    expect(await screen.findByText('‘heavy’ is no weight.')).toBeTruthy()
    expect(valueOf(field)).toBe('heavy')
    await waitFor(() => expect(document.activeElement).toBe(field))
  })
})
