'use client'
import { usePlayer } from './player-context'

/** What the class uses and which of it the member has. */
export function KitList() {
  const kit = usePlayer((state) => state.data.version.spec.kit)
  const own = usePlayer((state) => state.data.kit)
  if (!kit || kit.length === 0) return <p>Nothing but a floor.</p>
  return (
    <ul className="grid gap-2">
      {kit.map((item) => {
        const mine = own[item.item] ?? 0
        const enough = mine >= item.count
        return (
          <li key={item.item} className="flex items-start gap-3">
            <svg
              viewBox="0 0 20 20"
              className="mt-[0.2em] size-[1.05em] flex-none"
              aria-hidden="true"
            >
              <rect
                x="2"
                y="2"
                width="16"
                height="16"
                fill={enough ? 'var(--done)' : 'none'}
                stroke={enough ? 'var(--done)' : 'var(--line)'}
                strokeWidth="3"
              />
              {enough ? (
                <path
                  d="M5.5 10.5 L9 14 L15 6.5"
                  fill="none"
                  stroke="var(--ground)"
                  strokeWidth="2.6"
                />
              ) : null}
            </svg>
            <span className="leading-tight">
              <span className="block font-bold">
                {item.count > 1 ? `${item.count} × ` : ''}
                {item.item}
              </span>
              <span className="text-text-quiet">
                {enough
                  ? mine > item.count
                    ? `yours: ${mine}`
                    : 'yours'
                  : mine > 0
                    ? `you have ${mine}: the easier option will do`
                    : item.optional
                      ? 'for some options only'
                      : 'not in your kit: the easier option may do without'}
              </span>
            </span>
          </li>
        )
      })}
    </ul>
  )
}
