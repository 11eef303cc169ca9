'use client'
import clsx from 'clsx'
import { useCallback, useState, type ReactNode } from 'react'
import type { StationKey } from '@/hooks/player/types'
import type { Block } from '@/server/engine/spec/schema'
import type { Position, Run } from '@/server/engine/timeline/run-types'
import { Bay, Notice } from './bay'
import { ActionButton } from './button'
import { ClassLane } from './class-lane'
import { isLimited, RestRail, restLimits, RunningTime, StateWord, WorkCount } from './count-area'
import { Countdown } from './countdown'
import styles from './floor-plan.module.css'
import { formatLine } from './format-line'
import { heldReason } from './held'
import { HurtPanel } from './hurt-panel'
import { KeysPanel } from './keys-panel'
import { MorePanel } from './more-panel'
import { MovementColumn, RepsFigure } from './movement-column'
import { OptionColumn } from './option-column'
import { OptionsPanel } from './options-panel'
import { PlayerFrame } from './player-frame'
import { usePlayer } from './player-context'
import { PlayerUiContext, usePlayerUi, type PanelName, type PlayerUi } from './player-ui'
import { RestQuestion } from './rest-question'
import {
  blockToCorrect,
  groundOf,
  isCounted,
  nextUp,
  SHORT_REST_MS,
  stationView,
  stationViews,
  threeOptions,
  type NextUp,
  type StationView,
} from './scene'
import { SkipPanel } from './skip-panel'
import { SoundPanel } from './sound-panel'
import { BriefStations, ComingStations, stationAmount } from './station-list'
import { StatusStrip } from './status-strip'
import { useSteadyPosition } from './steady'
import { StopScreen } from './stop-screen'
import { clockText, inSentence, plural } from './texts'
import { useFullScreen } from './use-full-screen'
import { useIdle } from './use-idle'
import { usePhoneLayout } from './use-phone-layout'
import { usePlayerKeys, type PlayerKey } from './use-player-keys'
import { useStationInFocus } from './use-station-in-focus'

const MORE_REST_MS = 15_000

/** A running class: work, rest, brief, pause and stop on one floor plan. */
export function InClass() {
  const position = useSteadyPosition()
  const run = usePlayer((state) => state.run)
  if (!position || !run) return null
  return <RunningClass position={position} run={run} />
}

