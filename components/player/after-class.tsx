'use client'
import clsx from 'clsx'
import { useState } from 'react'
import { Rungs } from '@/components/lane/rungs'
import { rungWindow } from '@/components/lane/rung-window'
import { paths } from '@/server/contract/paths'
import { HURT_PLACE_TEXT } from '@/server/engine/fit/hurt'
import { CR10_ANCHORS, RPE_QUESTION } from '@/server/engine/load/session-rpe'
import { forecast, lastForecastRound, type BlockForecast } from '@/server/engine/pace/forecast'
import { TIRING } from '@/server/engine/pace/walk'
import type { Block } from '@/server/engine/spec/schema'
import type { HurtPlace } from '@/server/engine/tally/events'
import { HURT_PLACES } from '@/server/engine/tally/names'
import { scoreText } from '@/server/engine/tally/score'
import type { BlockTally } from '@/server/engine/tally/types'
import { ActionButton } from './button'
import { formatLine } from './format-line'
import { usePlayer } from './player-context'
import { lowestUndone, Stepper } from './rest-question'
import { isCounted, repsNow, repsOfRound, stationViews, type StationView } from './scene'
import { SavingLine } from './status-strip'
import { plural } from './texts'

/** After class: what was not counted yet, how hard it was, then the tally. */
export function AfterClass() {
  const tally = usePlayer((state) => state.tally)
  const title = usePlayer((state) => state.data.version.spec.title)
  const afterwards = usePlayer((state) => state.preferences.counting === 'afterwards')
  const [counted, setCounted] = useState(false)
  const [rated, setRated] = useState(tally?.rating != null)
  const stopped = tally?.state === 'stopped' || tally?.stop != null
  const step = afterwards && !counted ? 'count' : rated ? 'tally' : 'rate'
  return (
    <main className="min-h-dvh boards text-[clamp(17px,2vh,26px)]">
      <div className="mx-auto grid max-w-[1700px] gap-8 px-[clamp(16px,4vw,96px)] py-[clamp(16px,4vh,64px)] [--near:1.2em]">
        <header className="flex flex-wrap items-end justify-between gap-4 border-b-[6px] border-text pb-3">
          <div>
            <p className="text-text-quiet">{title}</p>
            <h1
              className="text-[clamp(36px,min(9vh,11vw),110px)] text-balance"
              style={{ fontStretch: '95%' }}
            >
              {step === 'count'
                ? 'Your rounds'
                : stopped
                  ? 'Class ended early'
                  : step === 'rate'
                    ? 'Class done'
                    : 'Your tally'}
            </h1>
          </div>
          <SavingLine />
        </header>
        {stopped ? <StoppedLine /> : null}
        {step === 'count' ? <CountAfterwards onDone={() => setCounted(true)} /> : null}
        {step === 'rate' ? <Rating onDone={() => setRated(true)} /> : null}
        {step === 'tally' ? (
          <>
            <TallyBlocks />
            <div className="flex flex-wrap gap-4 text-[1.2em]">
              <a
                href={paths.today()}
                className="inline-flex min-h-12 items-center bg-button px-5 py-2 condensed text-on-button"
              >
                Back to today
              </a>
              <ActionButton onClick={() => setRated(false)}>Change my rating</ActionButton>
              {afterwards ? (
                <ActionButton onClick={() => setCounted(false)}>Correct my rounds</ActionButton>
              ) : null}
            </div>
          </>
        ) : null}
      </div>
    </main>
  )
}

function StoppedLine() {
  const stop = usePlayer((state) => state.tally?.stop ?? null)
  if (!stop) return null
  return (
    <p className="max-w-[40em] border-l-8 border-stop pl-4 text-[1.1em]">
      {stop.redFlag
        ? 'You stopped at a sign that means stop for today. Your coach has seen it. Please have it looked at before the next class; if it comes back or stays, get help.'
        : 'Stopping was right if it felt right. What you did is recorded.'}
    </p>
  )
}

