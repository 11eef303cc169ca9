import { workNumber, formatText, stationNames, stationText } from '@/server/contract/block-text'
import type { PublishedVersion } from '@/server/engine/spec/version'

/** Every block of a class with its stations, and the easier and harder ways of each. */
export function BlockList({ version }: { version: PublishedVersion }) {
  return (
    <ol className="grid gap-x-10 gap-y-7 md:grid-cols-2">
      {version.spec.blocks
        .filter((block) => block.format.type !== 'rest')
        .map((block) => {
          const number = workNumber(version.spec.blocks, block)
          return (
            <li key={block.id} className="border-t-4 border-line pt-2">
              <h3 className="flex items-baseline gap-3 text-xl">
                {number !== null ? <span className="figures text-3xl">{number}</span> : null}
                {block.title}
              </h3>
              <p className="text-text-quiet">{formatText(block)}</p>
              <ul className="mt-2 space-y-2">
                {block.format.type === 'rest'
                  ? null
                  : block.format.stations.map((station, index) => {
                      const { name, easier, harder } = stationNames(version, station)
                      return (
                        <li key={index}>
                          <p>
                            <strong>{name}</strong> · {stationText(station)}
                          </p>
                          {easier.length + harder.length > 0 ? (
                            <p className="text-base text-text-quiet">
                              {easier.length > 0
                                ? `Easier: ${easier.join(', ').toLowerCase()}`
                                : ''}
                              {easier.length > 0 && harder.length > 0 ? '. ' : ''}
                              {harder.length > 0
                                ? `Harder: ${harder.join(', ').toLowerCase()}`
                                : ''}
                            </p>
                          ) : null}
                        </li>
                      )
                    })}
              </ul>
            </li>
          )
        })}
    </ol>
  )
}
