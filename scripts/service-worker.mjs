/**
 * Writes public/sw.js: a class that was loaded comes back at a reload without a network, and every other
 * page says that there is none. Its caches are
 * named by the build, so a new one starts clean. `node scripts/service-worker.mjs [BUILD]`, after the
 * build, whose own id is taken where none is given. With `-` after it, to standard output.
 */
import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'

const buildId = new URL('../.next/BUILD_ID', import.meta.url)
const build =
  process.argv[2] ?? (existsSync(buildId) ? readFileSync(buildId, 'utf8').trim() : 'unbuilt')
const list = (folder) =>
  readdirSync(new URL(`../public/${folder}/`, import.meta.url))
    .filter((name) => /\.(wav|woff2)$/.test(name))
    .map((name) => `/${folder}/${name}`)

const source = `// Made by scripts/service-worker.mjs; not to be edited.
const CACHE = 'floorside-${build}'
const FIXED = ${JSON.stringify([...list('sounds'), ...list('fonts')])}
const OFFLINE = '/offline'
const ANSWER_MS = 4000

self.addEventListener('install', (event) => {
  event.waitUntil(
    caches.open(CACHE)
      .then((cache) => Promise.all([cache.addAll(FIXED), keepOffline(cache)]))
      .then(() => self.skipWaiting()),
  )
})
self.addEventListener('activate', (event) => {
  event.waitUntil(
    caches.keys()
      .then((names) => Promise.all(names.filter((name) => name.startsWith('floorside-') && name !== CACHE).map((name) => caches.delete(name))))
      .then(() => self.clients.claim()),
  )
})
self.addEventListener('message', (event) => {
  if (event.data?.type === 'keep-page') event.waitUntil(keepPage(event.data.page, event.data.assets))
})

async function keepOffline(cache) {
  const answer = await fetch(OFFLINE)
  if (!answer.ok) return
  const page = await answer.clone().text()
  await cache.put(OFFLINE, answer)
  const assets = new Set(page.match(/\\/_next\\/static\\/[\\w./~-]+\\.(?:js|css)/g))
  await Promise.all([...assets].map((asset) => cache.add(asset)))
}
async function keepPage(page, assets) {
  if (!String(page).startsWith('/play/')) return
  const cache = await caches.open(CACHE)
  await keep(new Request(page), await fetch(page, { credentials: 'same-origin' }))
  for (const asset of assets) {
    if (String(asset).startsWith('/_next/static/') && !(await cache.match(asset))) await cache.add(asset)
  }
}
async function keep(request, answer) {
  if (answer.ok && !answer.redirected) await (await caches.open(CACHE)).put(request, answer.clone())
  return answer
}
async function fromCacheFirst(request) {
  return (await caches.match(request)) ?? keep(request, await fetch(request))
}
async function fromNetworkFirst(request) {
  const late = new Promise((_, reject) => setTimeout(() => reject(new Error('late')), ANSWER_MS))
  const fresh = fetch(request).then((answer) => keep(new Request(new URL(request.url).pathname), answer))
  try {
    return await Promise.race([fresh, late])
  } catch (error) {
    const kept = await caches.match(new URL(request.url).pathname)
    return kept ?? orOffline(fresh)
  }
}

async function orOffline(fresh) {
  try {
    return await fresh
  } catch (error) {
    const page = await caches.match(OFFLINE)
    if (page) return page
    throw error
  }
}

self.addEventListener('fetch', (event) => {
  const { request } = event
  const address = new URL(request.url)
  if (request.method !== 'GET' || address.origin !== self.location.origin) return
  // Data of the framework and of our own routes is never kept.
  if (request.headers.has('rsc') || address.searchParams.has('_rsc') || address.pathname.startsWith('/api/')) return
  if (request.mode === 'navigate' && address.pathname.startsWith('/play/')) event.respondWith(fromNetworkFirst(request))
  else if (request.mode === 'navigate') event.respondWith(orOffline(fetch(request)))
  else if (/^\\/(_next\\/static|sounds|fonts)\\//.test(address.pathname)) event.respondWith(fromCacheFirst(request))
})
`
if (process.argv[3] === '-') process.stdout.write(source)
else writeFileSync(new URL('../public/sw.js', import.meta.url), source)
