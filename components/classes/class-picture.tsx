import { Lane } from '@/components/lane/lane'
import type { PublishedVersion } from '@/server/engine/spec/version'
import { compile } from '@/server/engine/timeline/compile'

/** The class as its lane, with a figure for every station standing on it. */
export function ClassPicture({ version }: { version: PublishedVersion }) {
  const figures = version.spec.blocks.map((block) => ({
    block: block.id,
    figures:
      block.format.type === 'rest'
        ? []
        : block.format.stations.map(
            (station) =>
              version.movements.find((one) => one.slug === station.movement)?.figure ??
              station.movement,
          ),
  }))
  return (
    <Lane
      segments={compile(version).segments}
      blocks={version.spec.blocks}
      figures={figures}
      size="head"
      showTimes
      inset="clamp(1rem, 2.8vw, 5rem)"
      label={`${version.spec.title}: ${version.spec.blocks.map((block) => block.title).join(', ')}`}
    />
  )
}
