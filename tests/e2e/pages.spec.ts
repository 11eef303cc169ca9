import AxeBuilder from '@axe-core/playwright'
import { expect, test, type Page } from '@playwright/test'
import { signedIn, visitor } from './gym'

// Many pages at three sizes, looked at by axe: a busy computer takes its time.
test.setTimeout(420_000)

const SIZES = [
  { width: 390, height: 844 },
  { width: 1440, height: 900 },
  { width: 1920, height: 1080 },
]

/** axe finds nothing serious, and nothing makes the page scroll sideways, at each size. */
async function isSound(page: Page, address: string): Promise<void> {
  for (const size of SIZES) {
    await page.setViewportSize(size)
    await page.goto(address)
    await page.locator('main').first().waitFor()
    const wide = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth)
    expect(wide, `${address} at ${size.width} px is ${wide} px too wide`).toBeLessThanOrEqual(0)
  }
  await page.waitForLoadState('networkidle')
  const { violations } = await new AxeBuilder({ page }).analyze()
  const serious = violations
    .filter((one) => one.impact === 'serious' || one.impact === 'critical')
    .map(
      (one) =>
        `${one.id}: ${one.nodes
          .map((node) => node.target.join(' '))
          .slice(0, 3)
          .join(', ')}`,
    )
  expect(serious, address).toEqual([])
}

test('every page of a member is sound for axe and at every size', async ({ browser }) => {
  const { page, context, errors } = await signedIn(browser, 'Nadia Ferrante')
  await page.goto('/today')
  const classId = (
    await page
      .getByRole('link', { name: /Get ready|Play again/ })
      .first()
      .getAttribute('href')
  )
    ?.split('/')
    .at(-1)
  await page.goto('/tally')
  const attempt = await page.locator('a[href^="/tally/"]').first().getAttribute('href')
  for (const address of [
    '/today',
    '/classes',
    `/classes/${classId}`,
    `/play/${classId}`,
    '/tally',
    attempt ?? '',
    '/health',
    '/account',
    '/nowhere',
  ]) {
    await isSound(page, address)
  }
  expect(errors).toEqual([])
  await context.close()
})

test('every page of a coach and an owner is sound for axe and at every size', async ({
  browser,
}) => {
  const coach = await signedIn(browser, 'Tomasz Brandt')
  await coach.page.waitForURL(/\/board\//)
  const board = new URL(coach.page.url()).pathname
  const attempt = await coach.page.locator('a[href*="/attempts/"]').first().getAttribute('href')
  await coach.page.goto('/planner')
  const planned = await coach.page.locator('a[href^="/planner/"]').first().getAttribute('href')
  const addresses = [board, attempt ?? '', '/board/all', '/planner', planned ?? '']
  addresses.push('/library', '/library/goblet-squat', '/library/goblet-squat/edit', '/library/new')
  for (const address of addresses) {
    await isSound(coach.page, address)
  }
  expect(coach.errors).toEqual([])
  await coach.context.close()
  const owner = await signedIn(browser, 'Marta Lindqvist')
  await isSound(owner.page, '/gym')
  expect(owner.errors).toEqual([])
  await owner.context.close()
})

test('sign-in is sound for axe and at every size', async ({ browser }) => {
  const { page, context } = await visitor(browser)
  await isSound(page, '/sign-in')
  await context.close()
})

test('the board keeps its filters in the address and gives a CSV of what is shown', async ({
  browser,
}) => {
  const { page, context } = await signedIn(browser, 'Tomasz Brandt')
  await page.waitForURL(/\/board\//)
  await page.getByLabel('Show').selectOption('finished')
  await expect(page).toHaveURL(/state=finished/)
  await expect(page.getByRole('row').filter({ hasText: 'Agnes Thorsby' })).toHaveCount(0)
  await page.reload()
  await expect(page.getByLabel('Show')).toHaveValue('finished')
  const rows = await page.locator('table a[href*="/attempts/"]').count()
  const href = await page.getByRole('link', { name: 'CSV of what is shown' }).getAttribute('href')
  const csv = await page.evaluate(async (address) => (await fetch(address)).text(), href ?? '')
  expect(csv.trim().split('\r\n')).toHaveLength(rows + 1)
  await page.getByLabel('Name', { exact: true }).fill('zzz')
  await expect(page.getByText('No member fits these filters.')).toBeVisible()
  await page.getByRole('button', { name: /Show all/ }).click()
  await expect(page.getByRole('row').filter({ hasText: 'Agnes Thorsby' })).toHaveCount(1)
  await context.close()
})
