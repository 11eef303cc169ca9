import type { ReactNode } from 'react'
import type { Viewer } from '@/server/contract/viewer'
import { Connection } from './connection'
import { SiteHeader } from './site-header'

/** A page around its content: header, connection line, the page's own measure. */
export function PageFrame({ viewer, children }: { viewer: Viewer; children: ReactNode }) {
  return (
    <>
      <SiteHeader viewer={viewer} />
      <Connection membershipId={viewer.roles.includes('member') ? viewer.membershipId : null} />
      <main id="content" className="pt-4 pb-20 sm:pt-6">
        {children}
      </main>
    </>
  )
}
