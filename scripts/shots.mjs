/**
 * Pictures of the main screens at three sizes, into .shots/. `npm start` (or `npm run dev`) must run.
 *
 *   npm run shots                      of http://127.0.0.1:3000
 *   npm run shots -- http://127.0.0.1:3001
 *
 * It signs in with the demo gym's sign-ins and plays the short class of today for about three minutes
 * as Dov Lindgren, so his attempt is on the board afterwards.
 */
import { mkdirSync } from 'node:fs'
import { chromium } from '@playwright/test'
import { ensureChromium } from './lib/debian.mjs'
import { Problem, ROOT } from './lib/steps.mjs'

const origin = process.argv[2] ?? 'http://127.0.0.1:3000'
const folder = `${ROOT}/.shots`
const SIZES = [
  { width: 390, height: 844 },
  { width: 1440, height: 900 },
  { width: 1920, height: 1080 },
]
const PASSWORD = 'harbour-lantern-42'
const MEMBER = 'dov.lindgren@example.org'
const COACH = 'tomasz@quayside.example'
const SHORT_CLASS = 'Breakwater'

/** One picture a size; a page keeps its state while its size changes. */
async function shoot(page, name) {
  for (const size of SIZES) {
    await page.setViewportSize(size)
    // Fonts, and what moves as it appears.
    await page.evaluate(() => document.fonts.ready)
    await page.waitForTimeout(600)
    const path = `${folder}/${name}-${size.width}x${size.height}.png`
    await page.screenshot({ path })
    console.log(path.slice(ROOT.length + 1))
  }
}

async function signIn(page, email) {
  await page.goto(`${origin}/sign-in`)
  await page.getByLabel('E-mail').fill(email)
  await page.getByLabel('Password').fill(PASSWORD)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL((url) => url.pathname !== '/sign-in')
}

async function takeAll(browser) {
  const member = await (await browser.newContext({ viewport: SIZES[1] })).newPage()
  await member.goto(`${origin}/sign-in`)
  await shoot(member, 'sign-in')
  await signIn(member, MEMBER)
  await shoot(member, 'today')

  await member.setViewportSize(SIZES[1])
  // The day's own page leads with the class being played, the schedule with today's.
  await member.goto(`${origin}/classes`)
  await member.getByRole('link', { name: SHORT_CLASS }).first().click()
  await member.waitForURL(/\/classes\/.+/)
  await member.getByRole('link', { name: /Get ready|Play again|Go on/ }).click()
  const start = member.getByRole('button', { name: 'Start class' })
  await start.waitFor()
  await shoot(member, 'before')
  await member.setViewportSize(SIZES[1])
  await start.click()
  await member.waitForTimeout(2_000)
  await shoot(member, 'brief')
  // The hall is dark in work, birch is light in all else: warm-up, brief of the ladder, ladder, rest.
  const ground = (name) =>
    member.locator(`main[data-ground="${name}"]`).waitFor({ timeout: 150_000 })
  await ground('hall')
  await ground('birch')
  await ground('hall')
  await member.setViewportSize(SIZES[1])
  for (const afterMs of [12_000, 18_000]) {
    await member.waitForTimeout(afterMs)
    await member.keyboard.press('Space')
  }
  await shoot(member, 'work')
  await ground('birch')
  await shoot(member, 'rest')
  await member.goto(`${origin}/tally`)
  await member.locator('main a[href^="/tally/"]').first().click()
  await member.waitForURL(/\/tally\/.+/)
  await shoot(member, 'tally')

  const coach = await (await browser.newContext({ viewport: SIZES[1] })).newPage()
  await signIn(coach, COACH)
  await coach.waitForLoadState('networkidle', { timeout: 5_000 }).catch(() => undefined)
  await shoot(coach, 'board')
}

async function main() {
  await fetch(`${origin}/api/health`).catch(() => {
    throw new Problem(`Nothing answers at ${origin}: start it with 'npm start' first.`)
  })
  mkdirSync(folder, { recursive: true })
  const browser = await chromium.launch({
    executablePath: await ensureChromium(),
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  })
  try {
    await takeAll(browser)
  } finally {
    await browser.close()
  }
}

main().catch((error) => {
  console.error(error instanceof Problem ? error.message : error)
  process.exitCode = 1
})
