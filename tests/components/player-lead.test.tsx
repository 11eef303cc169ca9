import { act, render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { describe, expect, it } from 'vitest'
import { PlayerStoreProvider } from '@/components/player/player-context'
import { PlayerScreens } from '@/components/player/player-screens'
import { fakePlayer, type FakePlayer } from '../support/fake-player-store'

/** In the rounds of the fixture's class: rows and lunges in a ladder. */
const LADDER_MS = 340_000

function show(player: FakePlayer) {
  return render(
    <PlayerStoreProvider store={player.store}>
      <PlayerScreens timeZone="Europe/London" />
    </PlayerStoreProvider>,
  )
}
const rep = () => screen.getByTestId('lead-rep').textContent
const tickTo = (player: FakePlayer, ms: number) => act(() => player.setClock(ms))

describe('following the lead', () => {
  it('shows its rep of how many from one key on, counts on, and is left with the same key', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    expect(screen.queryByTestId('lead')).toBeNull()
    await userEvent.keyboard('l')
    expect(player.sent).toEqual([{ type: 'follow-lead', station: 0, logs: true }])
    expect(rep()).toBe('1')
    const { lengthMs } = player.store.getState().position?.lead ?? { lengthMs: 0 }
    tickTo(player, LADDER_MS + lengthMs + 50)
    expect(rep()).toBe('2')
    await userEvent.keyboard('l')
    expect(screen.queryByTestId('lead')).toBeNull()
    expect(player.sent.at(-1)).toEqual({ type: 'leave-lead' })
  })

  it('says which side works where the sides are in turn, and what comes during a change', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard('l')
    const seen = new Set<string>()
    for (let ms = LADDER_MS; ms < LADDER_MS + 60_000; ms += 500) {
      tickTo(player, ms)
      seen.add(screen.getByTestId('lead').textContent ?? '')
    }
    expect([...seen].some((words) => words.startsWith('change'))).toBe(true)
    expect([...seen].some((words) => /left|right/.test(words))).toBe(true)
  })

  it('waits while its member rests as needed, and says so', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard('lr')
    expect(screen.getByTestId('lead').textContent).toBe('the lead waits')
    const before = rep()
    tickTo(player, LADDER_MS + 30_000)
    expect(rep()).toBe(before)
  })

  it('goes to the station that its member brings forward', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    await userEvent.keyboard('l')
    await userEvent.click(screen.getByRole('button', { name: /^then / }))
    expect(player.store.getState().position?.lead?.station).toBe(1)
  })

  it('does not log where its member wishes none of that', async () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS, preferences: { leadLogs: false } })
    show(player)
    await userEvent.keyboard('l')
    expect(player.sent).toEqual([{ type: 'follow-lead', station: 0, logs: false }])
  })
})

describe('what is said', () => {
  it('stands on the screen where it is not written large already', () => {
    const player = fakePlayer({ startedAtMs: LADDER_MS })
    show(player)
    act(() => player.store.setState({ caption: 'Elbows past the ribs, then down slowly' }))
    expect(screen.getByTestId('caption').textContent).toBe('Elbows past the ribs, then down slowly')
    act(() => player.store.setState({ caption: null }))
    expect(screen.queryByTestId('caption')).toBeNull()
  })

  it('is chosen and tried before class; without a voice it says what goes on all the same', async () => {
    const player = fakePlayer()
    const view = show(player)
    await userEvent.click(screen.getByRole('button', { name: 'Hear the voice' }))
    expect(player.called).toContain('tryVoice')
    expect(screen.getByRole('option', { name: 'Anna (en)' })).toBeTruthy()
    view.unmount()
    const mute = fakePlayer()
    mute.store.setState({ voices: [] })
    show(mute)
    expect(screen.getByText(/This browser has no voice/)).toBeTruthy()
    expect(screen.queryByRole('button', { name: 'Hear the voice' })).toBeNull()
  })
})
