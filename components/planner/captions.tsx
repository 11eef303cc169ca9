'use client'
import { useActionState, useId, useState } from 'react'
import { buttonClass } from '@/components/ui/button'
import { ChoiceBays } from '@/components/ui/choice-bays'
import { FieldError } from '@/components/ui/field-error'
import { FormMessage, useFormErrors } from '@/components/ui/form-errors'
import { KeptForm } from '@/components/ui/kept-form'
import { Notice } from '@/components/ui/notice'
import { SubmitButton } from '@/components/ui/submit-button'
import { Tick } from '@/components/ui/tick'
import { importCues } from '@/server/actions/planned-classes'
import { anchorText } from '@/server/contract/block-text'
import { plural } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'
import { MOST_CAPTION_LETTERS, type PlannedClass } from '@/server/contract/planned-classes'
import { cuesFromCaptions } from '@/server/engine/captions/import'

const TIMES = [
  { value: 'block', label: 'the block’s start' },
  { value: 'class', label: 'the class’s start' },
] as const
type TimesFrom = (typeof TIMES)[number]['value']

/** A class's captions to take away, and cues from a file of captions. */
export function Captions({ planned }: { planned: PlannedClass }) {
  return (
    <>
      <p className="mt-3">
        All that is said and shown in class, with its blocks as chapters, as WebVTT: for a video
        editor, a subtitle tool, or a translator.
      </p>
      <p className="mt-2 flex flex-wrap gap-x-6">
        <a
          className={buttonClass('text')}
          href={paths.api.captions(planned.classId, 'captions')}
          download
        >
          Download captions
        </a>
        <a
          className={buttonClass('text')}
          href={paths.api.captions(planned.classId, 'chapters')}
          download
        >
          Download chapters
        </a>
      </p>
      <ImportForm planned={planned} />
    </>
  )
}

function ImportForm({ planned }: { planned: PlannedClass }) {
  const [result, action, isPending] = useActionState(importCues, null)
  const { form, message } = useFormErrors(result)
  const id = useId()
  const { spec } = planned.version
  const blocks = spec.blocks.filter((block) => block.format.type !== 'rest')
  const [block, setBlock] = useState(blocks[0]?.id ?? spec.blocks[0]?.id ?? '')
  const [timesFrom, setTimesFrom] = useState<TimesFrom>('block')
  const [text, setText] = useState('')
  const [fileProblem, setFileProblem] = useState<string | undefined>()
  const fields = result && !result.ok ? result.fields : undefined
  // What was imported is in the class now: the form is empty for the next.
  const [done, setDone] = useState(result)
  if (result !== done) {
    setDone(result)
    if (result?.ok) setText('')
  }

  async function read(file: File | undefined): Promise<void> {
    if (!file) return
    if (file.size > MOST_CAPTION_LETTERS) {
      setFileProblem('That file is too large: 700 kB at most. Take a shorter part of it.')
      return
    }
    setFileProblem(undefined)
    setText(await file.text())
  }

  return (
    <KeptForm ref={form} action={action} isPending={isPending} className="mt-5 space-y-4">
      <h3 className="text-xl">Import cues</h3>
      <FormMessage result={result} ref={message} />
      {result?.ok ? (
        <Notice tone="saved">
          {plural(result.value.cues, 'cue')} in a new version
          {result.value.moved > 0 ? `, which ${plural(result.value.moved, 'date')} ahead use` : ''}.
        </Notice>
      ) : null}
      <input type="hidden" name="classId" value={planned.classId} />
      <input type="hidden" name="basedOn" value={planned.versionId} />
      <label className="block">
        <span className="font-semibold">Into the block</span>
        <select
          name="block"
          value={block}
          onChange={(event) => setBlock(event.target.value)}
          className="mt-1 block min-h-12 w-full border-4 border-line bg-raised px-3"
        >
          {spec.blocks.map((one) => (
            <option key={one.id} value={one.id}>
              {one.title}
            </option>
          ))}
        </select>
      </label>
      <fieldset>
        <legend className="mb-1 font-semibold">Its times count from</legend>
        <ChoiceBays
          name="timesFrom"
          choices={TIMES}
          chosen={timesFrom}
          onChoose={(value) => setTimesFrom(value)}
        />
      </fieldset>
      <div>
        <label htmlFor={`${id}-file`} className="font-semibold">
          A WebVTT file
        </label>
        <input
          id={`${id}-file`}
          type="file"
          accept=".vtt,text/vtt"
          onChange={(event) => void read(event.target.files?.[0])}
          className="mt-1 block w-full file:mr-4 file:min-h-12 file:cursor-pointer file:border-4 file:border-solid file:border-line file:bg-transparent file:px-4 file:font-semibold"
        />
        <FieldError id={`${id}-file-error`}>{fileProblem}</FieldError>
      </div>
      <div>
        <label htmlFor={`${id}-text`} className="font-semibold">
          or its text
        </label>
        <textarea
          id={`${id}-text`}
          name="captions"
          rows={6}
          value={text}
          onChange={(event) => setText(event.target.value)}
          spellCheck={false}
          aria-invalid={fields?.['captions'] ? true : undefined}
          aria-describedby={`${id}-text-error`}
          placeholder={'WEBVTT\n\n00:10.000 --> 00:13.000\nShoulders down'}
          className="mt-1 block w-full border-4 border-line bg-raised p-3 font-mono text-[0.95rem]"
        />
        <FieldError id={`${id}-text-error`}>{fields?.['captions']}</FieldError>
      </div>
      {text.trim() === '' ? null : (
        <Preview planned={planned} block={block} timesFrom={timesFrom} text={text} />
      )}
      {planned.ahead > 0 ? (
        <Tick name="ahead" defaultChecked>
          {plural(planned.ahead, 'date')} ahead take the new version
        </Tick>
      ) : null}
      <SubmitButton isPending={isPending} pending="Publishing">
        Publish with these cues
      </SubmitButton>
    </KeptForm>
  )
}

