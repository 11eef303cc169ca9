import { render, screen, within, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, expect, test, vi } from 'vitest'
import { HealthForm } from '@/components/health/health-form'
import type { HealthStanding } from '@/server/contract/classes'
import type { ActionResult } from '@/server/contract/errors'
import {
  CLEARANCE_STATEMENT,
  HEALTH_QUESTION_TEXT,
  HEALTH_QUESTIONS,
  type HealthAnswers,
  type HealthQuestion,
} from '@/server/engine/fit/screening'
import { descriptionOf, isTicked } from '../support/reading'

const actions = vi.hoisted(() => ({
  saveHealthAnswers:
    vi.fn<(before: ActionResult | null, form: FormData) => Promise<ActionResult>>(),
}))
const router = vi.hoisted(() => ({ push: vi.fn<(address: string) => void>() }))
vi.mock('@/server/actions/health', () => actions)
vi.mock('next/navigation', () => ({ useRouter: () => router }))

const UNANSWERED: HealthStanding = {
  answers: null,
  answeredAt: null,
  goodUntil: null,
  standing: 'open',
  clearedAt: null,
  limits: [],
  consentMissing: false,
}
const ALL_NO = Object.fromEntries(
  HEALTH_QUESTIONS.map((question) => [question, false]),
) as HealthAnswers

const asked = (question: HealthQuestion) =>
  screen.getByRole('radiogroup', { name: HEALTH_QUESTION_TEXT[question].question })
const answer = (question: HealthQuestion, word: 'Yes' | 'No') =>
  userEvent.click(within(asked(question)).getByRole('radio', { name: word }))

beforeEach(() => {
  actions.saveHealthAnswers.mockReset()
  router.push.mockReset()
})

test.each(HEALTH_QUESTIONS)('a yes to %s says what it changes, a no does not', async (question) => {
  render(<HealthForm health={UNANSWERED} next="/today" />)
  await answer(question, 'No')
  expect(descriptionOf(asked(question))).toBe('')
  await answer(question, 'Yes')
  expect(descriptionOf(asked(question))).toBe(HEALTH_QUESTION_TEXT[question].change)
})

test('a sign asks for clearance and offers no limits instead', async () => {
  render(<HealthForm health={UNANSWERED} next="/today" />)
  expect(screen.queryByLabelText(CLEARANCE_STATEMENT)).toBeNull()
  await answer('chest-pain', 'Yes')
  expect(isTicked(screen.getByLabelText(CLEARANCE_STATEMENT))).toBe(false)
  expect(screen.queryByLabelText('I do not jump')).toBeNull()
})

test('a condition asks for clearance or limits, and what is chosen is sent', async () => {
  actions.saveHealthAnswers.mockResolvedValueOnce({ ok: true, value: undefined })
  render(
    <HealthForm health={{ ...UNANSWERED, answers: ALL_NO, standing: 'clear' }} next="/today" />,
  )
  await answer('medicine', 'Yes')
  await userEvent.click(screen.getByLabelText('I do not jump'))
  await userEvent.click(screen.getByRole('button', { name: 'Save my answers' }))
  const sent = actions.saveHealthAnswers.mock.calls[0]?.[1]
  expect(sent?.get('medicine')).toBe('yes')
  expect(sent?.get('chest-pain')).toBe('no')
  expect(sent?.getAll('limits')).toEqual(['no-jumping'])
  expect(sent?.get('cleared')).toBeNull()
})

test('being pregnant changes nothing that has to be stated', async () => {
  render(<HealthForm health={UNANSWERED} next="/today" />)
  await answer('pregnant-or-recent-birth', 'Yes')
  expect(screen.queryByLabelText(CLEARANCE_STATEMENT)).toBeNull()
})

test('answers that still hold can be changed; those out of date are asked afresh', () => {
  const held: HealthStanding = {
    ...UNANSWERED,
    answers: { ...ALL_NO, medicine: true },
    answeredAt: '2026-10-21T10:00:00.000Z',
    standing: 'clear',
    limits: ['light-loads'],
  }
  const { unmount } = render(<HealthForm health={held} next="/today" />)
  expect(isTicked(within(asked('medicine')).getByRole('radio', { name: 'Yes' }))).toBe(true)
  expect(isTicked(screen.getByLabelText('I use light loads only'))).toBe(true)
  unmount()
  render(<HealthForm health={{ ...held, standing: 'open' }} next="/today" />)
  for (const radio of screen.getAllByRole('radio')) expect(isTicked(radio)).toBe(false)
})

test('an open question is named beside it and its choice has the focus', async () => {
  actions.saveHealthAnswers.mockResolvedValueOnce({
    ok: false,
    message: 'Some questions are still open.',
    fields: { breathless: 'Answer with yes or no.' },
  })
  render(<HealthForm health={UNANSWERED} next="/today" />)
  await answer('chest-pain', 'No')
  await userEvent.click(screen.getByRole('button', { name: 'Save my answers' }))
  await waitFor(() => expect(descriptionOf(asked('breathless'))).toBe('Answer with yes or no.'))
  await waitFor(() =>
    expect(document.activeElement).toBe(
      within(asked('breathless')).getByRole('radio', { name: 'No' }),
    ),
  )
  expect(isTicked(within(asked('chest-pain')).getByRole('radio', { name: 'No' }))).toBe(true)
  expect(router.push).not.toHaveBeenCalled()
  await answer('breathless', 'No')
  expect(descriptionOf(asked('breathless'))).toBe('')
})

test('saved answers lead back to where one came from', async () => {
  actions.saveHealthAnswers.mockResolvedValueOnce({ ok: true, value: undefined })
  render(
    <HealthForm health={{ ...UNANSWERED, answers: ALL_NO, standing: 'clear' }} next="/play/1" />,
  )
  await userEvent.click(screen.getByRole('button', { name: 'Save my answers' }))
  await waitFor(() => expect(router.push).toHaveBeenCalledExactlyOnceWith('/play/1'))
})
