'use client'
import { useBrowserPlayer } from '@/hooks/player/use-browser-player'
import type { PlayerData } from '@/server/contract/classes'
import { PlayerLoading } from './offers'
import { PlayerStoreProvider } from './player-context'
import { PlayerScreens } from './player-screens'

/** The player: once loaded with its data, a class runs in the browser alone. */
export function Player({ data, timeZone }: { data: PlayerData; timeZone: string }) {
  const store = useBrowserPlayer(data)
  if (!store) return <PlayerLoading />
  return (
    <PlayerStoreProvider store={store}>
      <PlayerScreens timeZone={timeZone} />
    </PlayerStoreProvider>
  )
}
