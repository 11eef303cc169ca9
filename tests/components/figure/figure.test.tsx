import { act, render } from '@testing-library/react'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { Figure } from '@/components/figure/figure'
import { StillFigure } from '@/components/figure/still-figure'
import { FIGURES } from '@/server/engine/figure/figures'

let frames: FrameRequestCallback[] = []
let calm = false

beforeEach(() => {
  frames = []
  calm = false
  vi.stubGlobal('requestAnimationFrame', (callback: FrameRequestCallback) => frames.push(callback))
  vi.stubGlobal('cancelAnimationFrame', () => {
    frames = []
  })
  vi.stubGlobal('matchMedia', () => ({
    matches: calm,
    addEventListener: () => undefined,
    removeEventListener: () => undefined,
  }))
})
afterEach(() => vi.unstubAllGlobals())

const shape = (container: HTMLElement) =>
  [...container.querySelectorAll('path')].map((path) => path.getAttribute('d')).join('|')

describe('Figure', () => {
  it('moves by the clock it is given, and stands where the clock stands', () => {
    let ms = 0
    const { container } = render(<Figure figure="goblet-squat" clockMs={() => ms} />)
    const step = () => act(() => frames.splice(0).forEach((frame) => frame(0)))
    step()
    const top = shape(container)
    ms = 1500
    step()
    const low = shape(container)
    step()
    expect(low).not.toBe(top)
    expect(shape(container)).toBe(low)
  })

  it('asks for no frames where less motion is wished', () => {
    calm = true
    const { container } = render(<Figure figure="push-up" />)
    expect(frames).toHaveLength(0)
    expect(shape(container)).toBe(shape(render(<StillFigure figure="push-up" />).container))
  })

  it('asks for no frames when still', () => {
    render(<Figure figure="push-up" still />)
    expect(frames).toHaveLength(0)
  })

  it('asks for no more frames once it is gone', () => {
    const { unmount } = render(<Figure figure="push-up" />)
    expect(frames).toHaveLength(1)
    unmount()
    expect(frames).toHaveLength(0)
  })

  it('is told in words, or hidden from those who cannot see it', () => {
    const told = render(<StillFigure figure="push-up" />)
    expect(told.getByRole('img').getAttribute('aria-label')).toBe(FIGURES['push-up'].description)
    const hidden = render(<StillFigure figure="push-up" label="" />)
    expect(hidden.container.querySelector('svg')?.getAttribute('aria-hidden')).toBe('true')
  })

  it('stands for a figure that is not drawn yet', () => {
    const unknown = render(<StillFigure figure="handstand-walk" />)
    expect(shape(unknown.container)).toBe(
      shape(render(<StillFigure figure="standing" />).container),
    )
  })

  it('faces the other way for the left side', () => {
    const { container } = render(<StillFigure figure="reverse-lunge" side="left" />)
    expect(container.querySelector('g')?.getAttribute('transform')).toBe('scale(-1 1)')
  })
})
