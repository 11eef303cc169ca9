/** Empty lines where words will stand, in the page's own measure. */
export function SkeletonLines({
  lines = 4,
  label = 'Loading',
}: {
  lines?: number
  label?: string
}) {
  return (
    <div role="status">
      <span className="sr-only">{label}</span>
      {Array.from({ length: lines }, (_, index) => (
        <div
          key={index}
          className="h-12 border-b-4 border-fill"
          style={{ width: `${[92, 74, 84, 61][index % 4] ?? 80}%` }}
        />
      ))}
    </div>
  )
}
