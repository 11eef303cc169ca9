'use client'
import { use, useId, useLayoutEffect, useRef, useState } from 'react'
import { Button } from '@/components/ui/button'
import { FieldError } from '@/components/ui/field-error'
import { Part } from '@/components/ui/heading'
import type { Level, MovementOption } from '@/server/engine/spec/movement'
import { FieldErrors } from './fields'
import { newKey } from './new-key'
import { OptionFields, type OptionDraft } from './option-fields'

interface OptionListProps {
  options: readonly MovementOption[]
  figure: string
  touch: () => void
}

/**
 * Options from the easiest to the hardest. Where one stands says its level: before the planned one it is
 * easier, after it harder.
 */
export function OptionList({ options, figure, touch }: OptionListProps) {
  const [rows, setRows] = useState<OptionDraft[]>(() =>
    options.map((option, index) => ({
      key: `o${index}`,
      start: option,
      name: option.name,
      figure: option.figure ?? '',
      isRemoved: false,
    })),
  )
  const [said, setSaid] = useState('')
  const error = use(FieldErrors)['options']
  const id = useId()
  const list = useRef<HTMLElement>(null)
  const focusOn = useRef<string | null>(null)
  useLayoutEffect(() => {
    if (focusOn.current === null) return
    list.current?.querySelector<HTMLElement>(focusOn.current)?.focus()
    focusOn.current = null
  })
  const plannedAt = rows.findIndex((row) => row.start.level === 'as-planned')
  const levelAt = (index: number, planned = plannedAt): Level =>
    index === planned ? 'as-planned' : index < planned ? 'easier' : 'harder'

  const add = (level: 'easier' | 'harder') => {
    touch()
    const key = newKey()
    const row: OptionDraft = {
      key,
      start: level === 'harder' ? { reasons: ['wants-more'] } : {},
      name: '',
      figure: '',
      isRemoved: false,
    }
    focusOn.current = `[name="options.${key}.name"]`
    const at = level === 'easier' ? plannedAt : rows.length
    setRows([...rows.slice(0, at), row, ...rows.slice(at)])
  }
  /** The place of the next row that is not removed; null where there is none. */
  const nextPlace = (index: number, by: -1 | 1): number | null => {
    for (let place = index + by; rows[place] !== undefined; place += by) {
      if (rows[place]?.isRemoved === false) return place
    }
    return null
  }
  const move = (index: number, by: -1 | 1) => {
    const [row, to] = [rows[index], nextPlace(index, by)]
    if (!row || to === null) return
    touch()
    const next = rows.filter((one) => one !== row)
    next.splice(to, 0, row)
    focusOn.current = `[data-option="${row.key}"] [data-move="${by}"]`
    const planned = next.findIndex((one) => one.start.level === 'as-planned')
    const left = next.filter((one) => !one.isRemoved)
    setSaid(
      `${row.name || 'The new option'}: ${levelAt(to, planned)}, option ${left.indexOf(row) + 1} of ${left.length}`,
    )
    setRows(next)
  }
  /** The level that a row would have after a move; null where there is no place. */
  const levelAfter = (index: number, by: -1 | 1): Level | null => {
    const to = nextPlace(index, by)
    if (to === null) return null
    if (to !== plannedAt) return levelAt(index)
    return by < 0 ? 'easier' : 'harder'
  }
  const change = (key: string, what: Partial<OptionDraft>) => {
    touch()
    setRows(rows.map((one) => (one.key === key ? { ...one, ...what } : one)))
  }
  return (
    <section ref={list}>
      <Part title="Options" beside={<span className="text-text-quiet">easiest first</span>}>
        <p className="sr-only" aria-live="polite">
          {said}
        </p>
        <ul className="mt-6 space-y-10">
          {rows.map((row, index) => (
            <OptionFields
              key={row.key}
              draft={row}
              level={levelAt(index)}
              up={levelAfter(index, -1)}
              down={levelAfter(index, 1)}
              onMove={(by) => move(index, by)}
              onRemove={() => {
                focusOn.current = `[data-option="${row.key}"] [data-put-back]`
                change(row.key, { isRemoved: true })
              }}
              onPutBack={() => {
                focusOn.current = `[name="options.${row.key}.name"]`
                change(row.key, { isRemoved: false })
              }}
              onChange={(what) => change(row.key, what)}
              movementFigure={figure}
            />
          ))}
        </ul>
        <div className="mt-8 flex flex-wrap gap-4">
          <Button look="outlined" onClick={() => add('easier')}>
            Add an easier option
          </Button>
          <Button look="outlined" onClick={() => add('harder')}>
            Add a harder option
          </Button>
        </div>
        <FieldError id={`${id}-error`}>{error}</FieldError>
      </Part>
    </section>
  )
}