/** Rounds and reps block by block, for a member who chose to say them at the end. */
function CountAfterwards({ onDone }: { onDone: () => void }) {
  const blocks = usePlayer((state) => state.data.version.spec.blocks)
  const tally = usePlayer((state) => state.tally)
  return (
    <>
      <ul className="grid gap-0">
        {blocks.map((block) => {
          const own = tally?.blocks.find((each) => each.block === block.id)
          return own && isCounted(block) && !own.skipped ? (
            <CountRow key={block.id} block={block} tally={own} />
          ) : null
        })}
      </ul>
      <ActionButton look="primary" className="justify-self-start text-[1.4em]" onClick={onDone}>
        Those are my rounds
      </ActionButton>
    </>
  )
}

function CountRow({ block, tally }: { block: Block; tally: BlockTally }) {
  const version = usePlayer((state) => state.data.version)
  const options = usePlayer((state) => state.options)
  const send = usePlayer((state) => state.send)
  const [reps, setReps] = useState(tally.reps)
  const views = stationViews(version, block, options)
  const limit = block.format.type === 'for-time' ? block.format.rounds : 1_000
  const roundReps = repsOfRound(views, tally.rounds + 1)
  return (
    <li className="grid items-center gap-4 border-b-4 border-(--line) py-4 md:grid-cols-[minmax(0,1fr)_auto_auto]">
      <div className="min-w-0">
        <h2 className="condensed text-[1.5em] leading-tight">{block.title}</h2>
        <p className="text-text-quiet">
          {formatLine(block)}: {views.map((view) => view.name).join(', ')}
        </p>
      </div>
      <Stepper
        label="Full rounds"
        value={tally.rounds}
        min={0}
        max={limit}
        onChange={(value) => {
          const more = value > tally.rounds
          const round = more ? lowestUndone(tally) : (tally.logged.at(-1)?.round ?? 1)
          send({ type: 'set-round', block: block.id, round, done: more, by: 'afterwards' })
          setReps(0)
        }}
      />
      {tally.rounds >= limit || roundReps < 2 ? (
        <span />
      ) : (
        <Stepper
          label="and reps"
          value={Math.min(reps, roundReps - 1)}
          min={0}
          max={roundReps - 1}
          onChange={(value) => {
            setReps(value)
            send({ type: 'note-reps', block: block.id, round: tally.rounds + 1, reps: value })
          }}
        />
      )}
    </li>
  )
}

