/**
 * Moves the present of a drawn lane without React, once a frame: pass the element that `Lane`
 * rendered (its `ref`), where the class is, and how long it is.
 */
export function placePresent(lane: HTMLElement, presentMs: number, lengthMs: number): void {
  const part = lengthMs > 0 ? Math.min(1, Math.max(0, presentMs / lengthMs)) : 0
  lane.style.setProperty('--present-now', part.toFixed(6))
}
