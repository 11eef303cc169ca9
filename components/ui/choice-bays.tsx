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
            'relative -ml-0.5 flex min-h-13 min-w-20 cursor-pointer items-center justify-center px-4 font-semibold first:ml-0 has-focus-visible:outline-4 has-focus-visible:outline-offset-3 has-focus-visible:outline-present',
            value === chosen
              ? 'z-10 bg-present text-on-present outline-4 -outline-offset-2 outline-on-present'
              : 'border-2 border-line-lesser hover:bg-fill',
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
