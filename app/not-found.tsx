import type { Metadata } from 'next'
import { MessagePage } from '@/components/site/message-page'
import { LinkButton } from '@/components/ui/button'
import { paths } from '@/server/contract/paths'

export const metadata: Metadata = { title: 'Nothing here' }

export default function NotFound() {
  return (
    <MessagePage title="Nothing here" figure="standing">
      <p>
        This page does not exist, or it is not yours to see. If a link brought you here, it may be
        for somebody else or for another gym.
      </p>
      <LinkButton href={paths.home()}>Go to my page</LinkButton>
    </MessagePage>
  )
}
