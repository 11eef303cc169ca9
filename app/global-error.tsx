'use client'
import './globals.css'
import ErrorPage from './error'

export default function GlobalError(props: {
  error: Error & { digest?: string }
  reset: () => void
}) {
  return (
    <html lang="en-GB" data-ground="birch">
      <body className="min-h-dvh boards antialiased">
        <ErrorPage {...props} />
      </body>
    </html>
  )
}
