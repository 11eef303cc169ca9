'use client'
import clsx from 'clsx'
import { useMemo, useState, type ReactNode } from 'react'
import { Lane } from '@/components/lane/lane'
import { paths } from '@/server/contract/paths'
import { HURT_PLACE_TEXT } from '@/server/engine/fit/hurt'
import { TODAY_QUESTION } from '@/server/engine/fit/screening'
import { compile } from '@/server/engine/timeline/compile'
import type { Counting } from '@/server/engine/tally/events'
import { ActionButton } from './button'
import { fittedOf, holdOn } from './held'
import { HealthState, startBar } from './health-state'
import { KitList } from './kit-list'
import { reasonsText } from './option-column'
import { usePlayer } from './player-context'
import { figureOf, stationsOf, stationViews, threeOptions, type StationView } from './scene'
import { SoundControls } from './sound-panel'
import { VoiceControls } from './voice-controls'
import { formatLine } from './format-line'
import { stationAmount } from './station-list'
import { lengthText, sidesText } from './texts'
import { useDistanceShare } from './use-distance-share'
import { useFullScreen } from './use-full-screen'

const heading = 'text-[1.55em]'

/** Before class: what is coming, and everything a member sets once. Nothing here has to be touched. */
export function BeforeClass({ timeZone }: { timeZone: string }) {
  const data = usePlayer((state) => state.data)
  const chosen = usePlayer((state) => state.options)
  const start = usePlayer((state) => state.start)
  const [news, setNews] = useState<'no' | 'yes'>('no')
  const [note, setNote] = useState('')
  const [goFull, setGoFull] = useState(false)
  const fullScreen = useFullScreen()
  const { spec } = data.version
  const timeline = useMemo(() => compile(data.version), [data.version])
  const bar = startBar(data.health)
  const begin = () => {
    // The browser allows full screen and sound only straight out of this press.
    if (goFull && !fullScreen.on) fullScreen.toggle()
    start(news === 'yes' ? note.trim() || 'yes' : null)
  }
  const figures = spec.blocks.map((block) => ({
    block: block.id,
    figures: stationViews(data.version, block, chosen).map(figureOf),
  }))
  const summary = data.scheduledClass

  return (
    <main className="min-h-dvh boards pb-28 text-[clamp(17px,1.9vh,24px)] md:pb-12">
      <header className="flex flex-wrap items-end justify-between gap-x-10 gap-y-4 px-[clamp(16px,3vw,90px)] pt-[clamp(12px,2.6vh,48px)]">
        <div className="min-w-0 flex-[1.6] basis-[16em]">
          <a
            href={paths.today()}
            className="inline-flex min-h-12 items-center text-rest underline underline-offset-4"
          >
            Back to today
          </a>
          <h1
            className="leading-[0.95] [overflow-wrap:anywhere]"
            style={{
              fontStretch: '100%',
              fontWeight: 800,
              // Wide letters take 0.66 em: the longest word stays on one line.
              fontSize: `clamp(34px, min(11vh, ${(36 / (longestWord(spec.title) * 0.66)).toFixed(1)}vw), 128px)`,
            }}
          >
            {spec.title}
          </h1>
        </div>
        <div className="min-w-0 flex-1 basis-[16em] pb-2">
          <p className="text-[1.25em] font-bold">{lengthText(summary.realLengthMs)}</p>
          <p>
            {summary.coachName ? `with ${summary.coachName}` : null}
            {summary.group ? `, ${summary.group}` : null}
          </p>
          {spec.focus ? <p className="text-text-quiet">{spec.focus}</p> : null}
          {spec.intendedRpe !== undefined ? (
            <p className="text-text-quiet">meant to feel like {spec.intendedRpe} of 10</p>
          ) : null}
        </div>
        <div className="hidden min-w-[18em] pb-2 md:block">
          <StartButton bar={bar} onStart={begin} />
        </div>
      </header>

      <Lane
        className="mt-4"
        segments={timeline.segments}
        blocks={spec.blocks}
        presentMs={0}
        size="head"
        figures={figures}
        inset="clamp(16px,3vw,90px)"
        showTimes
      />

      <div className="mt-8 grid gap-x-0 gap-y-10 px-[clamp(16px,3vw,90px)] lg:grid-cols-[0.8fr_1.7fr_1fr] [&>*]:min-w-0 lg:[&>*]:pr-7 lg:[&>*+*]:border-l-4 lg:[&>*+*]:border-(--line) lg:[&>*+*]:pl-7">
        <div className="grid content-start gap-8">
          <Section title="Kit">
            <KitList />
          </Section>
          <Section title="Your floor">
            <ul className="grid gap-1.5">
              <li>Two metres clear all round, nothing to trip over.</li>
              <li>Chair and table against a wall, so that they cannot slide.</li>
              <li>Shoes, or bare feet on a floor that grips. Socks slip.</li>
            </ul>
          </Section>
          <Section title="Anything new?">
            <fieldset>
              <legend className="mb-1">{TODAY_QUESTION}</legend>
              <div className="flex gap-2">
                {(['no', 'yes'] as const).map((answer) => (
                  <Choice key={answer} chosen={news === answer} onChoose={() => setNews(answer)}>
                    {answer === 'no' ? 'Nothing' : 'Yes'}
                  </Choice>
                ))}
              </div>
              {news === 'yes' ? (
                <div className="mt-3 grid gap-2">
                  <label className="grid gap-1">
                    What is it? Your coach sees this line.
                    <textarea
                      rows={2}
                      maxLength={500}
                      value={note}
                      onChange={(event) => setNote(event.target.value)}
                      className="border-3 border-text bg-raised p-2"
                    />
                  </label>
                  <p className="border-l-8 border-stop pl-3">
                    Feverish, dizzy, or pain in the chest: leave the class for today. With anything
                    else, take the easier options and rest as needed.
                  </p>
                </div>
              ) : null}
            </fieldset>
          </Section>
        </div>

        <Section title="Your options">
          <p className="mb-3 text-text-quiet">
            1 easier, 2 as planned, 3 harder. You can change at any time in class.
          </p>
          {spec.blocks.map((block, index) =>
            stationsOf(block).length === 0 ? null : (
              <section key={block.id} aria-label={block.title} className="mb-5">
                <h3 className="condensed text-[1.15em] leading-tight">
                  {block.title}
                  <span className="font-medium text-text-quiet"> · {formatLine(block)}</span>
                </h3>
                <ul>
                  {stationViews(data.version, block, chosen).map((view) => (
                    <OptionRow key={`${index}/${view.key}`} view={view} />
                  ))}
                </ul>
              </section>
            ),
          )}
        </Section>

        <div className="grid content-start gap-8">
          <Section title="Health questions">
            <HealthState
              health={data.health}
              timeZone={timeZone}
              returnTo={paths.play(summary.scheduledClassId)}
            />
          </Section>
          <Section title="Counting rounds">
            <CountingChoice />
          </Section>
          <Section title="Sound">
            <SoundControls />
          </Section>
          <Section title="Voice">
            <VoiceControls />
          </Section>
          <Section title="Screen">
            <ScreenChoice goFull={goFull} onGoFull={setGoFull} />
          </Section>
        </div>
      </div>

      <div className="fixed inset-x-0 bottom-0 z-10 border-t-4 border-(--line) bg-ground md:hidden">
        <StartButton bar={bar} onStart={begin} />
      </div>
    </main>
  )
}

