'use client'
import { createContext, useContext, type ReactNode } from 'react'
import { useStore, type StoreApi } from 'zustand'
import type { PlayerStore } from '@/hooks/player/types'

const PlayerContext = createContext<StoreApi<PlayerStore> | null>(null)

/** One store per mounted player, never a module's. */
export function PlayerStoreProvider({
  store,
  children,
}: {
  store: StoreApi<PlayerStore>
  children: ReactNode
}) {
  return <PlayerContext value={store}>{children}</PlayerContext>
}

export function usePlayerStore(): StoreApi<PlayerStore> {
  const store = useContext(PlayerContext)
  if (!store) throw new Error('A player screen stands outside its PlayerStoreProvider')
  return store
}

export function usePlayer<T>(select: (state: PlayerStore) => T): T {
  return useStore(usePlayerStore(), select)
}
