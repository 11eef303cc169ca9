'use client'
import clsx from 'clsx'
import Link, { useLinkStatus } from 'next/link'
import { usePathname } from 'next/navigation'
import type { ReactNode } from 'react'

/** A dot of paint while the page behind a link is on its way. */
function Busy() {
  const { pending } = useLinkStatus()
  return pending ? (
    <span aria-hidden className="ml-1.5 size-2.5 bg-present outline-2 outline-(--text)" />
  ) : null
}

/** A way in the header; the one that is open is marked by weight and a line. */
export function NavLink({ href, children }: { href: string; children: ReactNode }) {
  const pathname = usePathname()
  const isHere = pathname === href
  return (
    <Link
      href={href}
      aria-current={isHere ? 'page' : undefined}
      className={clsx(
        'flex min-h-12 items-center px-2.5 decoration-3 underline-offset-8 hover:underline',
        isHere && 'font-bold underline decoration-present',
      )}
    >
      {children}
      <Busy />
    </Link>
  )
}