/** Letters of the longest word, so that a title never breaks inside one. */
const longestWord = (title: string) => Math.max(6, ...title.split(/\s+/).map((word) => word.length))

function Section({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section aria-label={title}>
      <h2 className={clsx(heading, 'mb-3')}>{title}</h2>
      {children}
    </section>
  )
}

function StartButton({ bar, onStart }: { bar: string | null; onStart: () => void }) {
  return (
    <>
      <ActionButton
        look="primary"
        onClick={onStart}
        disabled={bar !== null}
        aria-describedby={bar ? 'start-bar' : undefined}
        className="w-full py-[0.55em] text-[clamp(30px,4.6vh,56px)] outline-none"
      >
        Start class
      </ActionButton>
      {bar ? (
        <p id="start-bar" className="mt-2 px-2 font-semibold text-stop">
          {bar}
        </p>
      ) : null}
    </>
  )
}

function Choice({
  chosen,
  onChoose,
  children,
  disabled = false,
}: {
  chosen: boolean
  onChoose: () => void
  children: ReactNode
  disabled?: boolean
}) {
  return (
    <button
      type="button"
      aria-pressed={chosen}
      disabled={disabled}
      onClick={onChoose}
      className={clsx(
        'inline-flex min-h-12 items-center justify-center px-4 py-1.5 condensed leading-tight disabled:opacity-50',
        chosen
          ? 'border-4 border-text bg-present text-on-present'
          : 'border-2 border-(--line-lesser) hover:bg-fill',
      )}
    >
      {children}
    </button>
  )
}

