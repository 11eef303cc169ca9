import { SkeletonLines, SkeletonWord } from '@/components/ui/skeleton'

/** A class's page in its own lines while the class is read: name, lane, blocks. */
export function ClassWaiting() {
  return (
    <div>
      <div className="page pt-3">
        <SkeletonWord width="min(60%, 30rem)" tall />
        <div className="mt-6">
          <SkeletonWord width="min(80%, 18rem)" />
        </div>
      </div>
      <div aria-hidden className="mt-44 h-[2.7rem] border-y-4 border-fill sm:mt-56" />
      <div className="mt-16 page">
        <div className="border-t-4 border-fill">
          <SkeletonLines rows={8} />
        </div>
      </div>
    </div>
  )
}
