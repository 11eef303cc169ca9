import type { ReactNode } from 'react'

/** Where a list would stand: what is not there yet, why, and the way on. The picture stands on the line. */
export function Empty({ picture, children }: { picture?: ReactNode; children: ReactNode }) {
  return (
    <div className="flex flex-wrap items-end gap-x-8 border-b-4 border-fill">
      {picture}
      <div className="max-w-xl min-w-0 flex-1 basis-72 space-y-4 py-6 text-lg">{children}</div>
    </div>
  )
}
