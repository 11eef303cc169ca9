'use client'
import { useLayoutEffect, useRef, useState } from 'react'
import { Button } from '@/components/ui/button'
import type { Movement } from '@/server/engine/spec/movement'
import { LineField } from './fields'
import { newKey } from './new-key'
import { Removable, SmallButton } from './removable'

/** Faults with what to say or do about them, as many as there are. */
export function FaultFields({ faults, touch }: { faults: Movement['faults']; touch: () => void }) {
  const [rows, setRows] = useState(() =>
    (faults.length > 0 ? faults : [{ fault: '', correction: '' }]).map((fault, index) => ({
      key: `f${index}`,
      ...fault,
      isRemoved: false,
    })),
  )
  const focusOn = useRef<string | null>(null)
  const list = useRef<HTMLFieldSetElement>(null)
  useLayoutEffect(() => {
    if (focusOn.current === null) return
    list.current?.querySelector<HTMLElement>(focusOn.current)?.focus()
    focusOn.current = null
  })
  const setRemoved = (key: string, isRemoved: boolean) => {
    touch()
    focusOn.current = `[data-fault="${key}"] ${isRemoved ? '[data-put-back]' : 'input'}`
    setRows(rows.map((one) => (one.key === key ? { ...one, isRemoved } : one)))
  }
  return (
    <fieldset ref={list} className="min-w-0">
      <legend className="font-semibold">Common faults</legend>
      <ul className="mt-1 space-y-5">
        {rows.map(({ key, fault, correction, isRemoved }, index) => (
          <Removable
            key={key}
            data-fault={key}
            isRemoved={isRemoved}
            name={fault || `fault ${index + 1}`}
            onPutBack={() => setRemoved(key, false)}
          >
            <div className="grid items-end gap-x-4 gap-y-3 sm:grid-cols-[1fr_1.4fr_auto]">
              <LineField name={`faults.${key}.fault`} label="Fault" defaultValue={fault} />
              <LineField
                name={`faults.${key}.correction`}
                label="What to say or do"
                defaultValue={correction}
              />
              <div className="pb-1">
                <SmallButton
                  label="Remove"
                  name={`fault ${index + 1}`}
                  onClick={() => setRemoved(key, true)}
                />
              </div>
            </div>
          </Removable>
        ))}
      </ul>
      <Button
        look="text"
        onClick={() => {
          touch()
          const key = newKey()
          focusOn.current = `[name="faults.${key}.fault"]`
          setRows([...rows, { key, fault: '', correction: '', isRemoved: false }])
        }}
      >
        Add a fault
      </Button>
    </fieldset>
  )
}