function RunningClass({ position, run }: { position: Position; run: Run }) {
  const data = usePlayer((state) => state.data)
  const chosen = usePlayer((state) => state.options)
  const events = usePlayer((state) => state.events)
  const tally = usePlayer((state) => state.tally)
  const preferences = usePlayer((state) => state.preferences)
  const send = usePlayer((state) => state.send)
  const phone = usePhoneLayout()
  const fullScreen = useFullScreen()
  const [panel, setPanel] = useState<{ name: PanelName; station: StationKey | null } | null>(null)
  const [answered, setAnswered] = useState<string | null>(null)
  // 'Reps done' in an `every` block: the member's word, good until this segment ends.
  const [repsDoneIn, setRepsDoneIn] = useState<number | null>(null)
  const inFocus = useStationInFocus()

  const version = data.version
  const block = version.spec.blocks[position.blockIndex] ?? null
  const nextWork = nextUp(run, position, ['work'])
  const blockViews = block ? stationViews(version, block, chosen) : []
  const blockTally = tally?.blocks.find((each) => each.block === block?.id) ?? null
  const kind = position.phase === 'brief' ? 'brief' : (position.segment?.kind ?? 'rest')
  const stopped = position.halted === 'stopped'
  const paused = position.halted === 'paused'
  const afterwards = preferences.counting === 'afterwards'
  const counted = block !== null && isCounted(block)
  const resting = position.restingMs !== null
  const repsDone = kind === 'work' && repsDoneIn === position.segmentIndex
  const enoughLeft = usePlayer((state) => (state.position?.leftMs ?? 0) >= SHORT_REST_MS)
  const ground = groundOf(position, {
    keepHallDark: preferences.keepHallDark,
    repsDone: repsDone && enoughLeft,
  })
  const comingBlock = kind === 'rest' && nextWork?.otherBlock ? nextWork.block : null
  const comingViews = comingBlock ? stationViews(version, comingBlock, chosen) : []
  /** The station on show, which the keys 1, 2 and 3 speak of: the present one, or the one that comes. */
  const view: StationView | null =
    kind === 'rest'
      ? comingBlock
        ? (comingViews[0] ?? null)
        : nextWork && block
          ? stationView(version, block, nextWork.station ?? 0, chosen)
          : null
      : kind === 'count-in' || kind === 'brief'
        ? (blockViews[nextWork?.station ?? 0] ?? null)
        : (blockViews[inFocus.station] ?? null)
  const locked = view ? heldReason(data, events, view) : null

  const chooseOption = useCallback(
    (blockId: string, station: number, option: string) =>
      send({ type: 'choose-option', block: blockId, station, option }),
    [send],
  )
  const primary: Primary | null = paused
    ? { words: 'Go on', hint: 'P', act: () => send({ type: 'resume' }) }
    : kind === 'brief'
      ? { words: 'Go on', hint: 'Space', act: () => send({ type: 'pass-brief' }) }
      : kind === 'rest' && position.rest && position.rest.mayLengthenMs > 0
        ? {
            words: '+15 s',
            hint: 'Space',
            act: () =>
              send({
                type: 'lengthen-rest',
                ms: Math.min(MORE_REST_MS, position.rest?.mayLengthenMs ?? 0),
              }),
          }
        : resting
          ? { words: 'Go on', hint: 'R', act: () => send({ type: 'end-rest-as-needed' }) }
          : kind === 'work' && position.workedOff
            ? { words: 'Go on', hint: 'Space', act: () => send({ type: 'finish-block' }) }
            : kind === 'work' && counted && !afterwards
              ? {
                  words: 'Log round',
                  phoneWords: `Log round ${position.round ?? ''}`,
                  hint: 'Space',
                  act: () => send({ type: 'log-round', by: 'member' }),
                }
              : kind === 'work' && block?.format.type === 'every' && !repsDone
                ? {
                    words: 'Reps done',
                    hint: 'Space',
                    act: () => setRepsDoneIn(position.segmentIndex),
                  }
                : null

  const canLog = kind === 'work' && counted && !afterwards && !position.workedOff
  const logRound = () => send({ type: 'log-round', by: 'member' })
  const toggleRest = () => {
    if (kind === 'rest') send({ type: 'cut-rest' })
    else if (resting) send({ type: 'end-rest-as-needed' })
    else send({ type: 'rest-as-needed' })
  }
  const toggleLead = () =>
    send(
      position.lead
        ? { type: 'leave-lead' }
        : { type: 'follow-lead', station: inFocus.station, logs: preferences.leadLogs },
    )
  const ui: PlayerUi = {
    open: (name, station) => setPanel({ name, station: station ?? null }),
    bringForward: (station) => {
      // Who says where they are has left the lead's place: it counts on from theirs.
      if (position.lead) {
        send({ type: 'leave-lead' })
        send({ type: 'follow-lead', station, logs: position.lead.logs })
      } else inFocus.bringForward(station, position)
    },
    primary: () => primary?.act(),
    chooseOption,
    toggleRest,
    toggleLead,
    stop: () => {
      setPanel(null)
      send({ type: 'stop' })
    },
    togglePause: () => send({ type: paused ? 'resume' : 'pause' }),
    toggleFullScreen: fullScreen.toggle,
  }
  const undo = () => send({ type: 'undo-round' })

  const act = (key: PlayerKey) => {
    switch (key) {
      case 'log-round':
        // Who logs a round while resting has still logged it; R alone ends the rest.
        return resting && canLog ? logRound() : ui.primary()
      case 'undo-round':
        return undo()
      case 'pause':
        return ui.togglePause()
      case 'rest':
        return toggleRest()
      case 'hurt':
        return ui.open('hurt')
      case 'stop':
        return ui.stop()
      case 'options':
        return ui.open('options')
      case 'lead':
        return toggleLead()
      case 'keys':
        return ui.open('keys')
      case 'full-screen':
        return fullScreen.toggle()
      default: {
        const option = view ? threeOptions(view)[Number(key.at(-1)) - 1] : null
        if (!view || !option || (locked !== null && option.level !== 'easier')) return
        chooseOption(view.block, view.index, option.option)
      }
    }
  }
  usePlayerKeys(panel === null && !stopped, preferences.lettersOn, act)
  const idle = useIdle(7_000, ground === 'hall' && !phone && panel === null)

  const toCorrect =
    kind === 'rest' && !paused && !afterwards && tally
      ? blockToCorrect(version, position.blockIndex, tally.blocks)
      : null
  const question = toCorrect && answered !== toCorrect.block.id ? toCorrect : null
  const canUndo = counted && !afterwards && (blockTally?.rounds ?? 0) > 0

  return (
    <PlayerUiContext value={ui}>
      <PlayerFrame ground={ground} idle={idle}>
        <div
          className={styles.plan}
          data-kind={kind}
          data-frame={
            ground === 'hall' && (kind === 'rest' || resting || repsDone || paused)
              ? 'rest'
              : undefined
          }
        >
          <StatusStrip phone={phone} paused={paused} canUndo={canUndo} onUndo={undo} />
          <section className={styles.time} aria-label="Time">
            <Countdown position={position} />
            <CountSlot
              kind={kind}
              position={position}
              block={block}
              views={blockViews}
              afterwards={afterwards}
              repsDone={repsDone}
              tally={blockTally}
            />
            {kind === 'rest' && !paused && !phone ? (
              <RestRail position={position} limited={isLimited(block)} />
            ) : null}
            <div className={clsx(styles.actions, 'relative')}>
              <Notice />
              <div className={styles.primarySlot}>
                {primary ? (
                  <ActionButton
                    look="primary"
                    hint={primary.hint}
                    onClick={primary.act}
                    className={styles.primary}
                    data-testid="primary"
                    data-first=""
                  >
                    {phone ? (primary.phoneWords ?? primary.words) : primary.words}
                  </ActionButton>
                ) : kind === 'count-in' ? (
                  <p className={clsx('condensed', styles.primaryWord)}>Get ready</p>
                ) : null}
              </div>
              <div className={styles.secondary}>
                {kind === 'rest' && !paused ? (
                  <GoButton position={position} onGo={() => send({ type: 'cut-rest' })} />
                ) : resting && canLog ? (
                  <ActionButton onClick={logRound} hint="Space">
                    Log round
                  </ActionButton>
                ) : (
                  <ActionButton
                    onClick={toggleRest}
                    hint="R"
                    disabled={kind !== 'work' || paused || position.workedOff || resting}
                  >
                    Rest as needed
                  </ActionButton>
                )}
                <ActionButton onClick={() => ui.open('hurt')} hint="H">
                  This hurts
                </ActionButton>
                <ActionButton look="stop" onClick={ui.stop} hint="S">
                  Stop
                </ActionButton>
              </div>
            </div>
          </section>

          <RightSide
            kind={kind}
            position={position}
            run={run}
            block={block}
            view={view}
            views={blockViews}
            comingViews={comingViews}
            nextWork={nextWork}
            phone={phone}
            paused={paused}
            roundUnknown={position.lead === null && (afterwards || (kind === 'work' && !counted))}
            options={
              view ? (
                <div className={styles.options}>
                  <OptionColumn
                    view={view}
                    locked={locked}
                    compact={phone}
                    onChoose={(option) => chooseOption(view.block, view.index, option)}
                  />
                </div>
              ) : null
            }
          />

          <Bay
            tone={kind === 'rest' || kind === 'brief' || paused || resting ? 'rest' : 'present'}
            fallback={quietText(kind, paused, block, view)}
          >
            {question ? (
              <RestQuestion
                block={question.block}
                tally={question.tally}
                views={stationViews(version, question.block, chosen)}
                onDone={() => setAnswered(question.block.id)}
              />
            ) : null}
          </Bay>
          <div className={styles.lane}>
            <ClassLane />
          </div>
        </div>
        {stopped ? <StopScreen /> : null}
        {panel && !stopped ? (
          <OpenPanel
            panel={panel}
            view={panel.station ? byKey([...blockViews, ...comingViews], panel.station) : view}
            views={comingViews.length > 0 ? comingViews : blockViews}
            blockTitle={block?.title ?? ''}
            onClose={() => setPanel(null)}
            onUndo={canUndo ? undo : null}
          />
        ) : null}
      </PlayerFrame>
    </PlayerUiContext>
  )
}

