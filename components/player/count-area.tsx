'use client'
import clsx from 'clsx'
import { useRef, type ReactNode } from 'react'
import type { Block } from '@/server/engine/spec/schema'
import type { BlockTally } from '@/server/engine/tally/types'
import type { Position } from '@/server/engine/timeline/run-types'
import { BlockRungs } from './block-rungs'
import styles from './floor-plan.module.css'
import { usePlayer } from './player-context'
import { isCounted, segmentMs, type StationView } from './scene'
import { clockText, elapsedText } from './texts'
import { usePaint } from './use-paint'

/** A time that is painted frame by frame. */
export function RunningTime({
  read,
  className,
}: {
  read: (position: Position) => string
  className?: string
}) {
  const position = usePlayer((state) => state.position)
  const text = useRef<HTMLSpanElement>(null)
  usePaint((now) => {
    const next = read(now)
    if (text.current && text.current.textContent !== next) text.current.textContent = next
  })
  return (
    <span
      ref={text}
      className={className}
      style={{ fontVariantNumeric: 'tabular-nums lining-nums' }}
      suppressHydrationWarning
    >
      {position ? read(position) : ''}
    </span>
  )
}

function Count({
  label,
  number,
  of,
  quiet = false,
  children,
}: {
  label: string
  number: string
  of?: string | null
  quiet?: boolean
  children?: ReactNode
}) {
  return (
    <div className={styles.count}>
      <div className={styles.countWord}>
        <div className={clsx('condensed', styles.countLabel)}>{label}</div>
        <div className={clsx('figures', styles.countNumber, quiet && 'text-text-quiet')}>
          <span data-testid="round">{number}</span>
          {of ? <span className={clsx('condensed', styles.countOf)}>{of}</span> : null}
        </div>
      </div>
      <div className={styles.countPicture}>{children}</div>
    </div>
  )
}

/** Rounds in work, by format: the member's own round, or the piece that the clock is at. */
export function WorkCount({
  block,
  position,
  views,
  tally,
  afterwards,
}: {
  block: Block
  position: Position
  views: readonly StationView[]
  tally: BlockTally | null
  /** The member says the rounds at the end. */
  afterwards: boolean
}) {
  const format = block.format
  if (position.restingMs !== null) {
    return (
      <div className={styles.count} data-testid="resting">
        <div>
          <div className={clsx('condensed text-rest', styles.stateWord)}>Resting</div>
          <RunningTime
            className={clsx('figures', styles.countNumber)}
            read={(now) => elapsedText(now.restingMs ?? 0)}
          />
        </div>
      </div>
    )
  }
  if (format.type === 'rest') return <div className={styles.count} />
  if (format.type === 'rounds' || format.type === 'for-time') {
    if (!isCounted(block) && !position.lead) {
      return (
        <div className={styles.count}>
          <p className="condensed text-[length:var(--near)] leading-tight text-text-quiet">
            Nothing to log here. Keep an even pace.
          </p>
        </div>
      )
    }
    const total = format.type === 'for-time' ? format.rounds : null
    if (afterwards && !position.lead) {
      return (
        <div className={styles.count}>
          <p className="w-[8em] flex-none condensed text-[length:var(--near)] leading-tight text-text-quiet">
            {total ? `${total} rounds. ` : ''}You say your rounds at the end.
          </p>
          <div className={styles.countPicture}>
            <BlockRungs block={block} views={views} tally={tally} present={null} />
          </div>
        </div>
      )
    }
    return (
      <Count
        label="Round"
        number={String(position.lead?.round ?? position.round ?? (tally?.rounds ?? 0) + 1)}
        of={total ? `of ${total}` : null}
      >
        <BlockRungs
          block={block}
          views={views}
          tally={tally}
          present={position.lead?.round ?? position.round}
        />
      </Count>
    )
  }
  const segment = position.segment
  const round = segment?.round ?? 1
  const station = segment?.station ?? 0
  if (format.type === 'every') {
    const done = (round - 1) * format.stations.length + station
    return (
      <Count label="Start" number={String(done + 1)} of={`of ${format.times}`}>
        <Pieces of={format.times} present={done} />
      </Count>
    )
  }
  if (format.type === 'intervals' && format.rounds === 1) {
    return (
      <Count label="Station" number={String(station + 1)} of={`of ${format.stations.length}`}>
        <Pieces of={format.stations.length} present={station} />
      </Count>
    )
  }
  if (format.type === 'intervals') {
    return (
      <Count label="Round" number={String(round)} of={`of ${format.rounds}`}>
        <Pieces of={format.stations.length} present={station} />
      </Count>
    )
  }
  return (
    <Count label="Hold" number={String(station + 1)} of={`of ${format.stations.length}`}>
      <Pieces of={format.stations.length} present={station} />
    </Count>
  )
}

