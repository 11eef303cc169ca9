'use client'
import { useRef } from 'react'
import { Lane } from '@/components/lane/lane'
import { placePresent } from '@/components/lane/present'
import { usePlayer } from './player-context'
import { usePaint } from './use-paint'
import { usePhoneLayout } from './use-phone-layout'

/** The whole class to scale, the present running along it. */
export function ClassLane() {
  const timeline = usePlayer((state) => state.run?.timeline ?? null)
  const blocks = usePlayer((state) => state.data.version.spec.blocks)
  const segmentIndex = usePlayer((state) => state.position?.segmentIndex ?? 0)
  const classMs = usePlayer((state) =>
    // Read again with each segment only; the frames between are painted.
    state.position ? Math.floor(state.position.classMs / 10_000) * 10_000 : 0,
  )
  const phone = usePhoneLayout()
  const lane = useRef<HTMLDivElement>(null)
  const lengthMs = timeline?.lengthMs ?? 0
  usePaint((now) => {
    if (lane.current) placePresent(lane.current, now.classMs, lengthMs)
  })
  if (!timeline) return null
  return (
    <Lane
      key={segmentIndex >= 0 ? 'class' : 'before'}
      ref={lane}
      segments={timeline.segments}
      blocks={blocks}
      presentMs={classMs}
      size={phone ? 'small' : 'tv'}
      inset={phone ? '12px' : 'var(--side)'}
    />
  )
}
