'use client'
import { useState } from 'react'
import type { Block } from '@/server/engine/spec/schema'
import type { BlockTally } from '@/server/engine/tally/types'
import { ActionButton } from './button'
import { usePlayer } from './player-context'
import { repsOfRound, type StationView } from './scene'

/** Plus and minus around a number, in targets for tired hands. */
export function Stepper({
  label,
  value,
  min,
  max,
  onChange,
}: {
  label: string
  value: number
  min: number
  max: number
  onChange: (value: number) => void
}) {
  const step = (by: number) => onChange(Math.min(max, Math.max(min, value + by)))
  const button =
    'border-text figures flex size-[max(48px,1.5em)] items-center justify-center border-[max(3px,0.3vw)] text-[1.2em] leading-none disabled:opacity-40'
  return (
    <div
      role="group"
      aria-label={label}
      className="flex items-center gap-[0.5em] condensed text-[length:var(--near)]"
    >
      <span className="leading-tight">{label}</span>
      <button
        type="button"
        className={button}
        disabled={value <= min}
        onClick={() => step(-1)}
        aria-label={`${label}: one less`}
      >
        −
      </button>
      <output className="min-w-[1.3em] text-center figures text-[1.5em] leading-none">
        {value}
      </output>
      <button
        type="button"
        className={button}
        disabled={value >= max}
        onClick={() => step(1)}
        aria-label={`${label}: one more`}
      >
        +
      </button>
    </div>
  )
}

/** The round that a correction upwards adds: the first that is not logged. */
export function lowestUndone(tally: BlockTally): number {
  const done = new Set(tally.logged.map((each) => each.round))
  let round = 1
  while (done.has(round)) round += 1
  return round
}

/**
 * Asked in the rest after a counted block, while the clock goes on: are the rounds right, and how
 * many reps went into the unfinished one? Every press is recorded as it is made.
 */
export function RestQuestion({
  block,
  tally,
  views,
  onDone,
}: {
  block: Block
  tally: BlockTally
  views: readonly StationView[]
  onDone: () => void
}) {
  const send = usePlayer((state) => state.send)
  const [asked, setAsked] = useState(tally.reps)
  const rounds = tally.rounds
  const limit = block.format.type === 'for-time' ? block.format.rounds : 1_000
  const finished = tally.finishMs !== null || rounds >= limit
  const roundReps = repsOfRound(views, rounds + 1)
  return (
    <div
      data-testid="rest-question"
      className="flex flex-wrap items-center gap-x-[1.4em] gap-y-2 px-[clamp(14px,2.6vw,50px)] pt-2 pb-1"
    >
      <span className="max-w-[12em] truncate condensed text-[length:var(--near)] leading-tight text-text-quiet">
        {block.title}
      </span>
      <Stepper
        label="Rounds"
        value={rounds}
        min={0}
        max={limit}
        onChange={(value) => {
          const more = value > rounds
          const round = more ? lowestUndone(tally) : (tally.logged.at(-1)?.round ?? 1)
          send({ type: 'set-round', block: block.id, round, done: more, by: 'member' })
          setAsked(0)
        }}
      />
      {finished || roundReps < 2 ? null : (
        <Stepper
          label={`Reps into round ${rounds + 1}`}
          value={Math.min(asked, roundReps - 1)}
          min={0}
          max={roundReps - 1}
          onChange={(reps) => {
            setAsked(reps)
            send({ type: 'note-reps', block: block.id, round: rounds + 1, reps })
          }}
        />
      )}
      <ActionButton onClick={onDone} className="text-[length:var(--near)]">
        That’s right
      </ActionButton>
    </div>
  )
}
