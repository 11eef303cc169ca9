import { expect, test } from '@playwright/test'
import { DEMO_PASSWORD } from '@/db/seed/people'
import { emailOf } from './gym'

test('signing in before any script has run says what is wrong, gets in, and puts nothing typed into the address', async ({
  browser,
}) => {
  const context = await browser.newContext({ javaScriptEnabled: false })
  const page = await context.newPage()
  const addresses: string[] = []
  page.on('request', (request) => addresses.push(request.url()))
  await page.goto('/sign-in?next=/tally')
  const signIn = async (password: string) => {
    await page.getByLabel('E-mail').fill(emailOf('Rosa Winterhalter'))
    await page.getByLabel('Password', { exact: true }).fill(password)
    await page.getByRole('button', { name: 'Sign in' }).click()
  }
  await signIn('not the password')
  await expect(page.getByRole('alert')).toContainText('do not belong together')
  // After a wrong one the next try waits a second.
  await page.waitForTimeout(1_200)
  await signIn(DEMO_PASSWORD)
  await expect(page).toHaveURL(/\/tally$/)
  expect(addresses.filter((address) => /password|example\.org/i.test(address))).toEqual([])
  await context.close()
})
