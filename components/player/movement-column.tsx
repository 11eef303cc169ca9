'use client'
import clsx from 'clsx'
import type { ReactNode } from 'react'
import styles from './floor-plan.module.css'
import { figureOf, repsNow, type StationView } from './scene'
import { StationFigure } from './station-figure'
import { schemeText, sidesText } from './texts'

export function MovementColumn({
  name,
  then,
  children,
}: {
  name: string
  then?: ReactNode
  children: ReactNode
}) {
  return (
    <section className={styles.movement} aria-label="Movement">
      <h1
        className={styles.name}
        style={{ fontStretch: '88%', ['--letters' as string]: Math.max(8, name.length) }}
      >
        {name}
      </h1>
      <div className={clsx('condensed', styles.then)}>{then}</div>
      {children}
    </section>
  )
}

/** Reps of this round, large; a timed piece shows its side instead. */
export function RepsFigure({
  view,
  round,
  side,
  moving,
  roundUnknown,
}: {
  view: StationView
  round: number
  side: 'left' | 'right' | null
  moving: boolean
  /** The member says rounds at the end: a ladder is shown as its scheme. */
  roundUnknown: boolean
}) {
  const reps = repsNow(view, round)
  const scheme = roundUnknown && view.reps !== null && typeof view.reps !== 'number'
  const unit = sidesText(view.sides)
  return (
    <>
      <div className={styles.reps}>
        {scheme && view.reps !== null ? (
          <>
            <div className={clsx('condensed', styles.repsUnit)}>reps</div>
            <div className={clsx('figures', styles.repsScheme)}>{schemeText(view.reps)}</div>
          </>
        ) : reps !== null ? (
          <>
            <div
              className={clsx('condensed', styles.repsUnit)}
              data-matters={view.sides === 'each' ? '' : undefined}
            >
              {unit ?? (reps === 1 ? 'rep' : 'reps')}
            </div>
            <div
              className={clsx('figures', styles.repsNumber)}
              style={
                view.sides === 'each' ? { ['--unit' as string]: 'max(var(--distance), 5dvh)' } : {}
              }
              data-testid="reps"
            >
              {reps}
            </div>
          </>
        ) : side ? (
          <>
            <div className={clsx('condensed font-bold', styles.repsScheme)}>
              {side === 'left' ? 'Left' : 'Right'}
            </div>
            <div className={clsx('condensed', styles.repsUnit)}>side</div>
          </>
        ) : null}
      </div>
      <div className={styles.figure}>
        <StationFigure view={view} figure={figureOf(view)} moving={moving} side={side} />
      </div>
    </>
  )
}
