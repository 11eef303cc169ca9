'use client'
import { useEffect, useState } from 'react'
import type { StoreApi } from 'zustand'
import type { PlayerData } from '@/server/contract/classes'
import { browserSound } from './audio'
import { browserClaims } from './claims'
import { usualScreen } from './distance'
import { deviceId, newId } from './ids'
import { browserMedia, mediaNow } from './media-session'
import { browserMemory } from './memory'
import { browserOutbox } from './outbox'
import { keepPagesOnlyFor, keepThisPage } from './service-worker'
import { createPlayer } from './store'
import { startTicker } from './ticker'
import type { Command, Position } from '@/server/engine/timeline/run-types'
import type { PlayerStore } from './types'
import { browserVoice } from './voice'
import { browserWakeLock } from './wake-lock'

/** The player's store over this browser, for as long as the component is there; null until it is. */
export function useBrowserPlayer(data: PlayerData): StoreApi<PlayerStore> | null {
  const [store, setStore] = useState<StoreApi<PlayerStore> | null>(null)
  useEffect(() => {
    const memory = browserMemory()
    const outbox = browserOutbox(memory, data.membershipId)
    const player = createPlayer(data, {
      now: () => Math.round(performance.now()),
      wall: () => Date.now(),
      tick: startTicker,
      sound: browserSound(),
      voice: browserVoice(),
      memory,
      usualScreen: usualScreen(
        Math.min(window.screen.width, window.screen.height),
        window.matchMedia('(pointer: coarse)').matches,
      ),
      claims: browserClaims(),
      newId,
      device: deviceId(safeLocalStorage()),
      kickOutbox: outbox.kick,
      watchOutbox: outbox.watch,
      watchSeq: outbox.watchSeq,
      stayAwake: browserWakeLock(),
    })
    setStore(player.store)
    void player.open()
    void keepPagesOnlyFor(data.membershipId).then(keepThisPage)
    const inClass = (command: (position: Position) => Command | null) => () => {
      const { stage, position, send } = player.store.getState()
      const wanted = stage === 'class' && position ? command(position) : null
      if (wanted) send(wanted)
    }
    const media = browserMedia({
      play: inClass(({ halted }) => (halted === 'paused' ? { type: 'resume' } : null)),
      pause: inClass(({ halted }) => (halted ? null : { type: 'pause' })),
      next: inClass(goOnCommand),
    })
    const endMedia = player.store.subscribe(({ stage, run, position }) =>
      media.show(mediaNow(data.version, stage === 'class' ? run : null, position)),
    )
    return () => {
      endMedia()
      media.close()
      player.close()
      outbox.close()
      setStore(null)
    }
    // The page renders anew with fresh data only at a navigation, which mounts a new player.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [data.scheduledClass.scheduledClassId, data.membershipId])
  return store
}

/** What the key 'next' means: on to what comes, which in work is the next round. */
function goOnCommand({ phase, segment, workedOff }: Position): Command | null {
  if (phase === 'brief') return { type: 'pass-brief' }
  if (segment?.kind === 'rest') return { type: 'cut-rest' }
  if (segment?.kind !== 'work') return null
  return workedOff ? { type: 'finish-block' } : { type: 'log-round', by: 'member' }
}

function safeLocalStorage(): Storage | null {
  try {
    return window.localStorage
  } catch {
    return null
  }
}
