import Link from 'next/link'
import { paths } from '@/server/contract/paths'
import type { Viewer } from '@/server/contract/viewer'
import { NavLink } from './nav-link'

/** The product's name, the gym's, and where a person with these roles can go. */
export function SiteHeader({ viewer }: { viewer: Viewer }) {
  const links = [
    ...(viewer.roles.includes('member')
      ? [
          { href: paths.today(), text: 'Today' },
          { href: paths.classes(), text: 'Classes' },
          { href: paths.tally(), text: 'My tally' },
        ]
      : []),
    ...(viewer.roles.includes('coach')
      ? [
          { href: paths.board(), text: 'Board' },
          { href: paths.boardAll(), text: 'All boards' },
        ]
      : []),
    ...(viewer.roles.includes('owner') ? [{ href: paths.gym(), text: 'Gym' }] : []),
  ]
  return (
    <header className="flex flex-wrap items-center justify-between gap-x-8 gap-y-0 page pt-3 sm:pt-5">
      <a
        href="#content"
        className="sr-only bg-button px-4 py-2 text-on-button focus:not-sr-only focus:absolute focus:top-2 focus:left-2 focus:z-20"
      >
        To the content
      </a>
      <p className="flex min-h-12 items-baseline gap-4 pt-2">
        <Link href={paths.home()} className="font-display text-xl font-extrabold wide">
          Floorside
        </Link>
        <span className="text-text-quiet">{viewer.gym.name}</span>
      </p>
      <nav aria-label="Main" className="-mx-2 flex flex-wrap items-center">
        {links.map((link) => (
          <NavLink key={link.href} href={link.href}>
            {link.text}
          </NavLink>
        ))}
        <span className="w-2 sm:w-6" />
        <NavLink href={paths.account()}>
          <span className="sm:hidden">Account</span>
          <span className="hidden sm:inline">{viewer.name}</span>
        </NavLink>
      </nav>
    </header>
  )
}
