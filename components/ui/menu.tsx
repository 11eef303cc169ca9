'use client'
import { useEffect, useRef, type ReactNode } from 'react'

/** Its items look alike, whether links or buttons. */
export const MENU_ITEM =
  'flex min-h-12 w-full cursor-pointer items-center px-4 py-1.5 text-left decoration-3 underline-offset-6 hover:underline'

/** A few ways on behind one word. Closes by Escape, by a press elsewhere and when the focus leaves. */
export function Menu({ summary, children }: { summary: ReactNode; children: ReactNode }) {
  const details = useRef<HTMLDetailsElement>(null)
  useEffect(() => {
    const close = (event: Event) => {
      const element = details.current
      if (element?.open && event.target instanceof Node && !element.contains(event.target)) {
        element.open = false
      }
    }
    document.addEventListener('pointerdown', close)
    document.addEventListener('focusin', close)
    return () => {
      document.removeEventListener('pointerdown', close)
      document.removeEventListener('focusin', close)
    }
  }, [])
  return (
    <details
      ref={details}
      className="group relative"
      onKeyDown={(event) => {
        if (event.key !== 'Escape' || !details.current?.open) return
        details.current.open = false
        details.current.querySelector('summary')?.focus()
      }}
      onClick={(event) => {
        if (event.target instanceof Element && event.target.closest('a') && details.current) {
          details.current.open = false
        }
      }}
    >
      <summary className="flex min-h-12 cursor-pointer list-none items-center gap-2 [&::-webkit-details-marker]:hidden">
        {summary}
        <svg
          viewBox="0 0 12 8"
          aria-hidden
          focusable="false"
          className="w-3 shrink-0 group-open:rotate-180"
        >
          <path d="M1 1.5l5 5 5-5" fill="none" stroke="currentColor" strokeWidth="2.4" />
        </svg>
      </summary>
      <div className="absolute top-full right-0 z-30 w-max max-w-[calc(100vw-2rem)] min-w-56 divide-y-4 divide-fill border-4 border-line bg-raised">
        {children}
      </div>
    </details>
  )
}
