import { act, render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { describe, expect, it } from 'vitest'
import { PlayerStoreProvider } from '@/components/player/player-context'
import { PlayerScreens } from '@/components/player/player-screens'
import { fakePlayer, type FakePlayer } from '../support/fake-player-store'

// Instants of the fixture's class on the run's clock: the brief of 20 s lies between warm-up and ladder.
const BRIEF_MS = 305_000
const COUNT_IN_MS = 321_000
const LADDER_MS = 340_000
const REST_MS = 690_000
const FIRST_REST_MS = 90_000

function show(player: FakePlayer) {
  return render(
    <PlayerStoreProvider store={player.store}>
      <PlayerScreens timeZone="Europe/London" />
    </PlayerStoreProvider>,
  )
}
const floor = () => screen.getByRole('main')
const types = (player: FakePlayer) => player.sent.map((command) => command.type)

describe('keys in class', () => {
  it.each([
    [' ', { type: 'log-round', by: 'member' }],
    ['{PageDown}', { type: 'log-round', by: 'member' }],
    ['{MediaTrackNext}', { type: 'log-round', by: 'member' }],
    ['{Backspace}', { type: 'undo-round' }],
    ['p', { type: 'pause' }],
    ['r', { type: 'rest-as-needed' }],
    ['s', { type: 'stop' }],
    ['1', { type: 'choose-option', block: 'row-and-lunge', station: 0, option: 'hand-on-a-chair' }],
    [
      '3',
      { type: 'choose-option', block: 'row-and-lunge', station: 0, option: 'pause-at-the-top' },
    ],
  ])('sends what key %j stands for, once', async (key, command) => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard(key)
    expect(player.sent).toEqual([command])
  })

  it('leaves space to the control that has the focus, and Page Down still logs', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    screen.getByRole('button', { name: 'Options' }).focus()
    await userEvent.keyboard(' ')
    expect(screen.getByRole('dialog')).toBeTruthy()
    await userEvent.keyboard('{Escape}')
    expect(player.sent).toEqual([])
    screen.getByRole('button', { name: 'Options' }).focus()
    await userEvent.keyboard('{PageDown}')
    expect(types(player)).toEqual(['log-round'])
  })

  it('says so when a second press within 1.5 s is not counted', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard(' ')
    await userEvent.keyboard(' ')
    expect(player.store.getState().tally?.blocks[1]?.rounds).toBe(1)
    expect(screen.getByRole('status').textContent).not.toBe('')
  })

  it('keeps letters and figures silent when they are turned off, and space alive', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS, preferences: { lettersOn: false } })
    show(player)
    await userEvent.keyboard('prsho123?')
    expect(player.sent).toEqual([])
    await userEvent.keyboard(' ')
    expect(types(player)).toEqual(['log-round'])
  })

  it('opens options, hurt and the list of keys, and Escape closes them without touching the class', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    for (const [key, title] of [
      ['o', 'Bent-over row'],
      ['h', 'Where does it hurt?'],
      ['?', 'Keys'],
    ] as const) {
      await userEvent.keyboard(key)
      expect(screen.getByRole('dialog', { name: title })).toBeTruthy()
      await userEvent.keyboard('{Escape}')
      expect(screen.queryByRole('dialog')).toBeNull()
    }
    await userEvent.keyboard('{Escape}')
    expect(player.sent).toEqual([])
  })

  it('passes a brief, lengthens a rest and ends a rest as needed with the same big key', async () => {
    const brief = fakePlayer({ startedAtMs: BRIEF_MS })
    const first = show(brief)
    await userEvent.keyboard(' ')
    expect(types(brief)).toEqual(['pass-brief'])
    first.unmount()

    const rest = fakePlayer({ startedAtMs: REST_MS })
    const second = show(rest)
    await userEvent.keyboard(' ')
    expect(rest.sent).toEqual([{ type: 'lengthen-rest', ms: 15_000 }])
    second.unmount()

    const resting = fakePlayer({ startedAtMs: LADDER_MS })
    show(resting)
    await userEvent.keyboard('r')
    expect(screen.getByTestId('resting')).toBeTruthy()
    await userEvent.keyboard('r')
    expect(types(resting)).toEqual(['rest-as-needed', 'end-rest-as-needed'])
  })

  it('still logs a round that is pressed while resting', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard('r')
    await userEvent.keyboard(' ')
    expect(types(player)).toEqual(['rest-as-needed', 'log-round'])
  })
})