interface Primary {
  words: string
  phoneWords?: string
  hint: string
  act: () => void
}

type Kind = 'brief' | 'count-in' | 'work' | 'switch' | 'rest'

const byKey = (views: readonly StationView[], key: StationKey) =>
  views.find((each) => each.key === key) ?? null

function quietText(
  kind: Kind,
  paused: boolean,
  block: Block | null,
  view: StationView | null,
): string | null {
  if (paused) return 'The clock stands still. Go on when you are ready.'
  if (kind === 'brief') return block?.brief ?? null
  if (kind === 'rest') return null
  return view?.note ?? view?.movement?.cues[0] ?? null
}

function CountSlot({
  kind,
  position,
  block,
  views,
  tally,
  afterwards,
  repsDone,
}: {
  kind: Kind
  position: Position
  block: Block | null
  views: readonly StationView[]
  tally: Parameters<typeof WorkCount>[0]['tally']
  afterwards: boolean
  repsDone: boolean
}) {
  if (position.halted === 'paused') return <StateWord word="Paused" />
  if (kind === 'brief') {
    const waiting = position.briefLeftMs === null
    return (
      <StateWord word={waiting ? 'Waiting' : 'Brief'}>
        {waiting ? 'Waiting for you.' : 'Goes on by itself.'}
      </StateWord>
    )
  }
  if (kind === 'rest') {
    const limits = restLimits(position)
    const short =
      (position.segment ? position.segment.endMs - position.segment.startMs : 0) < SHORT_REST_MS
    return (
      <StateWord word="Rest">
        {limits && !short && isLimited(block) ? (
          <>
            <div>shortest {limits.shortest}</div>
            <div>longest {limits.longest}</div>
          </>
        ) : null}
      </StateWord>
    )
  }
  if (kind === 'switch')
    return (
      <StateWord word="Change" tone="text">
        sides
      </StateWord>
    )
  if (kind === 'work' && position.workedOff) {
    return (
      <StateWord word="Worked off" tone="done">
        {tally?.logged.at(-1) ? (
          <RunningTime read={() => `all ${plural(tally.rounds, 'round')} done`} />
        ) : null}
      </StateWord>
    )
  }
  if (kind === 'work' && repsDone) {
    return <StateWord word="Rest">what is left of this interval</StateWord>
  }
  if (!block) return <div className={styles.count} />
  return (
    <WorkCount
      block={block}
      position={position}
      views={views}
      tally={tally}
      afterwards={afterwards}
    />
  )
}

