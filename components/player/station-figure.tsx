'use client'
import { Figure } from '@/components/figure/figure'
import type { StationView } from './scene'

/** The person doing this station, at the tempo of the option in force. */
export function StationFigure({
  view,
  figure,
  moving,
  side,
}: {
  view: StationView
  figure: string
  moving: boolean
  side: 'left' | 'right' | null
}) {
  const own = 'tempo' in view.station ? view.station.tempo : undefined
  return (
    <Figure
      key={`${view.key}/${figure}`}
      figure={figure}
      still={!moving}
      side={side ?? undefined}
      timing={{
        tempo: own ?? view.option?.tempo ?? view.movement?.tempo,
        secondsPerRep: view.option?.secondsPerRep ?? view.movement?.secondsPerRep,
      }}
    />
  )
}