describe('polarity', () => {
  it.each([
    ['a brief', BRIEF_MS, 'birch'],
    ['a count-in', COUNT_IN_MS, 'hall'],
    ['work', LADDER_MS, 'hall'],
    ['a change of sides', 42_000, 'hall'],
    ['a rest of 20 s', FIRST_REST_MS, 'birch'],
    ['a rest between rounds', 140_000, 'birch'],
    ['a rest block', REST_MS, 'birch'],
  ] as const)('shows %s on the right ground', (_, atMs, ground) => {
    const player = fakePlayer({ startedAtMs: atMs })
    show(player)
    expect(floor().dataset['ground']).toBe(ground)
  })

  it('keeps the hall in a rest under 15 s and says it in words', () => {
    const player = fakePlayer({ startedAtMs: 12 })
    const segments = player.store.getState().run?.timeline.segments ?? []
    const short = segments.find(
      (segment) => segment.kind === 'rest' && segment.endMs - segment.startMs < 15_000,
    )
    // One brief of 20 s lies before it: it runs beside class time.
    player.setClock((short?.startMs ?? 0) + 20_000 + 1_000)
    show(player)
    expect(floor().dataset['ground']).toBe('hall')
    expect(screen.getByTestId('state').textContent).toContain('Rest')
  })

  it('keeps the hall dark everywhere when asked, and pauses in daylight when not', async () => {
    const dark = fakePlayer({ startedAtMs: REST_MS, preferences: { keepHallDark: true } })
    const first = show(dark)
    expect(floor().dataset['ground']).toBe('hall')
    first.unmount()
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard('p')
    expect(floor().dataset['ground']).toBe('birch')
    expect(screen.getByTestId('state').textContent).toContain('Paused')
  })
})

describe('options', () => {
  it('marks the option in force at once and shows its own name', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    const group = screen.getByRole('group', { name: 'Your option for Bent-over row' })
    expect(
      within(group).getByRole('button', { name: 'As planned' }).getAttribute('aria-pressed'),
    ).toBe('true')
    await userEvent.click(within(group).getByRole('button', { name: /Hand on a chair/ }))
    expect(
      within(group)
        .getByRole('button', { name: /Hand on a chair/ })
        .getAttribute('aria-pressed'),
    ).toBe('true')
  })

  it('finds them by what bothers the member and sends the reason', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard('o')
    const dialog = screen.getByRole('dialog')
    await userEvent.click(within(dialog).getByRole('button', { name: 'lower back' }))
    expect(within(dialog).queryByRole('button', { name: /Pause at the top/ })).toBeNull()
    await userEvent.click(within(dialog).getByRole('button', { name: /Hand on a chair/ }))
    expect(player.sent).toEqual([
      {
        type: 'choose-option',
        block: 'row-and-lunge',
        station: 0,
        option: 'hand-on-a-chair',
        reason: 'lower-back',
      },
    ])
  })

  it('keeps only the easier option open where an earlier hurt is held', async () => {
    const player = fakePlayer({
      startedAtMs: LADDER_MS,
      data: {
        holds: [
          {
            id: 'h1',
            place: 'lower-back',
            since: '2026-11-21T18:00:00.000Z',
            memberClearedAt: null,
            coachClearedAt: '2026-11-25T18:00:00.000Z',
          },
        ],
      },
    })
    show(player)
    await userEvent.keyboard('3')
    await userEvent.keyboard('2')
    expect(player.sent).toEqual([])
    await userEvent.keyboard('1')
    expect(types(player)).toEqual(['choose-option'])
  })

  it('moves to the next station of the round with one tap, and its options with it', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.click(screen.getByRole('button', { name: 'then reverse lunge' }))
    expect(screen.getByRole('heading', { level: 1 }).textContent).toBe('Reverse lunge')
    await userEvent.keyboard('1')
    expect(player.sent).toEqual([
      { type: 'choose-option', block: 'row-and-lunge', station: 1, option: 'step-shorter' },
    ])
  })
})

describe('this hurts and stop', () => {
  it('records the place with the first press and offers the easier option for it', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard('h')
    await userEvent.click(screen.getByRole('button', { name: 'Lower back' }))
    expect(player.sent).toEqual([{ type: 'hurt', where: 'lower-back' }])
    await userEvent.click(screen.getByRole('button', { name: 'Take it' }))
    expect(player.sent[1]).toEqual({
      type: 'choose-option',
      block: 'row-and-lunge',
      station: 0,
      option: 'hand-on-a-chair',
      reason: 'lower-back',
    })
    expect(screen.queryByRole('dialog')).toBeNull()
  })

  it('halts at once, shows signs and number, and offers to go on only without a red flag', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard('s')
    expect(player.store.getState().position?.halted).toBe('stopped')
    const dialog = screen.getByRole('dialog', { name: 'Stopped' })
    expect(within(dialog).getByRole('link', { name: '112' }).getAttribute('href')).toBe('tel:112')
    expect(within(dialog).getByRole('button', { name: 'Go on with class' })).toBeTruthy()
    await userEvent.click(within(dialog).getByRole('radio', { name: /chest/ }))
    expect(player.sent.at(-1)).toEqual({ type: 'describe-stop', sign: 'chest-pain' })
    expect(within(dialog).queryByRole('button', { name: 'Go on with class' })).toBeNull()
    await userEvent.keyboard('{Escape}')
    expect(screen.getByRole('dialog', { name: 'Stopped' })).toBeTruthy()
    expect(types(player)).not.toContain('end-class')
  })

  it('names the local number where the gym has none', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS, data: { emergencyNumber: null } })
    show(player)
    await userEvent.keyboard('s')
    expect(screen.getByRole('dialog').textContent).toContain('your local emergency number')
  })
})

