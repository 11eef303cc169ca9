'use client'
import { useMedia } from '@/hooks/use-media'

/** True where the floor plan is the phone's own; the style sheet draws the line at the same width. */
export function usePhoneLayout(): boolean {
  return useMedia('(width < 700px)')
}
