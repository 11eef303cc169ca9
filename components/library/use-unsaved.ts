'use client'
import { useEffect, type RefObject } from 'react'

const QUESTION = 'What you typed is not saved. Leave it behind?'

/** Asks before a page with something unsaved is left: by its links, by closing it or by loading it anew. */
export function useUnsaved(isDirty: RefObject<boolean>): void {
  useEffect(() => {
    const beforeUnload = (event: BeforeUnloadEvent) => {
      if (isDirty.current) event.preventDefault()
    }
    const click = (event: MouseEvent) => {
      if (!isDirty.current || event.defaultPrevented || event.ctrlKey || event.metaKey) return
      const link = event.target instanceof Element ? event.target.closest('a[href]') : null
      if (!(link instanceof HTMLAnchorElement) || link.target === '_blank') return
      if (link.getAttribute('href')?.startsWith('#')) return
      if (window.confirm(QUESTION)) isDirty.current = false
      else {
        event.preventDefault()
        event.stopPropagation()
      }
    }
    window.addEventListener('beforeunload', beforeUnload)
    document.addEventListener('click', click, { capture: true })
    return () => {
      window.removeEventListener('beforeunload', beforeUnload)
      document.removeEventListener('click', click, { capture: true })
    }
  }, [isDirty])
}
