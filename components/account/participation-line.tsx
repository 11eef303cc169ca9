interface ParticipationLineProps {
  started: number
  finished: number
  /** What the full width stands for. */
  members: number
}

/** How many of a gym's members did a class: finished filled, only begun open, to one scale. */
export function ParticipationLine({ started, finished, members }: ParticipationLineProps) {
  const share = (count: number) => `${members > 0 ? Math.min(100, (count / members) * 100) : 0}%`
  return (
    <div aria-hidden className="relative h-4 border-b-2 border-line-lesser">
      <div
        className="absolute inset-y-0 left-0 border-2 border-line"
        style={{ width: share(started) }}
      />
      <div className="absolute inset-y-0 left-0 bg-text" style={{ width: share(finished) }} />
    </div>
  )
}
