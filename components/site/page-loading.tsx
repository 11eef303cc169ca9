import { SkeletonLines } from '@/components/ui/skeleton'

/** A page's own lines while it is read. */
export function PageLoading() {
  return (
    <div className="page pt-24">
      <div aria-hidden className="mb-8 h-20 w-2/3 max-w-2xl border-b-4 border-fill" />
      <SkeletonLines lines={6} />
    </div>
  )
}
