'use client'
import { useRef } from 'react'
import { Figure } from '@/components/figure/figure'
import { motionOf } from '@/server/engine/figure/motion'
import type { Position } from '@/server/engine/timeline/run-types'
import type { StationView } from './scene'
import { usePaint } from './use-paint'

/** The person doing this station, at the tempo of the option in force. */
export function StationFigure({
  view,
  figure,
  moving,
  side,
  led = false,
}: {
  view: StationView
  figure: string
  moving: boolean
  side: 'left' | 'right' | null
  /** The lead is followed: the figure does its very rep. */
  led?: boolean
}) {
  const lead = useRef<Position['lead']>(null)
  usePaint((now) => {
    lead.current = now.lead
  })
  const own = 'tempo' in view.station ? view.station.tempo : undefined
  const timing = {
    tempo: own ?? view.option?.tempo ?? view.movement?.tempo,
    secondsPerRep: view.option?.secondsPerRep ?? view.movement?.secondsPerRep,
  }
  return (
    <Figure
      key={`${view.key}/${figure}`}
      figure={figure}
      still={!moving}
      side={side ?? undefined}
      timing={timing}
      clockMs={led ? () => repMs(lead.current, motionOf(figure, timing)) : undefined}
    />
  )
}

/** Milliseconds into the figure's cycle, which may hold two reps, at which the lead is in its own. */
function repMs(lead: Position['lead'], motion: { cycleMs: number; reps: number }): number {
  if (!lead || lead.state !== 'rep' || lead.lengthMs <= 0) return 0
  const repMs = motion.cycleMs / motion.reps
  return repMs * (((lead.rep - 1) % motion.reps) + lead.elapsedMs / lead.lengthMs)
}
