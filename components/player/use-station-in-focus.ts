'use client'
import { useState } from 'react'
import { blockPlan } from '@/server/engine/pace/block-plan'
import { expectedStation, expectedStationStartMs } from '@/server/engine/pace/walk'
import type { Position, Run } from '@/server/engine/timeline/run-types'
import { usePlayer } from './player-context'

/** Where the member said to be: this station, from this instant of the body. */
interface Said {
  segment: number
  round: number
  station: number
  atMs: number
}

/**
 * Index of the station that heads the screen. Timed pieces know theirs; in rounds it is the lead's where
 * that is followed, else the one that the planned pace reaches since the round began, or since the
 * member brought one forward.
 */
function stationInFocus(run: Run, position: Position, said: Said | null): number {
  const own = position.segment?.station
  if (own !== undefined) return own
  if (position.lead) return position.lead.station
  const block = run.version.spec.blocks[position.blockIndex]
  const state = run.blocks[position.blockIndex]
  const span = run.timeline.blocks[position.blockIndex]
  if (!block || !state || !span || position.round === null || position.segment?.kind !== 'work') {
    return 0
  }
  const plan = blockPlan(run.version, block, state.options)
  if (!plan) return 0
  const round = position.round
  const logged = state.logged.filter((each) => each.round < round)
  const roundStartMs = Math.max(0, ...logged.map((each) => each.classMs - span.bodyStartMs))
  const isSaid = said?.segment === position.segmentIndex && said.round === round
  const from = isSaid ? said.station : 0
  const plannedMs = expectedStationStartMs(plan, round, from, roundStartMs)
  const lateMs = isSaid ? said.atMs - (plannedMs ?? said.atMs) : 0
  return expectedStation(plan, round, roundStartMs, position.bodyElapsedMs, from, lateMs)
}

export function useStationInFocus(): {
  station: number
  bringForward: (station: number, position: Position) => void
} {
  const [said, setSaid] = useState<Said | null>(null)
  const station = usePlayer((state) =>
    state.run && state.position ? stationInFocus(state.run, state.position, said) : 0,
  )
  return {
    station,
    bringForward: (next, position) =>
      setSaid({
        segment: position.segmentIndex,
        round: position.round ?? 1,
        station: next,
        atMs: position.bodyElapsedMs,
      }),
  }
}
