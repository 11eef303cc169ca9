import { readFileSync } from 'node:fs'
import { expect, test } from '@playwright/test'
import webvtt from 'webvtt-parser'
import { signedIn } from './gym'

test('a member who follows the lead is counted for, rep by rep, and the rounds reach the coach', async ({
  browser,
}) => {
  const coach = await signedIn(browser, 'Tomasz Brandt')
  const member = await signedIn(browser, 'Carmen Oyelaran')
  const { page } = member
  await page.getByRole('link', { name: 'Breakwater' }).click()
  await page.waitForURL(/\/classes\//)
  await expect(page.getByText(/Forecast/).first()).toBeVisible()
  await coach.page.goto(`/board/${page.url().split('/').at(-1) ?? ''}`)
  await page.getByRole('link', { name: 'Get ready' }).click()
  await page.getByRole('button', { name: 'The lead counts' }).click()
  await expect(page.getByRole('heading', { name: 'Voice' })).toBeVisible()
  await page.getByRole('button', { name: 'Start class' }).first().click()
  // The warm-up is by the clock; the rounds come after it, behind a brief of their own.
  await page.getByRole('button', { name: /^Skip block/ }).click()
  await page.getByRole('button', { name: 'Skip without a reason' }).click()
  await page.getByRole('button', { name: /^Go on/ }).click()
  await expect(page.getByTestId('lead-rep')).toHaveText('1', { timeout: 15_000 })
  await expect(page.getByText('of 2', { exact: true })).toBeVisible()
  await expect(page.getByTestId('lead-rep')).toHaveText('2', { timeout: 10_000 })
  const row = coach.page.getByRole('row').filter({ hasText: 'Carmen Oyelaran' })
  await expect(row).toContainText('1 + 0', { timeout: 40_000 })
  await page.getByRole('button', { name: /^Leave the lead/ }).click()
  await expect(page.getByTestId('lead')).toHaveCount(0)
  await page.getByRole('button', { name: /^Follow the lead/ }).click()
  await expect(page.getByTestId('lead')).toBeVisible()
  expect(member.errors).toEqual([])
  await member.context.close()
  await coach.context.close()
})

test('a coach takes the captions of a class away and brings cues into a block', async ({
  browser,
}) => {
  const { page, context, errors } = await signedIn(browser, 'Ifeoma Adeyemi')
  await page.goto('/planner')
  await page.getByRole('link', { name: 'Slipway' }).click()
  await expect(page.getByRole('heading', { name: 'Captions' })).toBeVisible()
  const blocks = await page
    .getByRole('combobox', { name: 'Into the block' })
    .locator('option')
    .count()
  const download = async (name: string) => {
    const [file] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name }).click(),
    ])
    return readFileSync(await file.path(), 'utf8')
  }
  // W3C's own parser and validator (webvtt-parser).
  const parser = new webvtt.WebVTTParser({})
  const captions = parser.parse(await download('Download captions'), 'captions')
  expect(captions.errors).toEqual([])
  const chapters = parser.parse(await download('Download chapters'), 'chapters')
  expect(chapters.errors).toEqual([])
  expect(chapters.cues).toHaveLength(blocks)
  expect(captions.cues.length).toBeGreaterThan(chapters.cues.length * 2)

  const text = page.getByLabel('or its text')
  await text.fill('nothing of the kind')
  await page.getByRole('button', { name: 'Publish with these cues' }).click()
  await expect(page.getByText(/No cue could be read from this\. This is no WebVTT/)).toBeVisible()
  await expect(text).toHaveValue('nothing of the kind')
  await text.fill('WEBVTT\n\n00:05.000 --> 00:07.000\n<b>Look ahead, not down</b>')
  await expect(page.getByText('1 cue', { exact: true })).toBeVisible()
  await page.getByRole('button', { name: 'Publish with these cues' }).click()
  await expect(page.getByText('1 cue in a new version')).toBeVisible()
  await expect(text).toHaveValue('')
  await expect(page.getByRole('listitem').filter({ hasText: 'Look ahead, not down' })).toBeVisible()
  await expect(page.getByText(/2 versions/)).toBeVisible()
  expect(errors).toEqual([])
  await context.close()
})
