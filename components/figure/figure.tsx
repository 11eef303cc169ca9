'use client'

import { useEffect, useRef } from 'react'
import { motionOf } from '@/server/engine/figure/motion'
import { FigureDrawing, outlineAt, type FigureLook } from './drawing'
import type { PartName } from './outline'

export interface FigureProps extends FigureLook {
  /** Stands still in the position that shows the movement best. */
  still?: boolean | undefined
  /**
   * Milliseconds into the movement, asked once a frame: the lead's own clock. Without it the figure
   * moves by itself from the moment it appears.
   */
  clockMs?: (() => number) | undefined
}

/**
 * A figure that moves at the planned tempo. Frames write the paths themselves, so React renders it
 * only when what it shows changes; off screen, and for people who asked for less motion, it rests.
 */
export function Figure({ still = false, clockMs, ...look }: FigureProps) {
  const svg = useRef<SVGSVGElement>(null)
  const clock = useRef(clockMs)
  useEffect(() => {
    clock.current = clockMs
  }, [clockMs])

  const { figure, timing } = look
  const tempo = timing?.tempo
  const secondsPerRep = timing?.secondsPerRep
  const tempoKey = tempo?.join('-') ?? ''

  useEffect(() => {
    const element = svg.current
    if (!element || still) return
    const pace = { tempo, secondsPerRep }
    const motion = motionOf(figure, pace)
    const paths = [...element.querySelectorAll<SVGPathElement>('path[data-part]')].map((path) => ({
      path,
      part: path.dataset.part as PartName,
      last: path.getAttribute('d') ?? '',
    }))
    const draw = (ms: number) => {
      const outline = outlineAt(figure, ms, pace)
      for (const each of paths) {
        const next = outline[each.part]
        if (next === each.last) continue
        each.last = next
        each.path.setAttribute('d', next)
      }
    }
    const calm = window.matchMedia('(prefers-reduced-motion: reduce)')
    const startedAt = performance.now()
    let frame = 0
    let onScreen = true
    const step = (now: number) => {
      draw(clock.current ? clock.current() : now - startedAt)
      frame = requestAnimationFrame(step)
    }
    const settle = () => {
      cancelAnimationFrame(frame)
      if (calm.matches) draw(motion.stillMs)
      else if (onScreen) frame = requestAnimationFrame(step)
    }
    const watcher =
      typeof IntersectionObserver === 'undefined'
        ? null
        : new IntersectionObserver(([entry]) => {
            onScreen = entry?.isIntersecting ?? true
            settle()
          })
    watcher?.observe(element)
    calm.addEventListener('change', settle)
    settle()
    return () => {
      cancelAnimationFrame(frame)
      watcher?.disconnect()
      calm.removeEventListener('change', settle)
    }
    // eslint-disable-next-line react-hooks/exhaustive-deps -- a tempo with the same figures is the same
  }, [figure, still, secondsPerRep, tempoKey])

  const at = motionOf(figure, timing).stillMs
  return <FigureDrawing {...look} svgRef={svg} outline={outlineAt(figure, at, timing)} />
}
