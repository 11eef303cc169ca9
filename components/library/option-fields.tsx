'use client'
import clsx from 'clsx'
import { use, useLayoutEffect, useRef } from 'react'
import { LEVEL_TEXT, reasonText, REPS_HELP, writeReps } from '@/server/contract/library-words'
import type { Level, MovementOption } from '@/server/engine/spec/movement'
import { REASONS } from '@/server/engine/spec/names'
import { Chips, FieldErrors, AreaField, LineField } from './fields'
import { FigurePicker } from './figure-picker'
import { Removable, SmallButton } from './removable'
import { TimingFields } from './timing-fields'

/** An option in the form: what it was when it came there, and what the form itself must know of it. */
export interface OptionDraft {
  /** Names its fields, and stays when it moves. */
  key: string
  start: Partial<MovementOption>
  name: string
  figure: string
  /** Still there, with all that was typed, until the form is left: it can be put back. */
  isRemoved: boolean
}

interface OptionFieldsProps {
  draft: OptionDraft
  level: Level
  /** The level that it has one place up or down; null where there is none. */
  up: Level | null
  down: Level | null
  onMove: (by: -1 | 1) => void
  onRemove: () => void
  onPutBack: () => void
  onChange: (change: Partial<Pick<OptionDraft, 'name' | 'figure'>>) => void
  movementFigure: string
}

const AS_THE_MOVEMENT = {
  tempo: 'Empty: as the movement.',
  sides: 'As the movement',
  change: 'Empty: as after the movement.',
}
const OWN_TIMING = ['tempo', 'secondsPerRep', 'reps', 'sides', 'change'] as const

export function OptionFields({
  draft,
  level,
  up,
  down,
  onMove,
  onRemove,
  onPutBack,
  onChange,
  movementFigure,
}: OptionFieldsProps) {
  const { key, start } = draft
  const prefix = `options.${key}.`
  const isPlanned = level === 'as-planned'
  const name = draft.name.trim() || 'the new option'
  const moveText = (to: Level | null, way: string) =>
    to !== null && to !== level && !isPlanned
      ? `${way}: makes it ${LEVEL_TEXT[to].toLowerCase()}`
      : way
  return (
    <Removable
      data-option={key}
      isRemoved={draft.isRemoved}
      name={name}
      onPutBack={onPutBack}
      className={clsx('border-l-8 pl-4 sm:pl-6', isPlanned ? 'border-present' : 'border-fill')}
    >
      <div className="flex flex-wrap items-center gap-x-4 gap-y-2 pb-4">
        <h3 className="mr-auto text-xl [overflow-wrap:anywhere]">
          <span className="text-text-quiet">{LEVEL_TEXT[level]}</span>
          {isPlanned && draft.name === LEVEL_TEXT['as-planned'] ? '' : ` ${draft.name}`}
        </h3>
        {isPlanned ? null : (
          <div className="flex flex-wrap gap-2">
            <SmallButton
              isOff={up === null}
              label={moveText(up, 'Move up')}
              name={name}
              onClick={() => onMove(-1)}
              data-move="-1"
            />
            <SmallButton
              isOff={down === null}
              label={moveText(down, 'Move down')}
              name={name}
              onClick={() => onMove(1)}
              data-move="1"
            />
            <SmallButton label="Remove" name={name} onClick={onRemove} />
          </div>
        )}
      </div>
      <input type="hidden" name={`${prefix}option`} value={start.option ?? ''} />
      <div className="grid gap-x-8 gap-y-5 lg:grid-cols-[1fr_20rem]">
        <div className="min-w-0 space-y-5">
          <LineField
            name={`${prefix}name`}
            label="Name"
            of={name}
            value={draft.name}
            onChange={(event) => onChange({ name: event.target.value })}
          />
          <AreaField
            name={`${prefix}description`}
            label="What changes"
            of={name}
            defaultValue={start.description}
            rows={2}
            hint="One sentence."
          />
          {isPlanned ? null : (
            <Chips
              name={`${prefix}reasons`}
              label="Answers"
              of={name}
              choices={REASONS.map((reason) => [reason, reasonText(reason)] as const)}
              chosen={start.reasons ?? []}
            />
          )}
        </div>
        <FigurePicker
          name={`${prefix}figure`}
          label="Figure"
          of={name}
          value={draft.figure}
          onChange={(figure) => onChange({ figure })}
          none="The movement’s own"
          drawnForNone={movementFigure || 'standing'}
        />
      </div>
      <OwnTiming prefix={prefix} start={start} name={name} />
    </Removable>
  )
}

/** Seldom needed, so it is closed until there is something in it, or wrong with it. */
function OwnTiming({
  prefix,
  start,
  name,
}: {
  prefix: string
  start: Partial<MovementOption>
  name: string
}) {
  const details = useRef<HTMLDetailsElement>(null)
  const errors = use(FieldErrors)
  const isWrong = Object.keys(errors).some((field) =>
    OWN_TIMING.some((one) => field === `${prefix}${one}` || field === `${prefix}${one}.0`),
  )
  useLayoutEffect(() => {
    // Before the form gives the first wrong field the focus: it could not have it in here otherwise.
    if (details.current && isWrong) details.current.open = true
  }, [isWrong, errors])
  useLayoutEffect(() => {
    if (details.current && OWN_TIMING.some((one) => start[one] !== undefined)) {
      details.current.open = true
    }
  }, [start])
  return (
    <details ref={details} className="mt-3">
      <summary className="flex min-h-12 w-fit cursor-pointer items-center font-semibold text-rest underline decoration-3 underline-offset-6">
        Reps and tempo of its own<span className="sr-only">, {name}</span>
      </summary>
      <div className="space-y-5 pt-2">
        <LineField
          name={`${prefix}reps`}
          label="Reps"
          of={name}
          defaultValue={start.reps === undefined ? '' : writeReps(start.reps)}
          hint={`${REPS_HELP} Empty: as many as planned.`}
          className="w-full max-w-80"
        />
        <TimingFields prefix={prefix} of={name} timing={start} unsaid={AS_THE_MOVEMENT} />
      </div>
    </details>
  )
}
