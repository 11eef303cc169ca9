'use client'
import clsx from 'clsx'
import { use, useId, useRef, useState } from 'react'
import { StillFigure } from '@/components/figure/still-figure'
import { Button } from '@/components/ui/button'
import { FieldError } from '@/components/ui/field-error'
import { figureText } from '@/server/contract/library-words'
import { FIGURE_SLUGS } from '@/server/engine/figure/slugs'
import { FieldErrors } from './fields'

interface FigurePickerProps {
  name: string
  label: string
  of?: string | undefined
  /** '' for none. */
  value: string
  onChange: (figure: string) => void
  /** What none means, and the figure that is then drawn. */
  none: string
  drawnForNone: string
}

/** A figure chosen from pictures of all of them. */
export function FigurePicker({
  name,
  label,
  of,
  value,
  onChange,
  none,
  drawnForNone,
}: FigurePickerProps) {
  const dialog = useRef<HTMLDialogElement>(null)
  const [isOpen, setOpen] = useState(false)
  const [q, setQ] = useState('')
  const id = useId()
  const error = use(FieldErrors)[name]
  const words = q
    .toLowerCase()
    .split(/[\s-]+/)
    .filter(Boolean)
  const found = FIGURE_SLUGS.filter((slug) => words.every((word) => slug.includes(word)))
  const choose = (figure: string) => {
    onChange(figure)
    dialog.current?.close()
  }
  return (
    <div className="min-w-0">
      <p className="font-semibold">
        {label}
        {of ? <span className="sr-only">, {of}</span> : null}
      </p>
      <input type="hidden" name={name} value={value} />
      <div className="mt-1 flex items-end gap-4 border-b-4 border-line">
        <StillFigure
          figure={value || drawnForNone}
          label=""
          frame="stature"
          className="h-32 w-32 shrink-0 overflow-visible"
        />
        <div className="min-w-0 pb-3">
          <p className="leading-snug">{value === '' ? none : figureText(value)}</p>
          <button
            type="button"
            aria-haspopup="dialog"
            aria-describedby={error ? `${id}-error` : undefined}
            onClick={() => {
              setOpen(true)
              dialog.current?.showModal()
            }}
            className="min-h-11 cursor-pointer text-left font-semibold text-rest underline decoration-3 underline-offset-6 hover:decoration-present"
          >
            Choose a figure
            {of ? <span className="sr-only"> for {of}</span> : null}
          </button>
        </div>
      </div>
      <FieldError id={`${id}-error`}>{error}</FieldError>
      <dialog
        ref={dialog}
        aria-labelledby={`${id}-title`}
        onClose={() => setOpen(false)}
        className="m-auto h-[calc(100dvh-1.5rem)] max-h-none w-[min(64rem,calc(100vw-1.5rem))] max-w-none border-t-12 border-present bg-ground p-0 text-text backdrop:bg-text/70"
      >
        {isOpen ? (
          <div className="flex h-full flex-col">
            <div className="flex flex-wrap items-end gap-x-6 gap-y-3 border-b-4 border-line px-4 py-4 sm:px-6">
              <h2 id={`${id}-title`} className="w-full text-2xl sm:w-auto sm:text-3xl">
                {label}
                {of ? <span className="text-text-quiet">, {of}</span> : null}
              </h2>
              <label className="min-w-0 flex-1">
                <span className="block text-sm text-text-quiet">Search</span>
                <input
                  type="search"
                  value={q}
                  onChange={(event) => {
                    // Not typed into the movement: the form has nothing of it to save.
                    event.stopPropagation()
                    setQ(event.target.value)
                  }}
                  onKeyDown={(event) => {
                    if (event.key === 'Enter') event.preventDefault()
                  }}
                  autoComplete="off"
                  className="h-12 w-full border-b-4 border-line bg-raised px-3"
                />
              </label>
              <Button look="outlined" onClick={() => dialog.current?.close()}>
                Close
              </Button>
            </div>
            <ul className="grid min-h-0 flex-1 grid-cols-[repeat(auto-fill,minmax(8.5rem,1fr))] content-start gap-3 overflow-y-auto px-4 py-4 sm:px-6">
              <li>
                <Choice
                  figure={drawnForNone}
                  text={none}
                  isChosen={value === ''}
                  onChoose={() => choose('')}
                />
              </li>
              {found.map((slug) => (
                <li key={slug}>
                  <Choice
                    figure={slug}
                    text={figureText(slug)}
                    isChosen={value === slug}
                    onChoose={() => choose(slug)}
                  />
                </li>
              ))}
              {found.length === 0 ? (
                <li className="col-span-full py-3 text-lg">No figure is called that.</li>
              ) : null}
            </ul>
          </div>
        ) : null}
      </dialog>
    </div>
  )
}

function Choice({
  figure,
  text,
  isChosen,
  onChoose,
}: {
  figure: string
  text: string
  isChosen: boolean
  onChoose: () => void
}) {
  return (
    <button
      type="button"
      aria-pressed={isChosen}
      onClick={onChoose}
      className={clsx(
        'flex h-full w-full cursor-pointer flex-col hover:bg-fill',
        isChosen ? 'border-4 border-line bg-raised' : 'border-4 border-fill',
      )}
    >
      <StillFigure
        figure={figure}
        label=""
        frame="stature"
        className="mt-4 h-28 w-full overflow-visible border-b-4 border-line-lesser px-2"
      />
      <span
        className={clsx(
          'flex-1 px-2 py-1.5 text-left leading-tight',
          isChosen && 'bg-present font-semibold text-on-present',
        )}
      >
        {text}
        {isChosen ? <span className="sr-only">, chosen</span> : null}
      </span>
    </button>
  )
}
