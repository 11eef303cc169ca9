'use client'
import type { CSSProperties, ReactNode } from 'react'
import { usePlayer } from './player-context'
import { useDropPointerFocus } from './use-drop-pointer-focus'
import type { Ground } from './scene'
import styles from './floor-plan.module.css'

/** From this size on a screen is a television: nothing near its edges, no hover. */
export const TV_INCHES = 28

/** The floor itself: its ground, the situation it is drawn for, and what covers it. */
export function PlayerFrame({
  ground,
  idle,
  children,
}: {
  ground: Ground
  idle: boolean
  children: ReactNode
}) {
  useDropPointerFocus()
  const inches = usePlayer((state) => state.preferences.screenDiagonalInches)
  return (
    <main
      className={`${styles.root} boards`}
      data-ground={ground}
      data-situation={inches >= TV_INCHES ? 'tv' : 'near'}
      data-idle={idle ? '' : undefined}
      style={{ isolation: 'isolate' } as CSSProperties}
    >
      {children}
    </main>
  )
}
