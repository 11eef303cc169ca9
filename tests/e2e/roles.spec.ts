import { expect, test } from '@playwright/test'
import { emailOf, signedIn, signIn, visitor } from './gym'

test('somebody signed out is led to sign-in and back to where they wanted to be', async ({
  browser,
}) => {
  const { page, context } = await visitor(browser)
  await page.goto('/classes')
  await expect(page).toHaveURL(/\/sign-in\?next=%2Fclasses/)
  await signIn(page, 'Dov Lindgren')
  await expect(page).toHaveURL(/\/classes$/)
  await context.close()
})

test('each role lands where its work is', async ({ browser }) => {
  for (const [name, landing] of [
    ['Dov Lindgren', /\/today$/],
    ['Tomasz Brandt', /\/board\/[0-9a-f-]+$/],
    ['Marta Lindqvist', /\/gym$/],
  ] as const) {
    const { page, context } = await signedIn(browser, name)
    await expect(page).toHaveURL(landing)
    await context.close()
  }
})

test('a page that is somebody else’s is not there', async ({ browser }) => {
  const { page, context } = await signedIn(browser, 'Dov Lindgren')
  for (const address of ['/board', '/gym', '/board/all', '/planner']) {
    const answer = await page.goto(address)
    expect(answer?.status(), address).toBe(404)
    await expect(page.getByRole('heading', { name: 'Nothing here' })).toBeVisible()
  }
  await context.close()
})

test('a wrong password says so, keeps what was typed, and the right one gets in', async ({
  browser,
}) => {
  const { page, context } = await visitor(browser)
  await page.goto('/sign-in')
  await signIn(page, 'Samir Choudhury', 'not the password')
  await expect(page.getByText('E-mail and password do not belong together.')).toBeVisible()
  await expect(page.getByLabel('E-mail')).toHaveValue(emailOf('Samir Choudhury'))
  await signIn(page, 'Samir Choudhury')
  await expect(page).toHaveURL(/\/today$/)
  await context.close()
})

test('what a form lacks is said beside the field, which has the focus', async ({ browser }) => {
  const { page, context } = await visitor(browser)
  await page.goto('/sign-in')
  await page.getByRole('button', { name: 'Sign in' }).click()
  await expect(page.getByText('Give your e-mail address.')).toBeVisible()
  await expect(page.getByLabel('E-mail')).toBeFocused()
  await context.close()
})

test('sign-out ends the session for good', async ({ browser }) => {
  const { page, context } = await signedIn(browser, 'Yusuf Demir')
  const cookies = await context.cookies()
  const session = cookies.find((cookie) => cookie.name.includes('floorside'))
  expect(session).toMatchObject({ httpOnly: true, sameSite: 'Lax' })
  await page.goto('/account')
  await page.getByRole('button', { name: 'Sign out', exact: true }).click()
  await expect(page).toHaveURL(/\/sign-in/)
  await context.addCookies(cookies)
  await page.goto('/today')
  await expect(page).toHaveURL(/\/sign-in/)
  await context.close()
})

test('somebody whose answers hold them back can read a class and not play it, until cleared', async ({
  browser,
}) => {
  const { page, context } = await signedIn(browser, 'Viktor Saelens')
  await page.getByRole('link', { name: 'Get ready' }).first().click()
  await page.waitForURL(/\/play\//)
  await expect(page.getByRole('button', { name: 'Start class' }).first()).toBeDisabled()
  await page.goto('/health?next=/today')
  await page.getByLabel(/licensed professional who knows my answers/).check()
  await page.getByRole('button', { name: 'Save my answers' }).click()
  await expect(page).toHaveURL(/\/today$/)
  await page.getByRole('link', { name: 'Get ready' }).first().click()
  await expect(page.getByRole('button', { name: 'Start class' }).first()).toBeEnabled()
  await context.close()
})
