'use client'
import { unstable_rethrow } from 'next/navigation'
import { useActionState, useRef, useState, type RefObject } from 'react'
import { LinkButton } from '@/components/ui/button'
import { FormMessage, useFormErrors } from '@/components/ui/form-errors'
import { Part } from '@/components/ui/heading'
import { KeptForm } from '@/components/ui/kept-form'
import { SubmitButton } from '@/components/ui/submit-button'
import { Tick } from '@/components/ui/tick'
import { saveMovement } from '@/server/actions/library'
import type { ActionResult } from '@/server/contract/errors'
import type { LibraryMovement } from '@/server/contract/library-types'
import {
  impactText,
  jointText,
  KIT_ITEMS,
  muscleText,
  patternText,
  positionText,
} from '@/server/contract/library-words'
import { paths } from '@/server/contract/paths'
import type { Movement, MovementOption } from '@/server/engine/spec/movement'
import {
  AS_PLANNED,
  IMPACTS,
  JOINTS,
  MUSCLES,
  PATTERNS,
  POSITIONS,
} from '@/server/engine/spec/names'
import { AreaField, Chips, FieldErrors, LineField, SelectField } from './fields'
import { FaultFields } from './fault-fields'
import { FigurePicker } from './figure-picker'
import { OptionList } from './option-list'
import { TimingFields } from './timing-fields'
import { useUnsaved } from './use-unsaved'

const NO_ERRORS: Readonly<Record<string, string>> = {}
const NEW_PLANNED: MovementOption = {
  option: AS_PLANNED,
  name: 'As planned',
  level: 'as-planned',
  reasons: [],
  description: '',
}
const UNSAID = {
  tempo: 'Empty: 3 s a rep are counted with.',
  sides: 'Not said',
  change: 'Empty: 4 s are counted with.',
}

/** A lost connection must not take the form away, and what is typed with it. */
async function saveOrSay(before: ActionResult | null, form: FormData): Promise<ActionResult> {
  try {
    return await saveMovement(before, form)
  } catch (error) {
    unstable_rethrow(error)
    return {
      ok: false,
      message:
        'The gym’s records could not be reached, so nothing was saved. All that you typed is still here: try again in a moment.',
    }
  }
}

/** A movement with all that belongs to it. `found` null: a new one. */
export function MovementForm({ found }: { found: LibraryMovement | null }) {
  const [result, action, isPending] = useActionState(saveOrSay, null)
  const { form, message } = useFormErrors(result)
  const isDirty = useRef(false)
  useUnsaved(isDirty)
  const movement: Partial<Movement> = found?.movement ?? {}
  const [figure, setFigure] = useState(movement.figure ?? '')
  const errors = (result && !result.ok && result.fields) || NO_ERRORS
  const isConflict = 'basedOn' in errors
  const touch = () => {
    isDirty.current = true
  }
  return (
    <FieldErrors value={errors}>
      <KeptForm
        ref={form}
        action={action}
        isPending={isPending}
        onChange={touch}
        className="mt-6 max-w-5xl space-y-12 [&_:is(input,select,textarea,button)]:scroll-my-32"
      >
        <input type="hidden" name="slug" value={found?.movement.slug ?? ''} />
        <input type="hidden" name="basedOn" value={found?.token ?? ''} />
        {result && !result.ok ? (
          <div className="space-y-3">
            <FormMessage result={result} ref={message} />
            {isConflict && found ? (
              <Conflict slug={found.movement.slug} />
            ) : (
              <ErrorList errors={errors} form={form} />
            )}
          </div>
        ) : null}
        <Part title="What it is">
          <div className="mt-5 grid gap-x-8 gap-y-6 lg:grid-cols-[1fr_20rem]">
            <div className="min-w-0 space-y-6">
              <LineField name="name" label="Name" defaultValue={movement.name} required />
              <div className="grid gap-x-8 gap-y-6 sm:grid-cols-2">
                <SelectField
                  name="pattern"
                  label="Pattern"
                  defaultValue={movement.pattern ?? ''}
                  choices={[
                    ...(movement.pattern ? [] : [['', 'Choose one'] as const]),
                    ...PATTERNS.map((one) => [one, patternText(one)] as const),
                  ]}
                />
                <SelectField
                  name="position"
                  label="Position"
                  defaultValue={movement.position ?? ''}
                  choices={[
                    ...(movement.position ? [] : [['', 'Choose one'] as const]),
                    ...POSITIONS.map((one) => [one, positionText(one)] as const),
                  ]}
                />
              </div>
              <Chips
                single
                name="impact"
                label="Impact"
                choices={IMPACTS.map((one) => [one, impactText(one)] as const)}
                chosen={movement.impact ? [movement.impact] : []}
              />
              <Chips
                name="joints"
                label="Joints that it loads"
                choices={JOINTS.map((one) => [one, jointText(one)] as const)}
                chosen={movement.joints ?? []}
              />
            </div>
            <FigurePicker
              name="figure"
              label="Figure"
              value={figure}
              onChange={(next) => {
                touch()
                setFigure(next)
              }}
              none="None: a person who stands"
              drawnForNone="standing"
            />
          </div>
          <div className="mt-6 space-y-6">
            <Chips
              name="primary"
              label="Muscles that work most"
              choices={MUSCLES.map((one) => [one, muscleText(one)] as const)}
              chosen={movement.muscles?.primary ?? []}
            />
            <Chips
              name="secondary"
              label="Muscles that help"
              choices={MUSCLES.map((one) => [one, muscleText(one)] as const)}
              chosen={movement.muscles?.secondary ?? []}
            />
          </div>
        </Part>
        <Part title="Kit">
          <KitFields kit={movement.kit ?? []} />
        </Part>
        <Part title="Tempo">
          <div className="mt-5">
            <TimingFields prefix="" timing={movement} unsaid={UNSAID} />
          </div>
        </Part>
        <Part title="How it is done">
          <div className="mt-5 space-y-6">
            <AreaField name="start" label="Start" defaultValue={movement.start} rows={2} />
            <AreaField
              name="steps"
              label="Steps"
              defaultValue={movement.steps?.join('\n')}
              rows={4}
              hint="One a line."
            />
            <AreaField
              name="cues"
              label="Cues"
              defaultValue={movement.cues?.join('\n')}
              rows={4}
              hint="One a line, short enough to call out: 80 letters at most."
            />
            <FaultFields faults={movement.faults ?? []} touch={touch} />
            <AreaField
              name="stopWhen"
              label="When to stop"
              defaultValue={movement.stopWhen}
              rows={2}
            />
          </div>
        </Part>
        <OptionList options={movement.options ?? [NEW_PLANNED]} figure={figure} touch={touch} />
        <div className="sticky bottom-0 z-10 -mx-2 flex flex-wrap items-center gap-x-4 gap-y-2 border-t-4 border-line bg-ground px-2 py-3">
          <SubmitButton isPending={isPending} pending="Saving">
            {found ? 'Save' : 'Save movement'}
          </SubmitButton>
          <LinkButton
            look="text"
            href={found ? paths.movement(found.movement.slug) : paths.library()}
          >
            Cancel
          </LinkButton>
          {found?.origin === 'built-in' ? (
            <p className="text-[0.9em] leading-snug text-text-quiet sm:ml-auto">
              Saving makes your gym’s own copy.
            </p>
          ) : null}
        </div>
      </KeptForm>
    </FieldErrors>
  )
}