/** Timed pieces as equal bays on the floor: done filled, the present one yellow and outlined. */
function Pieces({ of, present }: { of: number; present: number }) {
  const shown = Math.min(of, 12)
  const first = Math.min(Math.max(0, present - Math.floor(shown / 2)), of - shown)
  return (
    <div className="flex h-full items-center" aria-hidden="true">
      <div className="flex w-full gap-[6%] border-y-[length:var(--weight)] border-line py-[1.2dvh]">
        {Array.from({ length: shown }, (_, index) => first + index).map((piece) => (
          <span
            key={piece}
            className={clsx(
              'h-[5dvh] min-h-6 flex-1 border-[length:calc(var(--weight)*0.75)]',
              piece < present && 'border-text bg-text',
              piece === present &&
                'border-present bg-present outline-[length:calc(var(--weight)*0.6)] outline-offset-[calc(var(--weight)*0.5)] outline-present outline-solid',
              piece > present && 'border-line',
            )}
          />
        ))}
      </div>
    </div>
  )
}

/** The state in words where no round stands: a brief, a pause, a rest, what is worked off. */
export function StateWord({
  word,
  tone = 'rest',
  children,
}: {
  word: string
  tone?: 'rest' | 'text' | 'done'
  children?: ReactNode
}) {
  return (
    <div className={styles.count} data-testid="state">
      <div className="flex min-w-0 flex-1 flex-wrap items-center justify-between gap-x-[1.5vw] gap-y-1">
        <div
          className={clsx(
            'condensed font-bold',
            styles.stateWord,
            tone === 'rest' && 'text-rest',
            tone === 'done' && 'text-done',
          )}
        >
          {word}
        </div>
        <div className="condensed text-[length:var(--near)] leading-[1.12] font-medium text-text-quiet">
          {children}
        </div>
      </div>
    </div>
  )
}

/** A rest from its beginning to its longest, where it may be cut ('go') and where the present is. */
export function RestRail({ position, limited }: { position: Position; limited: boolean }) {
  const present = useRef<HTMLSpanElement>(null)
  const segment = position.segment
  const restMs = segment ? segmentMs(segment) : 0
  const longestMs = restMs + (limited ? (position.rest?.mayLengthenMs ?? 0) : 0)
  const leastMs = position.rest ? position.elapsedMs + position.rest.mayCutInMs : restMs
  usePaint((now) => {
    if (present.current && longestMs > 0) {
      present.current.style.left = `${Math.min(100, (now.elapsedMs / longestMs) * 100).toFixed(2)}%`
    }
  })
  const share = (ms: number) => `${Math.min(100, (ms / Math.max(1, longestMs)) * 100)}%`
  return (
    <div className="relative h-[clamp(44px,10dvh,120px)] w-full flex-none" aria-hidden="true">
      <div className="absolute inset-x-0 top-[20%] bottom-0 border-[length:var(--weight)] border-t-0 border-text" />
      {limited && leastMs < longestMs ? (
        <div
          className="absolute top-[20%] bottom-[length:var(--weight)] flex items-center justify-center overflow-hidden border-l-[length:var(--weight)] border-text bg-fill"
          style={{ left: share(leastMs), right: 'var(--weight)' }}
        >
          <span className="condensed text-[length:var(--near)] leading-none text-on-present">
            go
          </span>
        </div>
      ) : null}
      <span
        ref={present}
        className="absolute top-0 bottom-[-0.6dvh] w-[max(8px,0.9vw)] -translate-x-1/2 bg-present outline-2 outline-text outline-solid"
        style={{ left: share(position.elapsedMs) }}
      />
    </div>
  )
}

/** Did the coach say how short and how long this rest may be? */
export function isLimited(block: Block | null): boolean {
  return (
    block?.format.type === 'rest' &&
    (block.format.atLeast !== undefined || block.format.atMost !== undefined)
  )
}

export function restLimits(position: Position): { shortest: string; longest: string } | null {
  if (!position.rest || !position.segment) return null
  const restMs = segmentMs(position.segment)
  const leastMs = Math.max(0, position.elapsedMs + position.rest.mayCutInMs)
  return {
    shortest: clockText(Math.min(leastMs, restMs)),
    longest: clockText(restMs + position.rest.mayLengthenMs),
  }
}
