import { render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { describe, expect, it } from 'vitest'
import { PlayerStoreProvider } from '@/components/player/player-context'
import { PlayerScreens } from '@/components/player/player-screens'
import type { HealthStanding } from '@/server/contract/classes'
import { CR10_ANCHORS } from '@/server/engine/load/session-rpe'
import { fakePlayer, type FakePlayer } from '../support/fake-player-store'
import { playerFixture } from '../support/player-fixture'

function show(player: FakePlayer) {
  return render(
    <PlayerStoreProvider store={player.store}>
      <PlayerScreens timeZone="Europe/London" />
    </PlayerStoreProvider>,
  )
}
const startButtons = () => screen.getAllByRole<HTMLButtonElement>('button', { name: 'Start class' })
const health = (change: Partial<HealthStanding>): HealthStanding => ({
  ...playerFixture().health,
  ...change,
})

describe('before class', () => {
  it('starts with nothing touched, and tells the coach of nothing new', async () => {
    const player = fakePlayer()
    show(player)
    await userEvent.click(startButtons()[0] as HTMLButtonElement)
    expect(player.called).toEqual(['start'])
  })

  it('sends the line about today with the start', async () => {
    const player = fakePlayer()
    show(player)
    await userEvent.click(screen.getByRole('button', { name: 'Yes' }))
    await userEvent.type(screen.getByLabelText(/What is it/), 'A cold since Sunday')
    await userEvent.click(startButtons()[0] as HTMLButtonElement)
    expect(player.called).toEqual(['start A cold since Sunday'])
  })

  it.each([
    [health({ standing: 'open' }), /Answer the health questions/],
    [health({ standing: 'blocked' }), /licensed professional/],
    [health({ standing: 'clearance' }), /choose limits/],
    [health({ consentMissing: true }), /guardian/],
  ])('does not start where the health answers stand in the way, and says why', async (own, why) => {
    const player = fakePlayer({ data: { health: own } })
    show(player)
    for (const button of startButtons()) expect(button.disabled).toBe(true)
    expect(screen.getAllByText(why).length).toBeGreaterThan(0)
    expect(
      screen
        .getAllByRole('link')
        .some((link) => link.getAttribute('href')?.startsWith('/health?next=%2Fplay%2F')),
    ).toBe(true)
  })

  it('chooses the option to start with, station by station', async () => {
    const player = fakePlayer()
    show(player)
    const [row] = screen.getAllByRole('group', { name: 'Option for Bent-over row' })
    await userEvent.click(
      within(row as HTMLElement).getByRole('button', { name: /Hand on a chair/ }),
    )
    expect(player.store.getState().options).toEqual({ 'row-and-lunge/0': 'hand-on-a-chair' })
  })

  it('explains an option that an earlier hurt holds and shuts the others', () => {
    const player = fakePlayer({
      data: {
        holds: [
          {
            id: 'h1',
            place: 'wrist',
            since: '2026-11-21T18:00:00.000Z',
            memberClearedAt: '2026-11-25T18:00:00.000Z',
            coachClearedAt: null,
          },
        ],
      },
      state: { options: { 'warm-up/1': 'hands-on-a-table' } },
    })
    show(player)
    const [row] = screen.getAllByRole('group', { name: 'Option for Push-up' })
    const within2 = within(row as HTMLElement)
    expect(within2.getByRole<HTMLButtonElement>('button', { name: /^2/ }).disabled).toBe(true)
    expect(within2.getByRole<HTMLButtonElement>('button', { name: /^3/ }).disabled).toBe(true)
    expect(screen.getAllByText(/Easier since ‘this hurts’ \(wrist\)/).length).toBeGreaterThan(0)
  })

  it('sets counting, briefs, time to change, keys, screen and sound', async () => {
    const player = fakePlayer()
    show(player)
    await userEvent.click(screen.getByRole('button', { name: 'I say at the end' }))
    await userEvent.click(screen.getByLabelText('Briefs wait for me'))
    await userEvent.selectOptions(screen.getByLabelText('More time to change'), '10')
    await userEvent.click(screen.getByLabelText(/Letters work as keys/))
    await userEvent.click(screen.getByLabelText(/Keep the hall dark/))
    await userEvent.click(screen.getByRole('button', { name: 'TV, 3 m' }))
    await userEvent.click(screen.getByRole('button', { name: 'Play the count' }))
    expect(player.store.getState().preferences).toMatchObject({
      counting: 'afterwards',
      waitAtBriefs: true,
      changeExtraSeconds: 10,
      lettersOn: false,
      keepHallDark: true,
      screenDiagonalInches: 43,
      distanceMetres: 3,
    })
    expect(player.called).toEqual(['playCount'])
  })

  it('lists the kit with what the member has of it', () => {
    show(fakePlayer())
    const kit = screen.getByRole('region', { name: 'Kit' })
    expect(kit.textContent).toContain('2 × dumbbell')
    expect(kit.textContent).toContain('yours')
    expect(kit.textContent).toContain('for some options only')
  })
})

describe('offers', () => {
  it('offers to go on with an open class, or to start anew', async () => {
    const player = fakePlayer({ startedAtMs: 340_000, state: { stage: 'resume' } })
    show(player)
    await userEvent.click(screen.getByRole('button', { name: 'Go on' }))
    await userEvent.click(screen.getByRole('button', { name: 'Start anew' }))
    expect(player.called).toEqual(['resumeOpenAttempt', 'discardOpenAttempt'])
  })

  it('asks after a gap where to go on', async () => {
    const player = fakePlayer({
      startedAtMs: 340_000,
      state: { stage: 'gap', gap: { awayMs: 95_000, reason: 'away' } },
    })
    show(player)
    expect(screen.getByRole('main').textContent).toContain('2 minutes')
    await userEvent.click(screen.getByRole('button', { name: 'From where I was' }))
    await userEvent.click(screen.getByRole('button', { name: 'From where the clock would be' }))
    expect(player.called).toEqual(['goOn where-i-was', 'goOn where-the-clock-would-be'])
  })

  it('says that another tab leads the class and takes over on demand', async () => {
    const player = fakePlayer({ startedAtMs: 340_000, state: { otherTab: true } })
    show(player)
    await userEvent.click(screen.getByRole('button', { name: 'Take over here' }))
    expect(player.called).toEqual(['takeOver'])
  })
})

describe('after class', () => {
  function ended(counting: 'press' | 'afterwards' = 'press'): FakePlayer {
    const player = fakePlayer({ startedAtMs: 340_000, preferences: { counting } })
    player.store.getState().send({ type: 'end-class' })
    player.store.setState({ stage: 'after' })
    player.sent.length = 0
    return player
  }

  it('asks for the session RPE with the scale’s own words, and sends it with note and hurts', async () => {
    const player = ended()
    show(player)
    for (const { rating, anchor } of CR10_ANCHORS) {
      expect(
        screen.getByRole('radio', { name: anchor ? `${rating}: ${anchor}` : String(rating) }),
      ).toBeTruthy()
    }
    const send = screen.getByTestId<HTMLButtonElement>('send-rating')
    expect(send.disabled).toBe(true)
    await userEvent.click(screen.getByRole('radio', { name: '7: Very hard' }))
    await userEvent.click(screen.getByRole('button', { name: 'Knee' }))
    await userEvent.type(screen.getByLabelText(/A note to your coach/), 'Good class')
    await userEvent.click(send)
    expect(player.sent).toEqual([
      { type: 'rate', rpe: 7, note: 'Good class', hurts: [{ where: 'knee' }] },
    ])
    expect(screen.getByRole('heading', { name: 'Your tally' })).toBeTruthy()
  })

  it('asks for rounds and reps first where they are said at the end', async () => {
    const player = ended('afterwards')
    show(player)
    const [first] = screen.getAllByRole('listitem')
    await userEvent.click(
      within(first as HTMLElement).getByRole('button', { name: /Full rounds.*more/ }),
    )
    await userEvent.click(
      within(first as HTMLElement).getByRole('button', { name: /and reps.*more/ }),
    )
    expect(player.sent).toEqual([
      { type: 'set-round', block: 'row-and-lunge', round: 1, done: true, by: 'afterwards' },
      { type: 'note-reps', block: 'row-and-lunge', round: 2, reps: 1 },
    ])
    await userEvent.click(screen.getByRole('button', { name: 'Those are my rounds' }))
    expect(screen.getByRole('radiogroup')).toBeTruthy()
  })

  it('names the option used in every block of the tally', async () => {
    const player = ended()
    show(player)
    await userEvent.click(screen.getByRole('button', { name: 'Not now' }))
    expect(screen.getByRole('heading', { name: 'Row and lunge' })).toBeTruthy()
    expect(screen.getAllByText('As planned').length).toBeGreaterThan(0)
  })
})
