'use client'
import clsx from 'clsx'
import Link from 'next/link'
import { usePathname } from 'next/navigation'
import type { ReactNode } from 'react'

interface NavLinkProps {
  href: string
  /** Addresses below it that have a link of their own. */
  not?: readonly string[]
  children: ReactNode
}

/** A way in the header; the one that is open, or has what is open below it, is marked by weight and a line. */
export function NavLink({ href, not = [], children }: NavLinkProps) {
  const pathname = usePathname()
  const isExactly = pathname === href
  const isHere = isExactly || (pathname.startsWith(`${href}/`) && !not.includes(pathname))
  return (
    <Link
      href={href}
      aria-current={isExactly ? 'page' : isHere ? true : undefined}
      className={clsx(
        'flex min-h-12 items-center px-1.5 decoration-3 underline-offset-8 hover:underline sm:px-2.5',
        isHere && 'font-bold underline decoration-present',
      )}
    >
      {children}
    </Link>
  )
}
