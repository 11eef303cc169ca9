import { describe, expect, it } from 'vitest'
import { easierFor, optionsForHolds } from '@/server/engine/fit/hurt'
import {
  HEALTH_QUESTIONS,
  HEALTH_QUESTION_TEXT,
  noteForCoach,
  standing,
  type HealthAnswers,
  type StandingInput,
} from '@/server/engine/fit/screening'
import {
  AFTER_RED_FLAG,
  RED_FLAG_TEXT,
  STOP_SIGN_TEXT,
  emergencyText,
  isRedFlag,
} from '@/server/engine/fit/stop-signs'
import { CR10_ANCHORS, sessionLoad } from '@/server/engine/load/session-rpe'
import { STOP_SIGNS } from '@/server/engine/tally/names'
import { block, press, squat, versionOf } from './classes'

describe('session RPE', () => {
  it('has the CR-10 anchors as Foster published them', () => {
    // Egan AD et al. J Sports Sci Med 2006;5:289-295, table 1 (open access).
    const published = [
      [0, 'Rest'],
      [1, 'Very, Very Easy'],
      [2, 'Easy'],
      [3, 'Moderate'],
      [4, 'Somewhat Hard'],
      [5, 'Hard'],
      [6, null],
      [7, 'Very Hard'],
      [8, null],
      [9, null],
      [10, 'Maximal'],
    ] as const
    expect(CR10_ANCHORS.map((one) => [one.rating, one.anchor?.toLowerCase() ?? null])).toEqual(
      published.map(([rating, anchor]) => [rating, anchor?.toLowerCase() ?? null]),
    )
  })
  it('gives the textbook example: a 7 over 60 minutes is 420 units', () => {
    // Foster C et al. J Strength Cond Res 2001;15(1):109-115: rating × minutes.
    expect(sessionLoad(7, 60)).toBe(420)
    expect(sessionLoad(0, 60)).toBe(0)
  })
  it('has no load for what is no rating or no duration', () => {
    for (const [rpe, minutes] of [
      [11, 60],
      [-1, 60],
      [Number.NaN, 60],
      [7, -1],
      [7, Infinity],
    ] as const) {
      expect(sessionLoad(rpe, minutes)).toBeNull()
    }
  })
})

const DAY = 86_400_000
const none = Object.fromEntries(HEALTH_QUESTIONS.map((one) => [one, false])) as HealthAnswers
const input = (yes: (keyof HealthAnswers)[], more: Partial<StandingInput> = {}): StandingInput => ({
  answers: { ...none, ...Object.fromEntries(yes.map((one) => [one, true])) },
  answeredAtMs: 0,
  clearedAtMs: null,
  limits: [],
  intervalDays: 90,
  nowMs: DAY,
  ...more,
})

describe('health questions', () => {
  it('are asked before a first class and when the answers are older than the gym says', () => {
    expect(standing({ ...input([]), answers: null, answeredAtMs: null })).toEqual({
      standing: 'open',
      goodUntilMs: null,
    })
    expect(standing(input([], { nowMs: 90 * DAY })).standing).toBe('clear')
    expect(standing(input([], { nowMs: 90 * DAY + 1 })).standing).toBe('open')
    expect(standing(input([], { intervalDays: 30, nowMs: 31 * DAY })).standing).toBe('open')
  })
  it.each(['chest-pain', 'faint-or-dizzy', 'breathless', 'only-supervised'] as const)(
    'block play after %s until clearance is stated, limits or not',
    (question) => {
      expect(standing(input([question])).standing).toBe('blocked')
      expect(standing(input([question], { limits: ['no-jumping'] })).standing).toBe('blocked')
      expect(standing(input([question], { clearedAtMs: 5 })).standing).toBe('clear')
    },
  )
  it.each(['known-condition', 'medicine', 'recent-injury'] as const)(
    'ask after %s for clearance or limits',
    (question) => {
      expect(standing(input([question])).standing).toBe('clearance')
      expect(standing(input([question], { limits: ['no-jumping'] })).standing).toBe('clear')
      expect(standing(input([question], { limits: ['made-up'] })).standing).toBe('clearance')
      expect(standing(input([question], { clearedAtMs: 5 })).standing).toBe('clear')
    },
  )
  it('take a pregnancy as a note for the coach and nothing else', () => {
    expect(standing(input(['pregnant-or-recent-birth'])).standing).toBe('clear')
    expect(noteForCoach(input(['pregnant-or-recent-birth']))).toBe(
      'Pregnant, or has recently given birth.',
    )
  })
  it('tell the coach what to mind, never which answers were given', () => {
    expect(noteForCoach(input([]))).toBeNull()
    const limited = noteForCoach(input(['medicine'], { limits: ['no-jumping'] }))
    expect(limited).toBe('Has chosen limits: I do not jump.')
    expect(noteForCoach(input(['chest-pain']))).toBe(
      'May not play until cleared by a licensed professional.',
    )
  })
  it('each say what a yes changes', () => {
    for (const question of HEALTH_QUESTIONS) {
      expect(HEALTH_QUESTION_TEXT[question].question).toMatch(/\?$/)
      expect(HEALTH_QUESTION_TEXT[question].change).toMatch(/^With yes /)
    }
  })
})

describe('stop signs', () => {
  it('cover the signs for members that the reference lists', () => {
    // ACSM's general indications for stopping, in own words: shared/reference/screening-and-stop-signs.json.
    const words = RED_FLAG_TEXT.map((one) => one.text.toLowerCase()).join(' ')
    for (const word of ['chest', 'breath', 'dizzy', 'calf', 'heartbeat', 'tiredness'])
      expect(words).toContain(word)
    expect(Object.keys(STOP_SIGN_TEXT).sort()).toEqual([...STOP_SIGNS].sort())
    expect(AFTER_RED_FLAG).toContain('licensed professional')
  })
  it('are red flags but for pain, wanting to stop and something else', () => {
    expect(STOP_SIGNS.filter((sign) => !isRedFlag(sign))).toEqual(['pain', 'want-to-stop', 'other'])
  })
  it('name a number, or words where the gym has none', () => {
    expect(emergencyText('112')).toBe('112')
    expect(emergencyText(' ')).toBe('your local emergency number')
    expect(emergencyText(null)).toBe('your local emergency number')
  })
})

describe('this hurts', () => {
  const station = { movement: 'goblet-squat', reps: 5 }
  it('offers the easier option that answers the place', () => {
    expect(easierFor('knee', station, squat)?.option).toBe('to-a-chair')
  })
  it('offers something easier where no option names the place, and never something harder', () => {
    expect(easierFor('shoulder', station, squat)?.option).toBe('to-a-chair')
    expect(easierFor('elbow', station, squat)?.option).toBe('no-load')
    expect(easierFor('elsewhere', station, squat)?.option).toBe('to-a-chair')
  })
  it('offers nothing where there is nothing easier', () => {
    expect(easierFor('shoulder', { ...station, movement: 'floor-press' }, press)).toBeNull()
    expect(easierFor('knee', station, undefined)).toBeNull()
  })
  it('fits a class to places that are held, only where the movement loads them', () => {
    const version = versionOf([
      block('a', { type: 'rest', seconds: 10 }),
      block('b', {
        type: 'rounds',
        seconds: 60,
        stations: [{ movement: 'floor-press', reps: 3 }, station],
      }),
    ])
    expect(optionsForHolds(version, ['knee', 'shoulder'])).toEqual([
      { block: 'b', station: 1, option: 'to-a-chair', place: 'knee' },
    ])
    expect(optionsForHolds(version, ['elsewhere'])).toEqual([])
  })
})