/** Session RPE on the CR-10 scale, a line to the coach, and what hurt. */
function Rating({ onDone }: { onDone: () => void }) {
  const send = usePlayer((state) => state.send)
  const earlier = usePlayer((state) => state.tally?.rating ?? null)
  const inClass = usePlayer((state) => state.tally?.hurts ?? null)
  const intended = usePlayer((state) => state.data.version.spec.intendedRpe)
  const [rpe, setRpe] = useState<number | null>(earlier?.rpe ?? null)
  const [note, setNote] = useState(earlier?.note ?? '')
  const [hurts, setHurts] = useState<HurtPlace[]>(
    () =>
      earlier?.hurts.map((each) => each.where) ?? [...new Set(inClass?.map((each) => each.where))],
  )
  const rate = () => {
    if (rpe === null) return
    send({
      type: 'rate',
      rpe,
      ...(note.trim() ? { note: note.trim() } : {}),
      ...(hurts.length > 0 ? { hurts: hurts.map((where) => ({ where })) } : {}),
    })
    onDone()
  }
  return (
    <div className="grid gap-10 lg:grid-cols-[1.2fr_1fr]">
      <fieldset>
        <legend className="mb-3 condensed text-[1.6em]">{RPE_QUESTION}</legend>
        <RpeScale value={rpe} onChange={setRpe} />
        {intended !== undefined ? (
          <p className="mt-3 text-text-quiet">Your coach meant it to feel like {intended}.</p>
        ) : null}
      </fieldset>
      <div className="grid content-start gap-8">
        <fieldset>
          <legend className="mb-3 condensed text-[1.6em]">Did anything hurt?</legend>
          <div className="flex flex-wrap gap-2">
            {HURT_PLACES.map((place) => {
              const on = hurts.includes(place)
              return (
                <button
                  key={place}
                  type="button"
                  aria-pressed={on}
                  onClick={() =>
                    setHurts(on ? hurts.filter((each) => each !== place) : [...hurts, place])
                  }
                  className={clsx(
                    'min-h-12 px-4 condensed',
                    on
                      ? 'border-4 border-text bg-present text-on-present'
                      : 'border-2 border-(--line-lesser) hover:bg-fill',
                  )}
                >
                  {HURT_PLACE_TEXT[place]}
                </button>
              )
            })}
          </div>
        </fieldset>
        <label className="grid gap-2">
          <span className="condensed text-[1.6em]">A note to your coach</span>
          <textarea
            rows={4}
            maxLength={1000}
            value={note}
            onChange={(event) => setNote(event.target.value)}
            className="border-3 border-text bg-raised p-3"
          />
        </label>
        <div className="flex flex-wrap items-center gap-4 text-[1.2em]">
          <ActionButton
            look="primary"
            disabled={rpe === null}
            onClick={rate}
            data-testid="send-rating"
          >
            Send to my coach
          </ActionButton>
          <ActionButton onClick={onDone}>Not now</ActionButton>
        </div>
        <p className="text-text-quiet">You can change it all day.</p>
      </div>
    </div>
  )
}

/** Eleven rungs, each longer than the last, with the scale's words at those that have any. */
function RpeScale({
  value,
  onChange,
}: {
  value: number | null
  onChange: (value: number) => void
}) {
  return (
    <div role="radiogroup" aria-label={RPE_QUESTION} className="grid">
      {CR10_ANCHORS.map(({ rating, anchor }) => {
        const chosen = rating === value
        return (
          <label
            key={rating}
            className="relative flex min-h-12 cursor-pointer items-center gap-4 border-b-3 border-(--line-lesser) py-0.5 hover:bg-fill has-focus-visible:outline-4 has-focus-visible:outline-(--text)"
          >
            <input
              type="radio"
              name="rpe"
              className="sr-only"
              checked={chosen}
              onChange={() => onChange(rating)}
              aria-label={anchor ? `${rating}: ${anchor}` : String(rating)}
            />
            <span className="w-[1.5em] flex-none text-right figures text-[1.5em]">{rating}</span>
            <span className="relative h-7 w-[38%] flex-none" aria-hidden="true">
              <span
                className={clsx(
                  'absolute inset-y-0 left-0 border-4',
                  chosen
                    ? 'border-text bg-present'
                    : value !== null && rating < value
                      ? 'border-text bg-text'
                      : 'border-(--line-lesser)',
                )}
                style={{ width: `${8 + rating * 9.2}%` }}
              />
            </span>
            <span className={clsx('min-w-0 leading-tight', chosen && 'font-bold')}>{anchor}</span>
          </label>
        )
      })}
    </div>
  )
}

/** The class block by block: rungs, score, the option used, against the forecast and the last time. */
function TallyBlocks() {
  const version = usePlayer((state) => state.data.version)
  const options = usePlayer((state) => state.options)
  const tally = usePlayer((state) => state.tally)
  const last = usePlayer((state) => state.data.lastTally)
  const expected = forecast(version, { tiring: TIRING.expected, options })
  if (!tally) return null
  return (
    <ol className="grid">
      {version.spec.blocks.map((block) => {
        const own = tally.blocks.find((each) => each.block === block.id)
        if (!own || block.format.type === 'rest') return null
        return (
          <TallyRow
            key={block.id}
            block={block}
            tally={own}
            views={stationViews(version, block, options)}
            expected={expected.find((each) => each.block === block.id) ?? null}
            last={last?.blocks.find((each) => each.block === block.id) ?? null}
          />
        )
      })}
    </ol>
  )
}