const MOST_SHOWN = 12

function Preview({
  planned,
  block,
  timesFrom,
  text,
}: {
  planned: PlannedClass
  block: string
  timesFrom: TimesFrom
  text: string
}) {
  const { cues, notCarried } = cuesFromCaptions(planned.version, block, text, { timesFrom })
  const own = planned.version.spec.blocks.find((one) => one.id === block)
  return (
    <div className="space-y-3" aria-live="polite">
      <p className="font-semibold">
        {cues.length === 0 ? 'No cue could be read from this.' : plural(cues.length, 'cue')}
      </p>
      {cues.length > 0 && own ? (
        <ul>
          {cues.slice(0, MOST_SHOWN).map((cue) => (
            <li key={cue.id} className="grid grid-cols-[8rem_1fr] border-b-2 border-fill py-1">
              <span className="text-text-quiet tabular-nums">{anchorText(own, cue.at)}</span>
              <span className="min-w-0 leading-snug [overflow-wrap:anywhere]">{cue.text}</span>
            </li>
          ))}
          {cues.length > MOST_SHOWN ? (
            <li className="py-1 text-text-quiet">and {cues.length - MOST_SHOWN} more</li>
          ) : null}
        </ul>
      ) : null}
      {notCarried.length > 0 ? (
        <div>
          <p className="font-semibold">Not carried over</p>
          <ul>
            {notCarried.slice(0, MOST_SHOWN).map(({ line, what }, index) => (
              <li key={index} className="border-b-2 border-fill py-1 leading-snug">
                {line === undefined ? '' : `Line ${line}: `}
                {what}
              </li>
            ))}
            {notCarried.length > MOST_SHOWN ? (
              <li className="py-1 text-text-quiet">and {notCarried.length - MOST_SHOWN} more</li>
            ) : null}
          </ul>
        </div>
      ) : null}
    </div>
  )
}
