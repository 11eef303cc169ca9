/** The service worker, where the browser has one: only on HTTPS and on the computer itself. */

/** Registers it; nothing else waits for it, and the product works without. */
export function registerServiceWorker(): void {
  if (process.env.NODE_ENV !== 'production' || !('serviceWorker' in navigator)) return
  navigator.serviceWorker.register('/sw.js').catch(() => undefined)
}

/** At sign-out: pages that were kept for a reload without a network are forgotten. */
export function forgetKeptPages(): void {
  if ('serviceWorker' in navigator) navigator.serviceWorker.controller?.postMessage('forget-pages')
}
