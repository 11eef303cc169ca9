/** What the browser tests share: signing in, finding today's classes, keeping what was asked for. */
import { appendFileSync, mkdirSync } from 'node:fs'
import type { Browser, BrowserContext, Page } from '@playwright/test'
import { DEMO_PASSWORD, demoMembers, demoStaff } from '@/db/seed/people'

/** Addresses that were asked for, and the server's own words: read by the last test. */
export const RECORD = '.floorside/e2e-requests.log'
export const SERVER_LOG = '.floorside/e2e-server.log'

export const emailOf = (name: string): string => {
  const person = [...demoStaff, ...demoMembers].find((one) => one.name === name)
  if (!person) throw new Error(`nobody is called ${name}`)
  return person.email
}

/** Words that a member types and nobody but their coach may read: they must not be found in a log or an address. */
export const SECRET_NOTE = 'tender-left-heel-after-stairs'

export interface Visitor {
  context: BrowserContext
  page: Page
  /** Errors that the page threw or wrote. */
  errors: string[]
}

export async function visitor(
  browser: Browser,
  size = { width: 1440, height: 900 },
): Promise<Visitor> {
  mkdirSync('.floorside', { recursive: true })
  const context = await browser.newContext({ viewport: size })
  const page = await context.newPage()
  const errors: string[] = []
  page.on('pageerror', (error) => errors.push(error.message))
  context.on('request', (request) =>
    appendFileSync(RECORD, `${request.method()} ${request.url()}\n`),
  )
  return { context, page, errors }
}

export async function signIn(page: Page, name: string, password = DEMO_PASSWORD): Promise<void> {
  if (!page.url().includes('/sign-in')) await page.goto('/sign-in')
  await page.getByLabel('E-mail').fill(emailOf(name))
  await page.getByLabel('Password', { exact: true }).fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
}

export async function signedIn(
  browser: Browser,
  name: string,
  size?: { width: number; height: number },
): Promise<Visitor> {
  const one = await visitor(browser, size)
  await signIn(one.page, name)
  await one.page.waitForURL((url) => !url.pathname.startsWith('/sign-in'))
  return one
}