/** Cuts a rest, once its least time is over; until then it says when. */
function GoButton({ position, onGo }: { position: Position; onGo: () => void }) {
  const may = position.rest !== null && position.rest.mayCutInMs <= 0
  return (
    <ActionButton onClick={onGo} hint="R" disabled={!may} className="tabular-nums">
      {may ? (
        'Go'
      ) : (
        <span>
          Go in <RunningTime read={(now) => clockText(now.rest?.mayCutInMs ?? now.leftMs)} />
        </span>
      )}
    </ActionButton>
  )
}

function thenText(
  kind: Kind,
  run: Run,
  position: Position,
  views: readonly StationView[],
  focus: number,
): string | null {
  if (position.round !== null && (kind === 'work' || kind === 'count-in')) {
    const after = views[(focus + 1) % views.length]
    if (after && views.length > 1) return `then ${inSentence(after.name)}`
    if (kind === 'count-in') return null
  }
  // From a count-in or a change of sides the work that comes is on show already: look past it.
  const shown = kind === 'work' ? null : nextUp(run, position, ['work'])
  const from = shown ? { ...position, segmentIndex: shown.index } : position
  const next = nextUp(run, from)
  const nextWork = nextUp(run, from, ['work'])
  const side = position.segment?.side
  if (nextWork && next && !next.otherBlock && nextWork.side && nextWork.side !== side) {
    if (kind === 'work' && nextWork.station === position.segment?.station) {
      return `then ${nextWork.side} side`
    }
  }
  if (!next) return position.round === null ? 'the last one' : 'the last block'
  if (next.otherBlock) {
    return next.kind === 'rest' ? 'then rest' : `then ${inSentence(next.block.title)}`
  }
  const work = nextWork && !nextWork.otherBlock ? views[nextWork.station ?? 0] : null
  if (work) return `then ${inSentence(work.name)}`
  return next.kind === 'rest' ? 'then rest' : null
}

