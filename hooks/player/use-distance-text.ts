'use client'
import { useLayoutEffect } from 'react'
import { distanceTextPx } from './distance'

/** A window much narrower than its screen cannot hold letters for the whole of it: about a dozen must fit a line. */
const MOST_OF_WIDTH = 0.085

/** Keeps `--distance-text` on the page at the size for this screen and distance. */
export function useDistanceText(diagonalInches: number, distanceMetres: number): void {
  useLayoutEffect(() => {
    const root = document.documentElement
    const apply = () => {
      const wanted = distanceTextPx({
        diagonalInches,
        distanceMetres,
        widthPx: window.screen.width,
        heightPx: window.screen.height,
      })
      const size = `${Math.min(wanted, window.innerWidth * MOST_OF_WIDTH).toFixed(1)}px`
      if (root.style.getPropertyValue('--distance-text') === size) return
      root.style.setProperty('--distance-text', size)
      // Who has read the size reads it again, as at any other change of the screen.
      window.dispatchEvent(new Event('resize'))
    }
    apply()
    window.addEventListener('resize', apply)
    return () => {
      window.removeEventListener('resize', apply)
      root.style.removeProperty('--distance-text')
    }
  }, [diagonalInches, distanceMetres])
}
