import { render } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { Lane } from '@/components/lane/lane'
import { placePresent } from '@/components/lane/present'
import { Rungs } from '@/components/lane/rungs'
import { rungWindow } from '@/components/lane/rung-window'
import type { Segment } from '@/server/engine/timeline/types'

const BLOCKS = [
  { id: 'a', title: 'Row and lunge', kind: 'work' },
  { id: 'b', title: 'Rest', kind: 'rest' },
] as const
const SEGMENTS: Segment[] = [
  { kind: 'work', block: 'a', startMs: 0, endMs: 300_000 },
  { kind: 'rest', block: 'b', startMs: 300_000, endMs: 400_000 },
]

describe('Lane', () => {
  it('says in words what it paints', () => {
    const { getByRole } = render(<Lane segments={SEGMENTS} blocks={BLOCKS} presentMs={1000} />)
    expect(getByRole('img').getAttribute('aria-label')).toBe(
      'The class: 1 Row and lunge 5:00. Now: Row and lunge.',
    )
  })

  it('has a present line only where it is told one', () => {
    const { container, rerender } = render(<Lane segments={SEGMENTS} blocks={BLOCKS} />)
    expect(container.querySelector('[data-lane-present]')).toBeNull()
    rerender(<Lane segments={SEGMENTS} blocks={BLOCKS} presentMs={0} view="close" />)
    expect(container.querySelector('[data-lane-present]')).not.toBeNull()
  })

  it('is moved without a render', () => {
    const { getByRole, rerender } = render(
      <Lane segments={SEGMENTS} blocks={BLOCKS} presentMs={0} />,
    )
    const lane = getByRole('img')
    placePresent(lane, 100_000, 400_000)
    expect(lane.style.getPropertyValue('--present-now')).toBe('0.250000')
    rerender(<Lane segments={SEGMENTS} blocks={BLOCKS} presentMs={50_000} />)
    expect(lane.style.getPropertyValue('--present-now')).toBe('0.250000')
    placePresent(lane, 900_000, 400_000)
    expect(lane.style.getPropertyValue('--present-now')).toBe('1.000000')
  })

  it('paints an empty class without a fault', () => {
    const { getByRole } = render(<Lane segments={[]} blocks={[]} presentMs={0} showTimes />)
    expect(getByRole('img')).toBeTruthy()
  })
})

describe('Rungs', () => {
  it('say how far the member is and where the forecast ends', () => {
    const window = rungWindow({
      repsOf: (round) => round * 2 + 2,
      done: [1, 2],
      present: 3,
      forecastRounds: 4,
      limit: 6,
    })
    const { getByRole } = render(<Rungs {...window} />)
    expect(getByRole('img').getAttribute('aria-label')).toBe(
      '2 rounds done; now round 3, 8 reps; the forecast ends in round 5.',
    )
  })
})
