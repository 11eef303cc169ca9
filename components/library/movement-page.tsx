import clsx from 'clsx'
import Link from 'next/link'
import type { ReactNode } from 'react'
import { Figure } from '@/components/figure/figure'
import { PageTitle, Part } from '@/components/ui/heading'
import { Notice } from '@/components/ui/notice'
import { repsText } from '@/server/contract/block-text'
import { plural } from '@/server/contract/format'
import type { LibraryMovement } from '@/server/contract/library-types'
import {
  impactText,
  jointText,
  kitWords,
  LEVEL_TEXT,
  muscleText,
  ORIGIN_TEXT,
  patternText,
  positionText,
  reasonText,
  SIDES_TEXT,
  tempoText,
} from '@/server/contract/library-words'
import { paths } from '@/server/contract/paths'
import type { Movement, MovementOption } from '@/server/engine/spec/movement'
import { MovementActions } from './movement-actions'

/** A movement as its coaches know it: its options on one floor, how it is done, and where it is used. */
export function MovementPage({ found }: { found: LibraryMovement }) {
  const { movement, archived, origin } = found
  const kit = kitWords(movement.kit)
  return (
    <article>
      <div className="page">
        <p>
          <Link
            href={paths.library()}
            className="inline-flex min-h-12 items-center font-semibold text-rest underline decoration-3 underline-offset-6 hover:decoration-present"
          >
            Library
          </Link>
        </p>
        <div className="flex flex-wrap items-end justify-between gap-x-12 gap-y-5">
          <div className="min-w-0">
            <PageTitle size="long">{movement.name}</PageTitle>
            <p className="mt-3 text-lg">
              {patternText(movement.pattern)}, {positionText(movement.position).toLowerCase()},{' '}
              {impactText(movement.impact).toLowerCase()}, {kit === '' ? 'no kit' : kit}
            </p>
            <p className="text-text-quiet">{ORIGIN_TEXT[origin]}</p>
          </div>
          <MovementActions found={found} />
        </div>
        {archived ? (
          <Notice tone="info" className="mt-5">
            This movement is archived: it is not offered for new classes. Published classes that
            have it stay as they are.
          </Notice>
        ) : null}
      </div>
      <ul className="mt-3 grid gap-y-8 page sm:grid-cols-[repeat(auto-fit,minmax(15.5rem,1fr))]">
        {movement.options.map((option) => (
          <Option key={option.option} movement={movement} option={option} />
        ))}
      </ul>
      <div className="mt-12 grid gap-x-12 gap-y-10 page lg:grid-cols-[1.25fr_1fr]">
        <div className="min-w-0 space-y-10">
          <Part title="How it is done">
            <Said lead="Start">{movement.start}</Said>
            {movement.steps.length > 0 ? (
              <ol className="mt-3">
                {movement.steps.map((step, index) => (
                  <li
                    key={index}
                    className="grid grid-cols-[2.5rem_1fr] items-baseline border-b-4 border-fill py-2"
                  >
                    <span aria-hidden className="figures text-2xl">
                      {index + 1}
                    </span>
                    <span className="min-w-0 leading-snug [overflow-wrap:anywhere]">{step}</span>
                  </li>
                ))}
              </ol>
            ) : null}
          </Part>
          {movement.faults.length > 0 ? (
            <Part title="Faults">
              <dl>
                {movement.faults.map(({ fault, correction }, index) => (
                  <div
                    key={index}
                    className="grid gap-x-6 border-b-4 border-fill py-2.5 leading-snug sm:grid-cols-[1fr_1.4fr]"
                  >
                    <dt className="font-semibold [overflow-wrap:anywhere]">{fault}</dt>
                    <dd className="[overflow-wrap:anywhere]">{correction}</dd>
                  </div>
                ))}
              </dl>
            </Part>
          ) : null}
        </div>
        <div className="min-w-0 space-y-10">
          {movement.stopWhen ? (
            <Part title="When to stop">
              <p className="mt-4 border-l-8 border-stop pl-4 text-lg [overflow-wrap:anywhere]">
                {movement.stopWhen}
              </p>
            </Part>
          ) : null}
          {movement.cues.length > 0 ? (
            <Part title="Cues">
              <ul>
                {movement.cues.map((cue, index) => (
                  <li
                    key={index}
                    className="border-b-4 border-fill py-2 font-display text-lg font-bold [overflow-wrap:anywhere]"
                  >
                    {cue}
                  </li>
                ))}
              </ul>
            </Part>
          ) : null}
          <Part title="What it asks">
            <Facts movement={movement} />
          </Part>
          <Part title="Where it is used">
            <Used found={found} />
          </Part>
        </div>
      </div>
    </article>
  )
}

function Said({ lead, children }: { lead: string; children: string }) {
  if (children === '') return null
  return (
    <p className="mt-3 text-lg leading-snug [overflow-wrap:anywhere]">
      <strong>{lead}: </strong>
      {children}
    </p>
  )
}

