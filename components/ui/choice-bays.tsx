'use client'
import clsx from 'clsx'

interface ChoiceBaysProps<Value extends string> {
  name: string
  choices: readonly { value: Value; label: string }[]
  chosen: Value | undefined
  onChoose: (value: Value) => void
}

/**
 * A few words side by side of which one is chosen: bays with one line between them, the chosen one filled and
 * framed. Stands in a fieldset whose legend says what is chosen.
 */
export function ChoiceBays<Value extends string>({
  name,
  choices,
  chosen,
  onChoose,
}: ChoiceBaysProps<Value>) {
  return (
    <div className="flex">
      {choices.map(({ value, label }) => (
        <label
          key={value}
          className={clsx(
            'relative -ml-0.5 flex min-h-13 min-w-20 cursor-pointer items-center justify-center font-semibold first:ml-0 has-focus-visible:z-20 has-focus-visible:shadow-[0_0_0_2px_var(--text)] has-focus-visible:outline-4 has-focus-visible:outline-offset-2 has-focus-visible:outline-present',
            value === chosen
              ? 'z-10 border-4 border-on-present bg-present px-3.5 text-on-present'
              : 'border-2 border-line-lesser px-4 hover:bg-fill',
          )}
        >
          <input
            type="radio"
            name={name}
            value={value}
            checked={value === chosen}
            onChange={() => onChoose(value)}
            className="sr-only"
          />
          {label}
        </label>
      ))}
    </div>
  )
}
