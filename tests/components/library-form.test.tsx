import { act, configure, render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, test, vi } from 'vitest'
import { MovementForm } from '@/components/library/movement-form'
import type { ActionResult } from '@/server/contract/errors'
import { readMovementForm } from '@/server/contract/library'
import type { LibraryMovement } from '@/server/contract/library-types'
import { movementForm } from '../support/library-form'
import { descriptionOf, valueOf } from '../support/reading'

type Action = (before: ActionResult | null, form: FormData) => Promise<ActionResult>
const actions = vi.hoisted(() => ({ saveMovement: vi.fn<Action>() }))
vi.mock('@/server/actions/library', () => actions)

// A form of some hundred fields: reading it by roles takes its time on a busy computer.
configure({ asyncUtilTimeout: 10_000 })
vi.setConfig({ testTimeout: 60_000 })

function found(): LibraryMovement {
  const { change } = readMovementForm(movementForm())
  if (!change) throw new Error('the form is not sound')
  const options = change.fields.options.map((one, index) => ({
    ...one,
    option: one.option || `option-${index}`,
  }))
  return {
    movement: { ...change.fields, slug: 'harbour-squat', options },
    origin: 'own',
    archived: false,
    token: 'as it was',
    usedIn: [],
    ahead: 0,
  }
}

const sent = (): FormData => {
  const form = actions.saveMovement.mock.calls.at(-1)?.[1]
  if (!form) throw new Error('nothing was sent')
  return form
}
const save = () => userEvent.click(screen.getByRole('button', { name: /^Save/ }))
const optionNames = () =>
  [...sent()].filter(([name]) => /^options\..*\.name$/.test(name)).map(([, value]) => value)

beforeEach(() => {
  actions.saveMovement.mockReset()
  actions.saveMovement.mockResolvedValue({ ok: true, value: undefined })
})

describe('a movement’s form', () => {
  test('sends an untouched movement back as it is', async () => {
    const before = found()
    render(<MovementForm found={before} />)
    await save()
    const { change } = readMovementForm(sent())
    expect(change).toMatchObject({ slug: 'harbour-squat', basedOn: 'as it was', over: false })
    const { slug: _slug, ...fields } = before.movement
    expect(change?.fields).toEqual(fields)
  })

  test('says what is wrong beside the field and above, leads there, and keeps all that was typed', async () => {
    actions.saveMovement.mockResolvedValueOnce({
      ok: false,
      message: 'The movement was not saved: 2 fields need another look.',
      fields: {
        stopWhen: 'Give text of at most 200 characters.',
        'options.o0.reps': 'Such as 10.',
      },
    })
    render(<MovementForm found={found()} />)
    const stop = screen.getByLabelText('When to stop')
    await userEvent.clear(stop)
    await userEvent.type(stop, 'A long story')
    await userEvent.type(screen.getByLabelText('Steps'), 'Breathe.')
    await userEvent.click(screen.getByLabelText('Lower back', { selector: '[name=joints]' }))
    await save()
    expect((await screen.findByRole('alert')).textContent).toContain('2 fields need another look')
    await waitFor(() => expect(document.activeElement).toBe(stop))
    expect(stop.getAttribute('aria-invalid')).toBe('true')
    expect(descriptionOf(stop)).toContain('at most 200')
    const reps = screen.getByLabelText('Reps, To a chair')
    expect(reps.closest('details')?.open).toBe(true)
    await userEvent.click(screen.getByRole('button', { name: /Option: Reps/ }))
    expect(document.activeElement).toBe(reps)
    expect(stop).toHaveProperty('value', 'A long story')
    await save()
    expect(sent().get('stopWhen')).toBe('A long story')
    expect(sent().get('steps')).toContain('Breathe.')
    expect(sent().getAll('joints')).toContain('lower-back')
  })

  test('stays with all that was typed when the connection is lost', async () => {
    actions.saveMovement.mockRejectedValueOnce(new TypeError('fetch failed'))
    render(<MovementForm found={null} />)
    await userEvent.type(screen.getByLabelText('Name'), 'Harbour squat')
    await save()
    expect((await screen.findByRole('alert')).textContent).toContain('still here')
    expect(valueOf(screen.getByLabelText('Name'))).toBe('Harbour squat')
  })

  test('offers to save over somebody else’s change, and does so only when it is ticked', async () => {
    actions.saveMovement.mockResolvedValueOnce({
      ok: false,
      message: 'This movement was changed by Ifeoma meanwhile.',
      fields: { basedOn: 'It was changed meanwhile.' },
    })
    render(<MovementForm found={found()} />)
    await save()
    await userEvent.click(await screen.findByLabelText('Save mine in place of it'))
    await save()
    expect(readMovementForm(sent()).change?.over).toBe(true)
  })
})

