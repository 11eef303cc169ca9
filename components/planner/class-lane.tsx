import { Lane } from '@/components/lane/lane'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { compile } from '@/server/engine/timeline/compile'

/** The class to scale, without its figures. */
export function ClassLane({ version }: { version: PublishedVersion }) {
  return (
    <Lane
      segments={compile(version).segments}
      blocks={version.spec.blocks}
      size="head"
      showTimes
      inset="clamp(1rem, 2.8vw, 5rem)"
      label={`${version.spec.title}: ${version.spec.blocks.map((block) => block.title).join(', ')}`}
    />
  )
}
