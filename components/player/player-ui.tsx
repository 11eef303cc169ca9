'use client'
import { createContext, useContext } from 'react'
import type { StationKey } from '@/hooks/player/types'

export type PanelName = 'options' | 'hurt' | 'skip' | 'keys' | 'sound' | 'more'

/** What the screens of a running class ask of each other; nothing here is stored. */
export interface PlayerUi {
  open(panel: PanelName, station?: StationKey): void
  /** The station that the keys 1, 2, 3 speak of, and the tap that makes another one present. */
  bringForward(station: number): void
  primary(): void
  chooseOption(block: string, station: number, option: string): void
  toggleRest(): void
  toggleLead(): void
  stop(): void
  togglePause(): void
  toggleFullScreen(): void
}

export const PlayerUiContext = createContext<PlayerUi | null>(null)

export function usePlayerUi(): PlayerUi {
  const ui = useContext(PlayerUiContext)
  if (!ui) throw new Error('Used outside a running class')
  return ui
}
