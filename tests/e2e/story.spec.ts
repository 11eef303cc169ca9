import { expect, test, type Locator, type Page } from '@playwright/test'
import { SECRET_NOTE, signedIn } from './gym'

test.setTimeout(300_000)

const key = (page: Page, name: string) => page.keyboard.press(name)
const onBoard = (page: Page): Locator => page.getByRole('row').filter({ hasText: 'Dov Lindgren' })

test('a member plays a class to the rating, and the coach sees it as it happens', async ({
  browser,
}) => {
  const coach = await signedIn(browser, 'Tomasz Brandt')
  const member = await signedIn(browser, 'Dov Lindgren')
  const { page } = member

  await page.getByRole('link', { name: 'Breakwater' }).click()
  await page.waitForURL(/\/classes\//)
  const classId = page.url().split('/').at(-1) ?? ''
  await coach.page.goto(`/board/${classId}`)
  await expect(onBoard(coach.page)).toContainText('Not started')
  await expect(coach.page.getByText('Live', { exact: true })).toBeVisible()

  await page.getByRole('link', { name: 'Get ready' }).click()
  await page.waitForURL(/\/play\//)
  await page.getByRole('button', { name: 'Start class' }).first().click()
  await expect(page.getByText('Brief', { exact: true })).toBeVisible()
  // A change is on the board in two seconds or less.
  await expect(onBoard(coach.page)).toContainText('Wake up', { timeout: 2_000 })

  // The warm-up is skipped with its reason, the next brief passed: the work begins with its count-in.
  await page.getByRole('button', { name: /^Skip block/ }).click()
  await page.getByRole('button', { name: 'Skip without a reason' }).click()
  await expect(page.getByRole('heading', { name: 'Squat and push' }).first()).toBeVisible()
  await key(page, 'Space')
  const logRound = page.getByRole('button', { name: /^Log round/ })
  await expect(logRound).toBeVisible({ timeout: 15_000 })
  await expect(page.getByText('Goblet squat').first()).toBeVisible()

  await test.step('a round is logged once, taken back, and seen on the board', async () => {
    await key(page, 'Space')
    await key(page, 'Space')
    await expect(page.getByText(/this press is not counted/)).toBeVisible()
    await expect(onBoard(coach.page)).toContainText('1 + 0', { timeout: 2_000 })
    await expect(page.getByText('Round 1 was logged')).toBeHidden({ timeout: 8_000 })
    await key(page, 'Space')
    await expect(onBoard(coach.page)).toContainText('2 + 0', { timeout: 2_000 })
    await key(page, 'Backspace')
    await expect(onBoard(coach.page)).toContainText('1 + 0', { timeout: 2_000 })
  })

  await test.step('an easier option is one key away and on the board', async () => {
    await key(page, '1')
    await expect(page.getByText('To a chair').first()).toBeVisible()
    await expect(onBoard(coach.page)).toContainText(/Option\s*1/, { timeout: 2_000 })
  })

  await test.step('without a network rounds are kept, through a reload, and sent when it is back', async () => {
    await member.context.setOffline(true)
    await page.evaluate(() => new Promise((done) => setTimeout(done, 1_600)))
    await key(page, 'Space')
    await expect(page.getByText(/saved here/)).toBeVisible()
    await page.reload()
    await expect(page.getByText(/saved here/)).toBeVisible({ timeout: 15_000 })
    await expect(page.getByRole('button', { name: /^Log round/ })).toBeVisible()
    await member.context.setOffline(false)
    await expect(onBoard(coach.page)).toContainText('2 + 0', { timeout: 20_000 })
    await expect(page.getByText('saved', { exact: true })).toBeVisible()
  })

  await test.step('a second tab says so and can take over', async () => {
    const second = await member.context.newPage()
    await second.goto(page.url())
    await expect(second.getByRole('heading', { name: /another tab/ })).toBeVisible()
    await second.close()
  })

  await test.step('this hurts is recorded at once, above all else', async () => {
    await key(page, 'h')
    await page.getByRole('button', { name: 'Ankle or foot' }).click()
    await expect(onBoard(coach.page)).toContainText('Ankle or foot hurts', { timeout: 2_000 })
    await key(page, 'Escape')
  })

  // The rest of the class by skipping; a rest has a least time, which is waited for.
  const rating = page.getByText('How hard was the whole class for you?')
  const skip = page.getByRole('button', { name: /^Skip block/ })
  await expect(async () => {
    if (await rating.isVisible()) return
    if (await skip.isVisible()) {
      await skip.click()
      await page.getByRole('button', { name: 'Skip without a reason' }).click()
    }
    await expect(rating).toBeVisible({ timeout: 1_000 })
  }).toPass({ timeout: 120_000, intervals: [1_000] })

  await test.step('the rating reaches the coach, and the tally the member', async () => {
    await expect(page.getByText('How hard was the whole class for you?')).toBeVisible({
      timeout: 60_000,
    })
    await page.getByRole('radio', { name: /^5/ }).check({ force: true })
    await page.getByLabel('A note to your coach').fill(SECRET_NOTE)
    await page.getByRole('button', { name: 'Send to my coach' }).click()
    await expect(onBoard(coach.page)).toContainText('Finished', { timeout: 5_000 })
    await onBoard(coach.page).getByRole('link', { name: 'Dov Lindgren' }).click()
    await expect(coach.page.getByText(SECRET_NOTE).first()).toBeVisible()
    await expect(coach.page.getByText(/RPE/).first()).toBeVisible()
    await page.goto('/tally')
    await page
      .getByRole('link', { name: /Breakwater/ })
      .first()
      .click()
    await expect(page.getByRole('heading', { name: 'Block by block' })).toBeVisible()
    await expect(page.getByText('2 + 0')).toBeVisible()
    await expect(page.getByText(/to a chair/i).first()).toBeVisible()
  })
  expect(member.errors).toEqual([])
  expect(coach.errors).toEqual([])
  await member.context.close()
  await coach.context.close()
})

test('stop halts the clock at once and is on the board above all else', async ({ browser }) => {
  const coach = await signedIn(browser, 'Tomasz Brandt')
  const member = await signedIn(browser, 'Agnes Thorsby')
  const { page } = member
  await page.getByRole('link', { name: 'Breakwater' }).click()
  await page.waitForURL(/\/classes\//)
  await coach.page.goto(`/board/${page.url().split('/').at(-1) ?? ''}`)
  await page.getByRole('link', { name: 'Get ready' }).click()
  await page.getByRole('button', { name: 'Start class' }).first().click()
  await expect(page.getByText('Brief', { exact: true })).toBeVisible()
  await key(page, 's')
  await expect(page.getByText(/your local emergency number/).first()).toBeVisible()
  await page.getByText('Pain, pressure or tightness in the chest').first().click()
  const row = coach.page.getByRole('row').filter({ hasText: 'Agnes Thorsby' })
  await expect(row).toContainText('Stopped', { timeout: 5_000 })
  await expect(page.getByRole('dialog').getByRole('button', { name: /^Go on/ })).toHaveCount(0)
  await expect(page.getByText('Going on is not offered in this class.')).toBeVisible()
  await member.context.close()
  await coach.context.close()
})
