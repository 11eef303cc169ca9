'use client'
import { useMemo } from 'react'
import { Rungs } from '@/components/lane/rungs'
import { rungWindow } from '@/components/lane/rung-window'
import { forecast } from '@/server/engine/pace/forecast'
import { TIRING } from '@/server/engine/pace/walk'
import type { Block } from '@/server/engine/spec/schema'
import type { BlockTally } from '@/server/engine/tally/types'
import { usePlayer } from './player-context'
import { usePhoneLayout } from './use-phone-layout'
import { repsNow, repsOfRound, type StationView } from './scene'

/** How many rungs fit beside the round's number. */
const ROOM = 5

/** The rungs of a block as its member stands in it. */
export function BlockRungs({
  block,
  views,
  tally,
  present,
}: {
  block: Block
  views: readonly StationView[]
  tally: BlockTally | null
  present: number | null
}) {
  const version = usePlayer((state) => state.data.version)
  const options = usePlayer((state) => state.options)
  const expected = useMemo(
    () =>
      forecast(version, { tiring: TIRING.expected, options }).find(
        (each) => each.block === block.id,
      ),
    [version, options, block.id],
  )
  const phone = usePhoneLayout()
  const limit = block.format.type === 'for-time' ? block.format.rounds : Infinity
  const window = rungWindow({
    // Where all stations do the same, a rung is what each of them does; else the whole round.
    repsOf: (round) => {
      if (round > limit) return null
      const each = views.map((view) => repsNow(view, round))
      if (each.every((reps) => reps === null)) return null
      const [first] = each
      return each.every((reps) => reps === first) && first != null
        ? first
        : repsOfRound(views, round)
    },
    done: tally?.logged.map((each) => each.round) ?? [],
    present,
    forecastRounds: expected?.rounds ?? null,
    limit: ROOM,
  })
  return <Rungs {...window} runOut showNumbers={!phone} className="h-full max-h-[30dvh] w-full" />
}