describe('what a rest asks', () => {
  it('takes rounds and reps of the block before, and never holds the clock', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard(' ')
    act(() => player.setClock(REST_MS))
    player.sent.length = 0
    const question = screen.getByTestId('rest-question')
    await userEvent.click(within(question).getByRole('button', { name: /Reps into round 2.*more/ }))
    await userEvent.click(within(question).getByRole('button', { name: 'Rounds: one more' }))
    expect(player.sent).toEqual([
      { type: 'note-reps', block: 'row-and-lunge', round: 2, reps: 1 },
      { type: 'set-round', block: 'row-and-lunge', round: 2, done: true, by: 'member' },
    ])
    expect(player.store.getState().position?.halted).toBeNull()
    await userEvent.click(within(question).getByRole('button', { name: /right/ }))
    expect(screen.queryByTestId('rest-question')).toBeNull()
  })

  it('offers to go on only after the least time', () => {
    const player = fakePlayer({ startedAtMs: REST_MS })
    show(player)
    const go = () => screen.getByRole<HTMLButtonElement>('button', { name: /^Go( |$)/ })
    expect(go().disabled).toBe(true)
    act(() => player.setClock(REST_MS + 75_000))
    expect(go().disabled).toBe(false)
  })
})

describe('what is on show', () => {
  it('keeps the round, its reps and the next movement in words', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    expect(screen.getByTestId('round').textContent).toBe('1')
    expect(screen.getByTestId('reps').textContent).toBe('4')
    await userEvent.keyboard(' ')
    expect(screen.getByTestId('round').textContent).toBe('2')
    expect(screen.getByTestId('reps').textContent).toBe('6')
  })

  it('shows every station of a brief, with reps and option', () => {
    const player = fakePlayer({ startedAtMs: BRIEF_MS })
    show(player)
    expect(screen.getByRole('button', { name: /Bent-over row.*as planned/ })).toBeTruthy()
    expect(screen.getByRole('button', { name: /Reverse lunge.*changing sides/ })).toBeTruthy()
    expect(screen.getByTestId('state').textContent).toContain('Goes on by itself')
  })

  it('waits for the member in a brief when they chose so', () => {
    const player = fakePlayer({ startedAtMs: BRIEF_MS, preferences: { waitAtBriefs: true } })
    show(player)
    expect(screen.getByTestId('state').textContent).toContain('Waiting for you')
  })

  it('has no button to log rounds for a member who says them at the end', () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS, preferences: { counting: 'afterwards' } })
    show(player)
    expect(screen.queryByRole('button', { name: /Log round/ })).toBeNull()
    expect(screen.getByText(/You say your rounds at the end/)).toBeTruthy()
  })

  it('reads a cue out once and politely, and leaves the ticking number alone', () => {
    const player = fakePlayer({
      startedAtMs: LADDER_MS,
      state: {
        due: {
          mark: {
            atMs: 0,
            what: 'cue',
            block: 'row-and-lunge',
            id: 'c1',
            key: 'cue/c1',
            segmentIndex: 0,
          },
          text: 'Elbows to your back pockets',
          sinceMs: 200,
        },
      },
    })
    const { container } = show(player)
    expect(screen.getByTestId('due-cue').textContent).toBe('Elbows to your back pockets')
    const live = container.querySelector('[aria-live="polite"]')
    expect(live?.textContent).toBe('Elbows to your back pockets')
    expect(screen.getByRole('timer').getAttribute('aria-live')).toBe('off')
  })

  it.each([
    ['saved', 'saved'],
    ['saved-here', 'saved here, 3 to send'],
    ['not-kept', 'not kept'],
  ] as const)('says where what was recorded lies: %s', (state, words) => {
    const player = fakePlayer({
      startedAtMs: LADDER_MS,
      state: { saving: { state, unsent: state === 'saved' ? 0 : 3, message: null } },
    })
    show(player)
    expect(screen.getByTestId('saving').textContent).toContain(words)
  })

  it('asks for a tap when sound is blocked', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS, state: { sound: 'blocked' } })
    show(player)
    await userEvent.click(screen.getByRole('button', { name: /sound is blocked/ }))
    expect(player.called).toContain('unlockSound')
  })
})