/** The option's own pace where it has one, else the movement's. */
function timingOf(movement: Movement, option: MovementOption) {
  const own = option.tempo !== undefined || option.secondsPerRep !== undefined
  const { tempo, secondsPerRep } = own ? option : movement
  return { tempo, secondsPerRep }
}

function Option({ movement, option }: { movement: Movement; option: MovementOption }) {
  const isPlanned = option.level === 'as-planned'
  const own = [
    tempoText(option),
    option.reps === undefined ? null : `${repsText(option.reps)} reps`,
    option.sides === undefined ? null : SIDES_TEXT[option.sides],
    option.change === undefined ? null : `${option.change} s to change`,
  ].filter((one) => one !== null)
  return (
    <li className="flex min-w-0 flex-col">
      <div
        className={clsx(
          'flex h-40 items-end justify-center border-b-6 px-3 sm:h-48 lg:h-56',
          isPlanned ? 'border-line' : 'border-fill-strong',
        )}
      >
        <Figure
          figure={option.figure ?? movement.figure ?? 'standing'}
          timing={timingOf(movement, option)}
          frame="stature"
          className="h-full max-w-full overflow-visible"
        />
      </div>
      {/* A coach's own clip or picture of the option has its place here. */}
      <div className="pt-2.5 pr-6 leading-snug">
        <p className="flex">
          <span
            className={clsx(
              'border-2 px-2 py-0.5 condensed text-[0.95rem]',
              isPlanned
                ? 'border-on-present bg-present text-on-present'
                : 'border-line-lesser text-text',
            )}
          >
            {LEVEL_TEXT[option.level]}
          </span>
        </p>
        {isPlanned && option.name === LEVEL_TEXT['as-planned'] ? null : (
          <h2 className="mt-2 text-xl [overflow-wrap:anywhere]">{option.name}</h2>
        )}
        {option.reasons.length > 0 ? (
          <p className="mt-1 font-semibold">
            <span className="sr-only">Answers: </span>
            {option.reasons
              .map((reason, index) =>
                index === 0 ? reasonText(reason) : reasonText(reason).toLowerCase(),
              )
              .join(', ')}
          </p>
        ) : null}
        <p className="mt-1 [overflow-wrap:anywhere]">{option.description}</p>
        {own.length > 0 ? <p className="mt-1 text-text-quiet">{own.join('; ')}</p> : null}
      </div>
    </li>
  )
}

function Facts({ movement }: { movement: Movement }) {
  const { muscles } = movement
  const words = (list: readonly string[]) =>
    list.map((one, index) => (index === 0 ? one : one.toLowerCase())).join(', ')
  const facts: [string, ReactNode][] = [
    ['Loads', words(movement.joints.map(jointText)) || 'No joint in particular'],
    ...(muscles && muscles.primary.length > 0
      ? [['Works most', words(muscles.primary.map(muscleText))] satisfies [string, string]]
      : []),
    ...(muscles && muscles.secondary.length > 0
      ? [['Helps', words(muscles.secondary.map(muscleText))] satisfies [string, string]]
      : []),
    ...(movement.sides ? [['Sides', SIDES_TEXT[movement.sides]] satisfies [string, string]] : []),
    ['Tempo', tempoText(movement) ?? 'Not said: 3 s a rep are counted with'],
    [
      'Change after it',
      movement.change === undefined ? 'Not said: 4 s are counted with' : `${movement.change} s`,
    ],
  ]
  return (
    <dl>
      {facts.map(([name, value]) => (
        <div
          key={name}
          className="grid grid-cols-[8.5rem_1fr] gap-x-4 border-b-4 border-fill py-2 leading-snug"
        >
          <dt className="text-text-quiet">{name}</dt>
          <dd className="min-w-0">{value}</dd>
        </div>
      ))}
    </dl>
  )
}

function Used({ found: { usedIn, ahead } }: { found: LibraryMovement }) {
  if (usedIn.length === 0 && ahead === 0) {
    return <p className="mt-3 text-text-quiet">In no class yet.</p>
  }
  return (
    <>
      <ul>
        {usedIn.map(({ classId, title }) => (
          <li key={classId} className="border-b-4 border-fill">
            <Link
              href={paths.plannedClass(classId)}
              className="flex min-h-12 items-center py-1 font-display text-lg leading-tight font-bold [overflow-wrap:anywhere] decoration-3 underline-offset-6 hover:underline"
            >
              {title}
            </Link>
          </li>
        ))}
      </ul>
      <p className="mt-3 text-text-quiet">
        {ahead > 0 ? `${plural(ahead, 'date')} ahead.` : 'Not scheduled ahead.'} A published class
        keeps the movement as it was then.
      </p>
    </>
  )
}
