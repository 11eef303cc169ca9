/** Lines where words will stand, in the page's own measure; `rows` baselines as a list of the page has them. */
export function SkeletonLines({ rows }: { rows: number }) {
  return (
    <div role="status">
      <span className="sr-only">Loading</span>
      {Array.from({ length: rows }, (_, index) => (
        <div key={index} className="flex h-16 items-center border-b-4 border-fill">
          <SkeletonWord width={`${[62, 44, 54, 38][index % 4] ?? 50}%`} />
        </div>
      ))}
    </div>
  )
}

/** One word to come. `width`: any CSS length. */
export function SkeletonWord({ width, tall = false }: { width: string; tall?: boolean }) {
  return (
    <div
      aria-hidden
      className={tall ? 'h-[0.72em] waiting text-6xl sm:text-7xl lg:text-8xl' : 'h-5 waiting'}
      style={{ width }}
    />
  )
}
