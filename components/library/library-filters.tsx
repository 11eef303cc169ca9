'use client'
import clsx from 'clsx'
import { useId, type ReactNode } from 'react'
import {
  jointValue,
  NO_KIT,
  parseLibraryFilter,
  type LibraryFilter,
} from '@/server/contract/library-filter'
import {
  impactText,
  jointText,
  KIT_ITEMS,
  patternText,
  positionText,
} from '@/server/contract/library-words'
import { IMPACTS, JOINTS, PATTERNS, POSITIONS } from '@/server/engine/spec/names'

interface LibraryFiltersProps {
  filter: LibraryFilter
  setFilter: (filter: LibraryFilter) => void
  /** Kit that movements of this library take. */
  kit: readonly string[]
  address: string
}

type Choices = readonly (readonly [value: string, text: string])[]

/**
 * What of the library is shown. A form that asks for an address: without a script its button does what
 * typing and choosing do with one.
 */
export function LibraryFilters({ filter, setFilter, kit, address }: LibraryFiltersProps) {
  const id = useId()
  const read = (form: HTMLFormElement) => {
    const params = new URLSearchParams()
    for (const [name, value] of new FormData(form)) {
      if (typeof value === 'string') params.set(name, value)
    }
    setFilter(parseLibraryFilter(params))
  }
  const chosen = [filter.pattern, filter.kit, filter.position, filter.joint, filter.impact].filter(
    Boolean,
  ).length
  const items = [...new Set([...KIT_ITEMS, ...kit])]
  // Columns of set shares: as wide as their words they would break anew once the letters have come.
  return (
    <form
      role="search"
      aria-label="Movements"
      action={address}
      onSubmit={(event) => {
        event.preventDefault()
        read(event.currentTarget)
      }}
      className="mt-5 grid max-w-[88rem] items-end gap-x-4 gap-y-3 sm:grid-cols-4 xl:grid-cols-[1.5fr_1.2fr_1.05fr_1.15fr_1.45fr_1fr_1.2fr]"
    >
      <Labelled label="Search">
        <input
          type="search"
          name="q"
          value={filter.q}
          onChange={(event) => setFilter({ ...filter, q: event.target.value })}
          maxLength={80}
          autoComplete="off"
          className="h-12 w-full border-b-4 border-line bg-raised px-3"
        />
      </Labelled>
      <input id={`${id}-open`} type="checkbox" className="peer sr-only sm:hidden" />
      <label
        htmlFor={`${id}-open`}
        className="flex min-h-12 cursor-pointer items-center font-semibold text-rest underline decoration-3 underline-offset-6 peer-focus-visible:outline-4 peer-focus-visible:outline-present sm:hidden"
      >
        Filters{chosen > 0 ? ` (${chosen})` : ''}
      </label>
      <div className="gap-x-4 gap-y-3 max-sm:hidden max-sm:grid-cols-2 max-sm:peer-checked:grid sm:contents">
        <Choice
          label="Pattern"
          name="pattern"
          value={filter.pattern ?? ''}
          onChange={read}
          choices={[['', 'Any'], ...PATTERNS.map((one) => [one, patternText(one)] as const)]}
        />
        <Choice
          label="Kit"
          name="kit"
          value={filter.kit ?? ''}
          onChange={read}
          choices={[
            ['', 'Any or none'],
            [NO_KIT, 'Without kit'],
            ...items.map((one) => [one, one.charAt(0).toUpperCase() + one.slice(1)] as const),
          ]}
        />
        <Choice
          label="Position"
          name="position"
          value={filter.position ?? ''}
          onChange={read}
          choices={[['', 'Any'], ...POSITIONS.map((one) => [one, positionText(one)] as const)]}
        />
        <Choice
          label="Joint"
          name="joint"
          value={jointValue(filter)}
          onChange={read}
          choices={[
            ['', 'Any'],
            ...JOINTS.map(
              (joint) =>
                [
                  jointValue({ joint, spares: true }),
                  `Spares ${jointText(joint).toLowerCase()}`,
                ] as const,
            ),
            ...JOINTS.map((joint) => [joint, `Loads ${jointText(joint).toLowerCase()}`] as const),
          ]}
        />
        <Choice
          label="Impact"
          name="impact"
          value={filter.impact ?? ''}
          onChange={read}
          choices={[['', 'Any'], ...IMPACTS.map((one) => [one, impactText(one)] as const)]}
        />
        <Choice
          label="Show"
          name="show"
          value={filter.show}
          onChange={read}
          choices={[
            ['ready', 'All in use'],
            ['own', 'Only your gym’s'],
            ['archived', 'Archived'],
          ]}
        />
      </div>
      <noscript>
        <button type="submit" className="h-12 border-4 border-line px-5 font-semibold">
          Show these
        </button>
      </noscript>
    </form>
  )
}

function Labelled({
  label,
  className,
  children,
}: {
  label: string
  className?: string
  children: ReactNode
}) {
  return (
    <label className={clsx('block min-w-0', className)}>
      <span className="block text-sm text-text-quiet">{label}</span>
      {children}
    </label>
  )
}

function Choice({
  label,
  name,
  value,
  onChange,
  choices,
}: {
  label: string
  name: string
  value: string
  onChange: (form: HTMLFormElement) => void
  choices: Choices
}) {
  return (
    <Labelled label={label}>
      <select
        name={name}
        value={value}
        onChange={(event) => {
          if (event.target.form) onChange(event.target.form)
        }}
        className="h-12 w-full cursor-pointer border-b-4 border-line bg-raised px-2"
      >
        {choices.map(([key, text]) => (
          <option key={key} value={key}>
            {text}
          </option>
        ))}
      </select>
    </Labelled>
  )
}