function OptionRow({ view }: { view: StationView }) {
  const data = usePlayer((state) => state.data)
  const choose = usePlayer((state) => state.chooseStartOption)
  const hold = holdOn(data, view)
  const option = view.option
  const fitted = fittedOf(data, view)
  const isFitted = fitted !== null && fitted.option === option?.option
  const reasons = option ? reasonsText(option) : ''
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_auto] items-center gap-x-4 gap-y-0.5 py-1.5 sm:grid-cols-[minmax(0,1fr)_auto_minmax(0,1.15fr)]">
      <span className="min-w-0 leading-tight">
        <span className="font-bold">{view.name}</span>
        <span className="block text-[0.88em] text-text-quiet">
          {[stationAmount(view), sidesText(view.sides)].filter(Boolean).join(' ')}
        </span>
      </span>
      <span role="group" aria-label={`Option for ${view.name}`} className="flex gap-1.5">
        {threeOptions(view).map((each, index) =>
          each ? (
            <button
              key={each.option}
              type="button"
              aria-pressed={each.option === option?.option}
              aria-label={`${index + 1}: ${each.name}`}
              disabled={hold !== null && each.level !== 'easier'}
              onClick={() => choose(view.key, each.option)}
              className={clsx(
                'flex size-12 items-center justify-center figures text-[1.25em] disabled:opacity-40',
                each.option === option?.option
                  ? 'border-4 border-text bg-present text-on-present'
                  : 'border-2 border-(--line-lesser) hover:bg-fill',
              )}
            >
              {index + 1}
            </button>
          ) : null,
        )}
      </span>
      <span className="col-span-2 leading-tight sm:col-span-1">
        <span className={clsx(option?.level !== 'as-planned' && 'font-bold')}>{option?.name}</span>
        {reasons ? <span className="text-text-quiet">, {reasons}</span> : null}
        {hold ? (
          <span className="mt-1 block border-l-6 border-rest pl-2 text-[0.9em]">
            Easier since ‘this hurts’ ({HURT_PLACE_TEXT[hold.place].toLowerCase()}). It stays until
            you and your coach have cleared it.
          </span>
        ) : isFitted && fitted.why ? (
          <span className="mt-1 block border-l-6 border-rest pl-2 text-[0.9em]">{fitted.why}</span>
        ) : null}
        {fitted?.conflicts.map((conflict) => (
          <span key={conflict} className="mt-1 block border-l-6 border-stop pl-2 text-[0.9em]">
            {conflict}
          </span>
        ))}
      </span>
    </li>
  )
}

