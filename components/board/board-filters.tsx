import type { ReactNode } from 'react'
import {
  BOARD_STATES,
  BOARD_STATE_TEXT,
  type BoardState,
  type BoardView,
} from '@/server/contract/board-view'
import type { Block } from '@/server/engine/spec/schema'

interface BoardFiltersProps {
  view: BoardView
  setView: (view: BoardView) => void
  counts: Record<BoardState, number>
  blocks: readonly Block[]
  csvAddress: string
  phone: boolean
}

const OPTION_TEXT = {
  any: 'Any option',
  easier: 'Took an easier one',
  planned: 'Did it as planned',
  harder: 'Took a harder one',
} as const

/** What of the board is shown, and in which order. */
export function BoardFilters({
  view,
  setView,
  counts,
  blocks,
  csvAddress,
  phone,
}: BoardFiltersProps) {
  const controls = (
    <div className="flex flex-wrap items-end gap-x-6 gap-y-3">
      <Labelled label="Name">
        <input
          type="search"
          value={view.name}
          onChange={(event) => setView({ ...view, name: event.target.value })}
          maxLength={80}
          autoComplete="off"
          className="h-12 w-44 border-b-4 border-line bg-raised px-3"
        />
      </Labelled>
      <Labelled label="Show">
        <Select
          value={view.state}
          onChange={(state) => setView({ ...view, state: state as BoardView['state'] })}
          options={[
            ['all', 'Everybody'],
            ...BOARD_STATES.map(
              (state) => [state, `${BOARD_STATE_TEXT[state]} (${counts[state]})`] as const,
            ),
          ]}
        />
      </Labelled>
      <Labelled label="Option">
        <Select
          value={view.option}
          onChange={(option) => setView({ ...view, option: option as BoardView['option'] })}
          options={Object.entries(OPTION_TEXT)}
        />
      </Labelled>
      <Labelled label="Order">
        <Select
          value={view.sort}
          onChange={(sort) => setView({ ...view, sort: sort as BoardView['sort'], order: 'up' })}
          options={[
            ['attention', 'Look here first'],
            ['name', 'Name'],
            ['state', 'Where they stand'],
            ['heard', 'Last heard'],
            ['rpe', 'RPE'],
            ['rest', 'Rest beyond plan'],
            ...blocks
              .filter((block) => block.format.type !== 'rest')
              .map((block) => [`block:${block.id}`, block.title] as const),
          ]}
        />
      </Labelled>
      <label className="flex h-12 cursor-pointer items-center gap-3">
        <input
          type="checkbox"
          checked={view.flagged}
          onChange={(event) => setView({ ...view, flagged: event.target.checked })}
          className="size-6 accent-(--text)"
        />
        Only pain, stops and notes
      </label>
      <a
        href={csvAddress}
        download
        className="ml-auto flex h-12 items-center font-semibold text-rest underline decoration-2 underline-offset-4"
      >
        CSV of what is shown
      </a>
    </div>
  )
  if (!phone) return <div className="mt-4 mb-5">{controls}</div>
  return (
    <details className="my-4 border-y-2 border-line-lesser">
      <summary className="flex min-h-12 cursor-pointer items-center font-semibold">
        Filter and order
      </summary>
      <div className="pb-4">{controls}</div>
    </details>
  )
}

function Labelled({ label, children }: { label: string; children: ReactNode }) {
  return (
    <label className="block">
      <span className="block text-sm text-text-quiet">{label}</span>
      {children}
    </label>
  )
}

interface SelectProps {
  value: string
  onChange: (value: string) => void
  options: readonly (readonly [string, string])[]
}

function Select({ value, onChange, options }: SelectProps) {
  return (
    <select
      value={value}
      onChange={(event) => onChange(event.target.value)}
      className="h-12 max-w-56 cursor-pointer border-b-4 border-line bg-raised px-2"
    >
      {options.map(([key, text]) => (
        <option key={key} value={key}>
          {text}
        </option>
      ))}
    </select>
  )
}