describe('its options', () => {
  test('move with what was typed in them; past the planned one the level changes; the button keeps the focus', async () => {
    render(<MovementForm found={found()} />)
    const what = screen.getByLabelText('What changes, To a chair')
    await userEvent.clear(what)
    await userEvent.type(what, 'Sit and stand.')
    await userEvent.click(
      screen.getByRole('button', { name: /^Move down: makes it harder\s?: To a chair$/ }),
    )
    expect(document.activeElement?.textContent).toBe('Move down: To a chair')
    await userEvent.click(screen.getByRole('button', { name: /^Move down\s?: To a chair$/ }))
    await save()
    expect(optionNames()).toEqual(['As planned', 'Pause low', 'To a chair'])
    const options = readMovementForm(sent()).change?.fields.options
    expect(options?.map((one) => one.level)).toEqual(['as-planned', 'harder', 'harder'])
    expect(options?.[2]).toMatchObject({ option: 'option-0', description: 'Sit and stand.' })
  })

  test('are added on either side of the planned one, with the focus in the new name', async () => {
    render(<MovementForm found={found()} />)
    await userEvent.click(screen.getByRole('button', { name: 'Add an easier option' }))
    expect(document.activeElement?.getAttribute('name')).toMatch(/^options\.n\d+\.name$/)
    await userEvent.keyboard('Half way')
    await userEvent.click(screen.getByRole('button', { name: 'Add a harder option' }))
    await userEvent.keyboard('With a jump')
    await save()
    expect(optionNames()).toEqual([
      'To a chair',
      'Half way',
      'As planned',
      'Pause low',
      'With a jump',
    ])
  })

  test('that are removed are not sent, and come back with all that was typed', async () => {
    render(<MovementForm found={found()} />)
    const what = screen.getByLabelText('What changes, To a chair')
    await userEvent.type(what, ' Slowly.')
    await userEvent.click(screen.getByRole('button', { name: /^Remove\s?: To a chair$/ }))
    await save()
    expect(optionNames()).toEqual(['As planned', 'Pause low'])
    await userEvent.click(screen.getByRole('button', { name: /^Put it back\s?: To a chair$/ }))
    await save()
    expect(optionNames()).toEqual(['To a chair', 'As planned', 'Pause low'])
    expect(readMovementForm(sent()).change?.fields.options[0]?.description).toBe(
      'Touch the chair. Slowly.',
    )
  })

  test('take a figure from the picker', async () => {
    render(<MovementForm found={found()} />)
    await userEvent.click(screen.getByRole('button', { name: /Choose a figure for To a chair/ }))
    const dialog = screen.getByRole('dialog', { name: /To a chair/ })
    await userEvent.type(within(dialog).getByLabelText('Search'), 'chair sq')
    await userEvent.click(within(dialog).getByRole('button', { name: 'Chair squat' }))
    await save()
    expect(readMovementForm(sent()).change?.fields.options[0]?.figure).toBe('chair-squat')
  })
})

test('a page with something unsaved asks before a link leads away', async () => {
  const asked = vi.spyOn(window, 'confirm').mockReturnValue(false)
  render(<MovementForm found={found()} />)
  const cancel = screen.getByRole('link', { name: 'Cancel' })
  await userEvent.type(screen.getByLabelText('Name'), ' two')
  let isHeld = false
  await act(async () => {
    isHeld = !cancel.dispatchEvent(new MouseEvent('click', { bubbles: true, cancelable: true }))
  })
  expect(asked).toHaveBeenCalledTimes(1)
  expect(isHeld).toBe(true)
  asked.mockRestore()
})
