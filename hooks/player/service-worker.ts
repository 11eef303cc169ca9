/** The service worker, where the browser has one: only on HTTPS and on the computer itself. */

const isThere = () => process.env.NODE_ENV === 'production' && 'serviceWorker' in navigator

/** Registers it; nothing else waits for it, and the product works without. */
export function registerServiceWorker(): void {
  if (isThere()) navigator.serviceWorker.register('/sw.js').catch(() => undefined)
}

/**
 * Keeps this page for a reload without a network. The way here is mostly a change of route, which asks
 * for no document, and the first visit loads its scripts before there is a worker.
 */
export async function keepThisPage(): Promise<void> {
  if (!isThere()) return
  registerServiceWorker()
  const { active } = await navigator.serviceWorker.ready
  const assets = performance
    .getEntriesByType('resource')
    .map((entry) => new URL(entry.name))
    .filter(
      (address) =>
        address.origin === location.origin && address.pathname.startsWith('/_next/static/'),
    )
    .map((address) => address.pathname + address.search)
  active?.postMessage({ type: 'keep-page', page: location.pathname, assets })
}

export interface KeptClass {
  path: string
  title: string
}

/** Classes that this browser can play without a network. */
export async function keptClasses(): Promise<KeptClass[]> {
  if (typeof caches === 'undefined') return []
  const kept: KeptClass[] = []
  try {
    for (const name of await caches.keys()) {
      const cache = await caches.open(name)
      for (const request of await cache.keys()) {
        const path = new URL(request.url).pathname
        const page = path.startsWith('/play/') ? await cache.match(request) : undefined
        if (!page) continue
        const { title } = new DOMParser().parseFromString(await page.text(), 'text/html')
        kept.push({ path, title: title.split(' · ')[0] ?? title })
      }
    }
  } catch {
    // Without storage nothing was kept.
  }
  return kept
}

/** At sign-out, and where another person signs in: pages kept for one are never shown to the next. */
export async function forgetKeptPages(): Promise<void> {
  if (typeof caches === 'undefined') return
  try {
    for (const name of await caches.keys()) {
      const cache = await caches.open(name)
      for (const request of await cache.keys()) {
        if (new URL(request.url).pathname.startsWith('/play/')) await cache.delete(request)
      }
    }
  } catch {
    // Without storage nothing was kept.
  }
}

const OWNER_KEY = 'floorside-pages-of'

/** Forgets the pages of whoever was here before `membershipId`, though they never signed out. */
export async function keepPagesOnlyFor(membershipId: string): Promise<void> {
  try {
    if (localStorage.getItem(OWNER_KEY) === membershipId) return
    await forgetKeptPages()
    localStorage.setItem(OWNER_KEY, membershipId)
  } catch {
    await forgetKeptPages()
  }
}
