'use client'
import { useLayoutEffect } from 'react'
import { distanceTextPx } from './distance'

/** Keeps `--distance-text` on the page at the size for this screen and distance. */
export function useDistanceText(diagonalInches: number, distanceMetres: number): void {
  useLayoutEffect(() => {
    const root = document.documentElement
    const size = distanceTextPx({
      diagonalInches,
      distanceMetres,
      widthPx: window.screen.width,
      heightPx: window.screen.height,
    })
    root.style.setProperty('--distance-text', `${size.toFixed(1)}px`)
    // Who has read the size reads it again, as at any other change of the screen.
    window.dispatchEvent(new Event('resize'))
    return () => {
      root.style.removeProperty('--distance-text')
    }
  }, [diagonalInches, distanceMetres])
}