function TallyRow({
  block,
  tally,
  views,
  expected,
  last,
}: {
  block: Block
  tally: BlockTally
  views: readonly StationView[]
  expected: BlockForecast | null
  last: BlockTally | null
}) {
  const counted = isCounted(block)
  const limit = block.format.type === 'for-time' ? block.format.rounds : Infinity
  const window = counted
    ? rungWindow({
        repsOf: (round) => {
          if (round > limit) return null
          const [first] = views
          const each = views.map((view) => repsNow(view, round))
          return first && each.every((reps) => reps === each[0])
            ? (each[0] ?? null)
            : repsOfRound(views, round) || null
        },
        done: tally.logged.map((each) => each.round),
        present: null,
        forecastRounds: expected?.rounds ?? null,
        limit: 8,
      })
    : null
  const used = tally.options
    .map((each) => {
      const view = views.find((one) => one.index === each.station)
      const names = each.used.map(
        (slug) => view?.options.find((option) => option.option === slug)?.name ?? slug,
      )
      return view ? { name: view.name, names } : null
    })
    .filter((each) => each !== null)
  return (
    <li className="grid items-center gap-x-8 gap-y-2 border-b-4 border-(--line) py-4 md:grid-cols-[minmax(0,1.3fr)_minmax(0,1fr)_auto]">
      <div className="min-w-0">
        <h2 className="condensed text-[1.5em] leading-tight">{block.title}</h2>
        <p className="text-text-quiet">{formatLine(block)}</p>
        <ul className="text-[0.95em]">
          {used.map((each, index) => (
            <li key={index}>
              {each.name}: <b>{each.names.join(', then ')}</b>
            </li>
          ))}
        </ul>
      </div>
      {window ? (
        <Rungs {...window} className="h-[clamp(60px,11vh,120px)] w-full min-w-0" />
      ) : (
        <span className="hidden md:block" />
      )}
      <div className="md:text-right">
        <p className="figures text-[clamp(36px,6vh,72px)]">{scoreOrState(tally, counted)}</p>
        <p className="text-text-quiet">
          {[
            tally.skipped?.reason ? tally.skipped.reason : null,
            tally.countedAfterwards ? 'counted afterwards' : null,
            tally.restTakenMs >= 1000
              ? `${Math.round(tally.restTakenMs / 1000)} s rest taken`
              : null,
            counted && !tally.skipped && tally.totalReps > 0
              ? plural(tally.totalReps, 'rep')
              : null,
          ]
            .filter(Boolean)
            .join(' · ')}
        </p>
        <p className="text-text-quiet">
          {[
            expected && counted ? `forecast ${forecastText(expected)}, an estimate` : null,
            last && counted && !last.skipped ? `last time ${scoreText(last)}` : null,
          ]
            .filter(Boolean)
            .join(' · ')}
        </p>
      </div>
    </li>
  )
}

function scoreOrState(tally: BlockTally, counted: boolean): string {
  if (tally.skipped) return 'skipped'
  if (!tally.over && tally.logged.length === 0 && (tally.pieces?.done ?? 0) === 0) {
    return 'not reached'
  }
  // Where nobody could log, rounds would be a made-up number.
  if (tally.format === 'rounds' && !counted) return 'done'
  return scoreText(tally)
}

function forecastText(expected: BlockForecast): string {
  if (expected.finishSeconds !== null) {
    const seconds = Math.round(expected.finishSeconds)
    return `${Math.floor(seconds / 60)}:${String(seconds % 60).padStart(2, '0')}`
  }
  return lastForecastRound(expected) === 0 ? '0 + 0' : `${expected.rounds} + ${expected.reps}`
}
