import Link from 'next/link'
import { Menu, MENU_ITEM } from '@/components/ui/menu'
import { switchGym } from '@/server/actions/account'
import { paths } from '@/server/contract/paths'
import type { Viewer } from '@/server/contract/viewer'
import { NavLink } from './nav-link'
import { SignOutButton } from './sign-out-button'

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
          { href: paths.board(), text: 'Board', not: [paths.boardAll()] },
          { href: paths.boardAll(), text: 'All boards' },
          { href: paths.planner(), text: 'Planner' },
          { href: paths.library(), text: 'Library' },
        ]
      : []),
    ...(viewer.roles.includes('owner') ? [{ href: paths.gym(), text: 'Gym' }] : []),
  ]
  const others = viewer.gyms.filter((gym) => gym.gymId !== viewer.gymId)
  return (
    <header className="flex flex-wrap items-center gap-x-4 page pt-2 sm:gap-x-6 sm:pt-4">
      <a
        href="#content"
        className="sr-only bg-button px-4 py-2 text-on-button focus:not-sr-only focus:absolute focus:top-2 focus:left-2 focus:z-40"
      >
        To the content
      </a>
      <p className="mr-auto flex min-h-12 min-w-0 flex-1 items-center gap-3 sm:gap-4">
        <Link href={paths.home()} className="font-display text-xl font-extrabold wide">
          Floorside
        </Link>
        <span className="truncate text-[0.9rem] text-text-quiet sm:text-base">
          {viewer.gym.name}
        </span>
      </p>
      <nav
        aria-label="Main"
        className="order-last -mx-1.5 flex w-[calc(100%+0.75rem)] flex-wrap items-center lg:order-none lg:mx-0 lg:w-auto"
      >
        {links.map(({ href, text, ...more }) => (
          <NavLink key={href} href={href} {...more}>
            {text}
          </NavLink>
        ))}
      </nav>
      <Menu summary={<AccountWord name={viewer.name} />}>
        <p className="px-4 py-2.5 leading-tight">
          <strong className="block">{viewer.name}</strong>
          <span className="[overflow-wrap:anywhere] text-text-quiet">{viewer.email}</span>
        </p>
        <Link href={paths.account()} className={MENU_ITEM}>
          My account
        </Link>
        {others.map((gym) => (
          <form key={gym.gymId} action={switchGym}>
            <input type="hidden" name="gymId" value={gym.gymId} />
            <button type="submit" className={MENU_ITEM}>
              Go to {gym.name}
            </button>
          </form>
        ))}
        <SignOutButton className={MENU_ITEM} />
      </Menu>
    </header>
  )
}

/** A phone has room for one word. */
function AccountWord({ name }: { name: string }) {
  return (
    <>
      <span className="sm:hidden">Account</span>
      <span className="max-w-[16rem] truncate max-sm:hidden">{name}</span>
    </>
  )
}
