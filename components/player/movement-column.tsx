'use client'
import clsx from 'clsx'
import type { ReactNode } from 'react'
import type { Position } from '@/server/engine/timeline/run-types'
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
  lead,
  moving,
  roundUnknown,
}: {
  view: StationView
  round: number
  side: 'left' | 'right' | null
  /** Where the lead is followed: it counts the reps. */
  lead: Position['lead']
  moving: boolean
  /** The member says rounds at the end: a ladder is shown as its scheme. */
  roundUnknown: boolean
}) {
  const reps = repsNow(view, round)
  const scheme = roundUnknown && view.reps !== null && typeof view.reps !== 'number'
  const unit = sidesText(view.sides)
  return (
    <>
      <div className={styles.reps} data-led={lead ? '' : undefined}>
        {lead ? (
          <LeadCount lead={lead} coming={repsNow(view, lead.round)} />
        ) : scheme && view.reps !== null ? (
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
        <StationFigure
          view={view}
          figure={figureOf(view)}
          moving={moving}
          side={lead && view.sides === 'each' ? lead.side : side}
          led={lead !== null}
        />
      </div>
    </>
  )
}

/** 'rep 7 of 12, left': the number alone is large, what it counts up to stands beside it. */
function LeadCount({
  lead,
  coming,
}: {
  lead: NonNullable<Position['lead']>
  coming: number | null
}) {
  const words = lead.isWaiting
    ? 'the lead waits'
    : lead.state === 'change'
      ? 'change, then'
      : lead.state === 'done'
        ? 'all done'
        : `rep${lead.side ? `, ${lead.side}` : ''}`
  return (
    <>
      <div
        className={clsx('condensed', styles.repsUnit)}
        data-matters={words === 'rep' ? undefined : ''}
        data-testid="lead"
      >
        {words}
      </div>
      <div
        className={clsx('figures', styles.repsNumber)}
        style={words === 'rep' ? {} : { ['--unit' as string]: 'max(var(--distance), 5dvh)' }}
      >
        <span data-testid="lead-rep">{lead.state === 'rep' ? lead.rep : (coming ?? '')}</span>
        {lead.state === 'rep' ? (
          <span className={clsx('condensed', styles.repsOf)}>of {lead.of}</span>
        ) : null}
      </div>
    </>
  )
}
