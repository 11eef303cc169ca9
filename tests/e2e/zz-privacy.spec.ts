import { existsSync, readFileSync } from 'node:fs'
import { expect, test } from '@playwright/test'
import { DEMO_PASSWORD } from '@/db/seed/people'
import { RECORD, SECRET_NOTE, SERVER_LOG } from './gym'

// Runs last: what the other tests did has left its traces by now.
test('neither addresses nor the server’s log hold health data, a password or a token', () => {
  expect(existsSync(RECORD) && existsSync(SERVER_LOG)).toBe(true)
  const traces = readFileSync(RECORD, 'utf8') + readFileSync(SERVER_LOG, 'utf8')
  expect(traces.length).toBeGreaterThan(1_000)
  for (const secret of [
    SECRET_NOTE,
    DEMO_PASSWORD,
    'not the password',
    'Pain, pressure',
    'chest-pain',
    'ankle-or-foot',
    'rpe=',
    'hurts=',
    'note=',
  ]) {
    expect(traces, secret).not.toContain(secret)
  }
  // A session's token is 43 characters of base64url; ids and hashed file names are no such thing.
  const tokens = traces.match(/(?<![\w/.-])[\w-]{43}(?![\w.-])/g) ?? []
  expect(tokens).toEqual([])
})
