import { describe, expect, test } from 'vitest'
import {
  agoText,
  dateOf,
  dateStyleOf,
  dayName,
  lengthText,
  plural,
  shortDay,
  timeOfDay,
  windowText,
} from '@/server/contract/format'
import { kitText } from '@/server/contract/kit-text'
import { weekStart, weekTitle } from '@/server/contract/weeks'

describe('the gym’s zone', () => {
  // Around the change to summer time in Norway, 29 March 2026 at 01:00 UTC.
  test.each([
    ['2026-03-29T00:30:00.000Z', '01:30'],
    ['2026-03-29T01:30:00.000Z', '03:30'],
    ['2026-12-01T23:30:00.000Z', '00:30'],
  ])('%s is %s on its clock', (instant, time) => {
    expect(timeOfDay(instant, 'Europe/Oslo')).toBe(time)
  })

  test('an instant late in the evening is on the day that the gym has', () => {
    expect(dateOf('2026-10-21T22:30:00.000Z', 'Europe/Oslo')).toBe('22 October 2026')
    expect(dateOf('2026-10-21T22:30:00.000Z', 'America/New_York')).toBe('21 October 2026')
  })

  test.each([
    ['2026-12-01T05:00:00.000Z', '2026-12-01T21:00:00.000Z', '06:00 to 22:00'],
    ['2026-11-30T23:00:00.000Z', '2026-12-01T23:00:00.000Z', 'all day'],
    ['2026-12-01T17:00:00.000Z', '2026-12-01T23:00:00.000Z', '18:00 to midnight'],
  ])('a class open from %s until %s is open %s', (opens, closes, text) => {
    expect(windowText(opens, closes, 'Europe/Oslo')).toBe(text)
  })
})

describe('the reader’s order', () => {
  test.each([
    ['en-US,en;q=0.9', 'month-first'],
    ['en-us', 'month-first'],
    ['en-GB,en-US;q=0.8', 'day-first'],
    ['de-DE,de;q=0.9,en-US;q=0.7', 'day-first'],
    ['', 'day-first'],
    [null, 'day-first'],
  ] as const)('a browser that asks for %s reads %s', (header, style) => {
    expect(dateStyleOf(header)).toBe(style)
  })

  test('days, dates and times follow it', () => {
    expect(dayName('2026-12-02')).toBe('Wednesday 2 December')
    expect(dayName('2026-12-02', 'month-first')).toBe('Wednesday, December 2')
    expect(shortDay('2026-12-02')).toBe('Wed 2 Dec')
    expect(dateOf('2026-12-02T10:00:00.000Z', 'UTC', 'month-first')).toBe('December 2, 2026')
    expect(timeOfDay('2026-12-02T18:05:00.000Z', 'UTC', 'month-first')).toBe('6:05 PM')
  })
})

test.each([
  [0, '0 seconds'],
  [1_000, '1 second'],
  [59_400, '59 seconds'],
  [60_000, '1 minute'],
  [2_061_000, '34 minutes'],
])('%d ms is a length of %s', (ms, text) => {
  expect(lengthText(ms)).toBe(text)
})

test.each([
  [-5_000, '0 s'],
  [89_000, '89 s'],
  [95_000, '2 min'],
  [5_400_000, '2 h'],
  [200_000_000, '2 days'],
])('%d ms ago is %s', (ms, text) => {
  expect(agoText(ms)).toBe(text)
})

test('counts carry their word in the right number', () => {
  expect([0, 1, 2].map((count) => plural(count, 'round'))).toEqual([
    '0 rounds',
    '1 round',
    '2 rounds',
  ])
  expect(plural(2, 'browser is', 'browsers are')).toBe('2 browsers are')
})

test.each([
  ['dumbbell', 1, 'Dumbbell'],
  ['dumbbell', 2, 'Two dumbbells'],
  ['bench', 2, 'Two benches'],
  ['band', 3, '3 bands'],
])('%s × %d is read as %s', (item, count, text) => {
  expect(kitText(item, count)).toBe(text)
})

describe('weeks', () => {
  test.each([
    ['2026-11-30', '2026-11-30'],
    ['2026-12-06', '2026-11-30'],
    ['2027-01-01', '2026-12-28'],
  ])('the week of %s begins on Monday %s', (day, monday) => {
    expect(weekStart(day)).toBe(monday)
  })

  test.each([
    ['2026-11-30', 'This week'],
    ['2026-12-07', 'Next week'],
    ['2026-11-23', 'Last week'],
    ['2026-12-28', '28 December to 3 January'],
  ])('on 1 December 2026 the week from %s is called %s', (week, title) => {
    expect(weekTitle(week, '2026-12-01', 'day-first')).toBe(title)
  })
})