function CountingChoice() {
  const preferences = usePlayer((state) => state.preferences)
  const set = usePlayer((state) => state.setPreferences)
  const ways: { counting: Counting; words: string; what: string }[] = [
    {
      counting: 'press',
      words: 'I press',
      what: 'One press a round: space bar, a clicker, or a tap.',
    },
    {
      counting: 'lead',
      words: 'The lead counts',
      what: 'The figure counts your reps on the screen and logs each round. You can leave it at any time.',
    },
    {
      counting: 'afterwards',
      words: 'I say at the end',
      what: 'You count for yourself and say your rounds after class.',
    },
  ]
  const now = ways.find((way) => way.counting === preferences.counting) ?? ways[0]
  return (
    <div className="grid gap-3">
      <div className="flex flex-wrap gap-2">
        {ways.map((way) => (
          <Choice
            key={way.counting}
            chosen={way.counting === now?.counting}
            onChoose={() => set({ counting: way.counting })}
          >
            {way.words}
          </Choice>
        ))}
      </div>
      <p className="text-text-quiet">{now?.what}</p>
      {preferences.counting === 'lead' ? null : (
        <Tick
          on={preferences.leadLogs}
          onChange={(leadLogs) => set({ leadLogs })}
          words="A lead that I join in class (L) logs its rounds"
        />
      )}
      <Tick
        on={preferences.waitAtBriefs}
        onChange={(waitAtBriefs) => set({ waitAtBriefs })}
        words="Briefs wait for me"
      />
      <label className="grid gap-1">
        More time to change
        <select
          value={preferences.changeExtraSeconds}
          onChange={(event) => set({ changeExtraSeconds: Number(event.target.value) })}
          className="min-h-12 max-w-[16em] border-3 border-text bg-raised px-2"
        >
          <option value={0}>as planned</option>
          {[5, 10, 15, 20, 30].map((seconds) => (
            <option key={seconds} value={seconds}>
              {seconds} s more at each change
            </option>
          ))}
        </select>
      </label>
      <Tick
        on={preferences.lettersOn}
        onChange={(lettersOn) => set({ lettersOn })}
        words="Letters work as keys (P, R, H, S, 1, 2, 3 …)"
      />
    </div>
  )
}

function Tick({
  on,
  onChange,
  words,
}: {
  on: boolean
  onChange: (on: boolean) => void
  words: string
}) {
  return (
    <label className="flex min-h-12 items-center gap-3">
      <input
        type="checkbox"
        className="size-7 flex-none accent-(--text)"
        checked={on}
        onChange={(event) => onChange(event.target.checked)}
      />
      {words}
    </label>
  )
}

const PRESETS = [
  { words: 'Phone in hand', inches: 6, metres: 0.4 },
  { words: 'Laptop, 2 m', inches: 14, metres: 2 },
  { words: 'TV, 3 m', inches: 43, metres: 3 },
] as const

function ScreenChoice({ goFull, onGoFull }: { goFull: boolean; onGoFull: (on: boolean) => void }) {
  const preferences = usePlayer((state) => state.preferences)
  const set = usePlayer((state) => state.setPreferences)
  const tooFar = useDistanceShare() > 0.13
  const field = 'border-text bg-raised min-h-12 w-[5.5em] border-3 px-2 tabular-nums'
  return (
    <div className="grid gap-3">
      <div className="flex flex-wrap gap-2">
        {PRESETS.map((preset) => (
          <Choice
            key={preset.words}
            chosen={
              preferences.screenDiagonalInches === preset.inches &&
              preferences.distanceMetres === preset.metres
            }
            onChoose={() =>
              set({ screenDiagonalInches: preset.inches, distanceMetres: preset.metres })
            }
          >
            {preset.words}
          </Choice>
        ))}
      </div>
      <div className="flex flex-wrap gap-4">
        <label className="grid gap-1">
          Diagonal, inches
          <input
            type="number"
            inputMode="decimal"
            min={4}
            max={120}
            step={0.1}
            value={preferences.screenDiagonalInches}
            onChange={(event) => {
              const inches = event.target.valueAsNumber
              if (inches >= 3 && inches <= 200) set({ screenDiagonalInches: inches })
            }}
            className={field}
          />
        </label>
        <label className="grid gap-1">
          Distance, metres
          <input
            type="number"
            inputMode="decimal"
            min={0.2}
            max={10}
            step={0.1}
            value={preferences.distanceMetres}
            onChange={(event) => {
              const metres = event.target.valueAsNumber
              if (metres >= 0.2 && metres <= 15) set({ distanceMetres: metres })
            }}
            className={field}
          />
        </label>
      </div>
      <p className="text-text-quiet">
        What you must read from the mat is drawn at least this large:{' '}
        <span className="block truncate condensed text-[length:var(--distance-text,1em)] leading-tight text-text">
          8 reps
        </span>
      </p>
      {tooFar ? (
        <p className="border-l-8 border-stop pl-3">
          That is too far for a screen of this size. Stand nearer, or use a larger one.
        </p>
      ) : null}
      <Tick on={goFull} onChange={onGoFull} words="Start in full screen" />
      <Tick
        on={preferences.keepHallDark}
        onChange={(keepHallDark) => set({ keepHallDark })}
        words="Keep the hall dark, in rests as well"
      />
    </div>
  )
}
