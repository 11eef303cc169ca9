/** Dates and lengths as people read them. Times of day are the gym's. */
import { TZDate } from '@date-fns/tz'
import { format } from 'date-fns'

/** How a reader writes dates: '2 December' and 18:46, or 'December 2' and 6:46 PM. */
export type DateStyle = 'day-first' | 'month-first'

const PATTERNS: Record<
  DateStyle,
  Record<'day' | 'shortDay' | 'dayMonth' | 'date' | 'time', string>
> = {
  'day-first': {
    day: 'EEEE d MMMM',
    shortDay: 'EEE d MMM',
    dayMonth: 'd MMMM',
    date: 'd MMMM yyyy',
    time: 'HH:mm',
  },
  'month-first': {
    day: 'EEEE, MMMM d',
    shortDay: 'EEE, MMM d',
    dayMonth: 'MMMM d',
    date: 'MMMM d, yyyy',
    time: 'h:mm a',
  },
}

/** Where English dates begin with the month. */
const MONTH_FIRST = /^en-(us|ph|pr|gu|vi|as|mp)\b/i

/**
 * The style of whoever sent an Accept-Language header (RFC 9110, 12.5.4). The words are English, so a
 * language with a region that writes the month first counts only where it is the one preferred.
 */
export function dateStyleOf(acceptLanguage: string | null): DateStyle {
  const [preferred = ''] = (acceptLanguage ?? '').split(',')
  return MONTH_FIRST.test(preferred.trim()) ? 'month-first' : 'day-first'
}

/** '18:46' in the zone, from an ISO 8601 instant. */
export function timeOfDay(
  instant: string,
  timeZone: string,
  style: DateStyle = 'day-first',
): string {
  return format(new TZDate(Date.parse(instant), timeZone), PATTERNS[style].time)
}

/** 'Tuesday 2 December', from a local date yyyy-mm-dd. */
export function dayName(day: string, style: DateStyle = 'day-first'): string {
  return format(new Date(`${day}T12:00:00`), PATTERNS[style].day)
}

/** 'Tue 2 Dec', from a local date yyyy-mm-dd. */
export function shortDay(day: string, style: DateStyle = 'day-first'): string {
  return format(new Date(`${day}T12:00:00`), PATTERNS[style].shortDay)
}

/** '2 December', from a local date yyyy-mm-dd. */
export function dayMonth(day: string, style: DateStyle = 'day-first'): string {
  return format(new Date(`${day}T12:00:00`), PATTERNS[style].dayMonth)
}

/** '21 October 2026' in the zone, from an ISO 8601 instant. */
export function dateOf(instant: string, timeZone: string, style: DateStyle = 'day-first'): string {
  return format(new TZDate(Date.parse(instant), timeZone), PATTERNS[style].date)
}

/** When a class is open: '06:00 to 22:00', or 'all day'. */
export function windowText(
  opensAt: string,
  closesAt: string,
  timeZone: string,
  style: DateStyle = 'day-first',
): string {
  const isMidnight = (instant: string) => timeOfDay(instant, timeZone) === '00:00'
  if (isMidnight(opensAt) && isMidnight(closesAt)) return 'all day'
  const closes = isMidnight(closesAt) ? 'midnight' : timeOfDay(closesAt, timeZone, style)
  return `${timeOfDay(opensAt, timeZone, style)} to ${closes}`
}

/** '33 minutes', '4 minutes', '50 seconds'. Milliseconds. */
export function lengthText(ms: number): string {
  const seconds = Math.round(ms / 1_000)
  if (seconds < 60) return seconds === 1 ? '1 second' : `${seconds} seconds`
  const minutes = Math.round(seconds / 60)
  return minutes === 1 ? '1 minute' : `${minutes} minutes`
}

/** How long ago, roughly: '8 s', '12 min', '3 h'. Milliseconds; below 0 counts as 0. */
export function agoText(ms: number): string {
  const seconds = Math.max(0, Math.round(ms / 1_000))
  if (seconds < 90) return `${seconds} s`
  const minutes = Math.round(seconds / 60)
  if (minutes < 90) return `${minutes} min`
  const hours = Math.round(minutes / 60)
  return hours < 48 ? `${hours} h` : `${Math.round(hours / 24)} days`
}

/** '1 round', '3 rounds'. */
export function plural(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`
}
