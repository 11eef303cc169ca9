'use client'
import { use, useId } from 'react'
import { FieldError } from '@/components/ui/field-error'
import { SIDES_TEXT } from '@/server/contract/library-words'
import { SIDES, type Sides, type Tempo } from '@/server/engine/spec/schema'
import { FieldErrors, LineField, SelectField } from './fields'

const PARTS = ['down', 'bottom', 'up', 'top'] as const

interface TimingFieldsProps {
  /** Before each field's name: '' or 'options.k1.'. */
  prefix: string
  of?: string | undefined
  timing: {
    tempo?: Tempo | undefined
    secondsPerRep?: number | undefined
    sides?: Sides | undefined
    change?: number | undefined
  }
  /** What an empty field means. */
  unsaid: { tempo: string; sides: string; change: string }
}

/** How long a rep takes, which side, and how long it takes to get to what comes next. */
export function TimingFields({ prefix, of, timing, unsaid }: TimingFieldsProps) {
  const id = useId()
  const error = use(FieldErrors)[`${prefix}tempo.0`]
  const text = (value: number | undefined) => (value === undefined ? '' : String(value))
  return (
    <div className="grid gap-x-8 gap-y-5 sm:grid-cols-2">
      <fieldset className="min-w-0">
        <legend className="font-semibold">
          Tempo{of ? <span className="sr-only">, {of}</span> : null}
        </legend>
        <div className="mt-1 flex gap-2">
          {PARTS.map((part, index) => (
            <label key={part} className="min-w-0 flex-1">
              <input
                name={`${prefix}tempo.${index}`}
                defaultValue={text(timing.tempo?.[index])}
                inputMode="decimal"
                autoComplete="off"
                aria-invalid={error ? true : undefined}
                aria-describedby={error ? `${id}-error` : undefined}
                className={`h-13 w-full border-4 bg-raised px-1 text-center tabular-nums ${error ? 'border-stop' : 'border-line-lesser'}`}
              />
              <span className="block text-center text-[0.9em] text-text-quiet">{part}</span>
            </label>
          ))}
        </div>
        <p className="text-[0.9em] leading-snug text-text-quiet">Seconds. {unsaid.tempo}</p>
        <FieldError id={`${id}-error`}>{error}</FieldError>
      </fieldset>
      <LineField
        name={`${prefix}secondsPerRep`}
        label="or seconds a rep"
        of={of}
        defaultValue={text(timing.secondsPerRep)}
        inputMode="decimal"
        hint="Where four figures say too much. The tempo counts where both are given."
        className="w-32 text-center tabular-nums"
      />
      <SelectField
        name={`${prefix}sides`}
        label="Sides"
        of={of}
        defaultValue={timing.sides ?? ''}
        choices={[['', unsaid.sides], ...SIDES.map((one) => [one, SIDES_TEXT[one]] as const)]}
      />
      <LineField
        name={`${prefix}change`}
        label="Seconds to change"
        of={of}
        defaultValue={text(timing.change)}
        inputMode="decimal"
        hint={`From here to what comes next. ${unsaid.change}`}
        className="w-32 text-center tabular-nums"
      />
    </div>
  )
}