/** What is wrong, each a way to its field. */
function ErrorList({
  errors,
  form,
}: {
  errors: Readonly<Record<string, string>>
  form: RefObject<HTMLFormElement | null>
}) {
  const names = Object.keys(errors)
  if (names.length < 2) return null
  const go = (name: string) => {
    const field = [...(form.current?.querySelectorAll<HTMLElement>('[name]') ?? [])].find(
      (one) => one.getAttribute('name') === name,
    )
    const target = field?.matches('[type=hidden]')
      ? field.parentElement?.querySelector('button')
      : field
    target?.focus()
  }
  return (
    <ul className="border-l-8 border-stop pl-4">
      {names.map((name) => (
        <li key={name}>
          <button
            type="button"
            onClick={() => go(name)}
            className="min-h-11 cursor-pointer py-1 text-left leading-snug text-rest underline decoration-2 underline-offset-4"
          >
            {wordsOf(name)}: {errors[name]}
          </button>
        </li>
      ))}
    </ul>
  )
}

const FIELD_WORDS: Record<string, string> = {
  stopWhen: 'When to stop',
  otherKit: 'Kit',
  secondsPerRep: 'Seconds a rep',
  primary: 'Muscles',
  secondary: 'Muscles',
  reasons: 'Answers',
  description: 'What changes',
  change: 'Seconds to change',
}

/** 'Option: Name' of 'options.k1.name'. */
function wordsOf(name: string): string {
  const parts = name.split('.').filter((part) => !/^\d+$/.test(part))
  const field = parts.at(-1) ?? name
  const word = FIELD_WORDS[field] ?? field.charAt(0).toUpperCase() + field.slice(1)
  if (parts.length < 3) return word
  return `${parts[0] === 'options' ? 'Option' : 'Fault'}: ${word}`
}

function Conflict({ slug }: { slug: string }) {
  return (
    <div className="border-l-8 border-present pl-4">
      <p>
        All that you typed is still here.{' '}
        <a
          href={paths.movement(slug)}
          target="_blank"
          className="font-semibold text-rest underline decoration-3 underline-offset-4"
        >
          Look at what was changed
        </a>{' '}
        (in a new tab), then save yours in its place or carry over what you need.
      </p>
      <Tick name="over">Save mine in place of it</Tick>
    </div>
  )
}

function KitFields({ kit }: { kit: readonly string[] }) {
  const others = kit.filter((item) => !KIT_ITEMS.some((one) => one === item))
  return (
    <div className="mt-5 space-y-6">
      <div className="grid grid-cols-2 gap-x-6 gap-y-5 sm:grid-cols-3 lg:grid-cols-6">
        {KIT_ITEMS.map((item) => {
          const count = kit.filter((one) => one === item).length
          return (
            <SelectField
              key={item}
              name={`kit.${item}`}
              label={item.charAt(0).toUpperCase() + item.slice(1)}
              defaultValue={String(count)}
              choices={Array.from({ length: Math.max(3, count + 1) }, (_, index) => [
                String(index),
                index === 0 ? 'None' : String(index),
              ])}
            />
          )
        })}
      </div>
      <AreaField
        name="otherKit"
        label="Other kit"
        defaultValue={others.join('\n')}
        rows={1}
        hint="One thing a line, in the singular."
      />
    </div>
  )
}
