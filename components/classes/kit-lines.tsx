import Link from 'next/link'
import { KitPicture } from '@/components/figure/kit-picture'
import { buttonClass } from '@/components/ui/button'
import { kitText } from '@/server/contract/kit-text'
import { paths } from '@/server/contract/paths'
import type { PublishedVersion } from '@/server/engine/spec/version'

interface KitLinesProps {
  version: PublishedVersion
  kit: Record<string, number>
  /** False for somebody whose own kit does not matter here. */
  isOwn: boolean
}

/** What the class asks for, and what of it one has. */
export function KitLines({ version, kit, isOwn }: KitLinesProps) {
  const items = version.spec.kit ?? []
  return (
    <>
      {items.length === 0 ? (
        <p className="mt-3">Nothing but the floor.</p>
      ) : (
        <ul className="mt-4 grid gap-x-6 gap-y-3 max-lg:grid-cols-[repeat(auto-fill,minmax(12rem,1fr))]">
          {items.map((item) => (
            <li key={item.item} className="flex items-center gap-4 leading-tight">
              <KitPicture item={item.item} count={item.count} />
              <div>
                <strong className="block">{kitText(item.item, item.count)}</strong>
                <span className="text-text-quiet">
                  {isOwn ? ownText(kit[item.item] ?? 0, item) : item.optional ? 'for some' : ''}
                </span>
              </div>
            </li>
          ))}
        </ul>
      )}
      {isOwn ? (
        <Link className={buttonClass('text', 'mt-3')} href={`${paths.account()}#kit`}>
          Change my kit
        </Link>
      ) : null}
    </>
  )
}

function ownText(
  have: number,
  { count, optional }: { count: number; optional?: boolean | undefined },
) {
  if (have >= count) return 'yours'
  if (have > 0) return `you have ${have}: the easier option will do`
  return optional ? 'if you have one' : 'not in your kit: an option may do without'
}
