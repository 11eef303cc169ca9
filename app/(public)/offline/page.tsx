import type { Metadata } from 'next'
import { KeptClasses } from '@/components/site/kept-classes'
import { MessagePage } from '@/components/site/message-page'

export const metadata: Metadata = { title: 'No network' }

/** Shown by the service worker in the place of a page that needs the network. */
export default function OfflinePage() {
  return (
    <MessagePage title="No network" figure="plank">
      <p>
        This page has to be fetched, and there is no connection just now. Nothing is lost: rounds
        that you logged are kept on this computer and sent when it is back.
      </p>
      <KeptClasses />
    </MessagePage>
  )
}
