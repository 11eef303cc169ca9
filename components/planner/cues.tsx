import { anchorText } from '@/server/contract/block-text'
import type { PublishedVersion } from '@/server/engine/spec/version'

/** Every cue of a class by block, as it is shown and said. */
export function Cues({ version }: { version: PublishedVersion }) {
  const blocks = version.spec.blocks.filter((block) => (block.cues ?? []).length > 0)
  if (blocks.length === 0) {
    return <p className="mt-3 text-text-quiet">No block has a cue yet.</p>
  }
  return (
    <div className="mt-3 space-y-5">
      {blocks.map((block) => (
        <section key={block.id}>
          <h3 className="text-lg">{block.title}</h3>
          <ul className="mt-1">
            {(block.cues ?? []).map((cue) => (
              <li
                key={cue.id}
                className="grid gap-x-4 border-b-2 border-fill py-1.5 sm:grid-cols-[9.5rem_1fr]"
              >
                <span className="text-text-quiet tabular-nums">{anchorText(block, cue.at)}</span>
                <span className="leading-snug">
                  {cue.text}
                  {cue.spoken !== undefined && cue.spoken !== cue.text ? (
                    <span className="block text-[0.9em] text-text-quiet">said: {cue.spoken}</span>
                  ) : null}
                  <span className="block text-[0.9em] text-text-quiet">
                    {cue.kind}
                    {cue.say === false ? ', shown and not said' : ''}
                  </span>
                </span>
              </li>
            ))}
          </ul>
        </section>
      ))}
    </div>
  )
}
