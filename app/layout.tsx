import type { Metadata, Viewport } from 'next'
import type { ReactNode } from 'react'
import './globals.css'

export const metadata: Metadata = {
  title: { default: 'Floorside', template: '%s · Floorside' },
  description: 'Follow-along strength classes at home, led by your own coach.',
}
export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  themeColor: '#f5ecdc',
}

export default function RootLayout({ children }: { children: ReactNode }) {
  return (
    <html lang="en-GB" data-ground="birch">
      <body className="min-h-dvh boards antialiased">{children}</body>
    </html>
  )
}