function RightSide({
  kind,
  position,
  run,
  block,
  view,
  views,
  comingViews,
  nextWork,
  phone,
  paused,
  roundUnknown,
  options,
}: {
  kind: Kind
  position: Position
  run: Run
  block: Block | null
  view: StationView | null
  views: readonly StationView[]
  comingViews: readonly StationView[]
  nextWork: NextUp | null
  phone: boolean
  paused: boolean
  roundUnknown: boolean
  options: ReactNode
}) {
  const kit = usePlayer((state) => state.data.version.spec.kit)
  const ui = usePlayerUi()
  if (kind === 'brief') {
    return (
      <MovementColumn
        name={block?.title ?? ''}
        then={block ? <span className={styles.about}>{formatLine(block)}</span> : null}
      >
        <BriefStations views={views} />
      </MovementColumn>
    )
  }
  if (kind === 'rest') {
    if (!nextWork) {
      return (
        <MovementColumn name="Last rest" then="then you are done">
          <div className={styles.middle} />
        </MovementColumn>
      )
    }
    if (nextWork.otherBlock) {
      return (
        <MovementColumn
          name={`Next: ${inSentence(nextWork.block.title)}`}
          then={<span className={styles.about}>{formatLine(nextWork.block)}</span>}
        >
          <ComingStations views={comingViews} kit={kitLine(comingViews, kit)} max={phone ? 3 : 4} />
        </MovementColumn>
      )
    }
    return (
      <MovementColumn
        name={view ? `Next: ${inSentence(view.name)}` : 'Next'}
        then={[
          nextWork.side ? `${nextWork.side} side` : null,
          view ? stationAmount(view) : null,
          nextWork.round ? `round ${nextWork.round}` : null,
        ]
          .filter(Boolean)
          .join(', ')}
      >
        <div className={styles.middle}>
          {view ? (
            <RepsFigure
              view={view}
              round={nextWork.round ?? 1}
              side={nextWork.side}
              lead={null}
              moving={!paused}
              roundUnknown={false}
            />
          ) : null}
          {phone ? null : options}
        </div>
        {phone ? options : null}
      </MovementColumn>
    )
  }
  const focus = view?.index ?? 0
  const then = thenText(kind, run, position, views, focus)
  const turns = position.round !== null && views.length > 1 && kind === 'work'
  const side = kind === 'switch' ? (nextWork?.side ?? null) : (position.segment?.side ?? null)
  const name = view?.name ?? block?.title ?? ''
  return (
    <MovementColumn
      name={name}
      then={
        then === null ? null : turns ? (
          <button
            type="button"
            className={clsx(styles.thenText, 'min-h-12 text-left hover:underline')}
            onClick={() => ui.bringForward((focus + 1) % views.length)}
          >
            {then}
          </button>
        ) : (
          <span className={styles.thenText}>{then}</span>
        )
      }
    >
      <div className={styles.middle}>
        {view ? (
          <RepsFigure
            view={view}
            round={roundOf(position)}
            side={side}
            lead={kind === 'work' ? position.lead : null}
            moving={!paused && kind === 'work'}
            roundUnknown={roundUnknown}
          />
        ) : null}
        {phone ? null : options}
      </div>
      {phone ? options : null}
    </MovementColumn>
  )
}

const roundOf = (position: Position) =>
  position.lead?.round ?? position.round ?? position.segment?.round ?? 1

/** The kit that these stations need, with the class's own counts. */
function kitLine(
  views: readonly StationView[],
  kit: readonly { item: string; count: number }[] | undefined,
): string | null {
  const items = [...new Set(views.flatMap((view) => view.movement?.kit ?? []))]
  if (items.length === 0) return null
  return items
    .map((item) => {
      const listed = kit?.find((each) => each.item === item)
      return listed && listed.count > 1 ? `${listed.count} × ${item}` : item
    })
    .join(', ')
}

function OpenPanel({
  panel,
  view,
  views,
  blockTitle,
  onClose,
  onUndo,
}: {
  panel: { name: PanelName; station: StationKey | null }
  view: StationView | null
  views: readonly StationView[]
  blockTitle: string
  onClose: () => void
  onUndo: (() => void) | null
}) {
  switch (panel.name) {
    case 'options':
      return <OptionsPanel view={view} views={views} onClose={onClose} />
    case 'hurt':
      return <HurtPanel view={view} onClose={onClose} />
    case 'skip':
      return <SkipPanel title={blockTitle} onClose={onClose} />
    case 'keys':
      return <KeysPanel onClose={onClose} />
    case 'sound':
      return <SoundPanel onClose={onClose} />
    case 'more':
      return <MorePanel onClose={onClose} onUndo={onUndo} />
  }
}
