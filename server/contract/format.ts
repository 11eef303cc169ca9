/** Dates and lengths as people read them. Times of day are the gym's. */
import { TZDate } from '@date-fns/tz'
import { format } from 'date-fns'

/** '18:46' in the zone, from an ISO 8601 instant. */
export function timeOfDay(instant: string, timeZone: string): string {
  return format(new TZDate(Date.parse(instant), timeZone), 'HH:mm')
}

/** 'Tuesday 2 December', from a local date yyyy-mm-dd. */
export function dayName(day: string): string {
  return format(new Date(`${day}T12:00:00`), 'EEEE d MMMM')
}

/** '21 October 2026' in the zone, from an ISO 8601 instant. */
export function dateOf(instant: string, timeZone: string): string {
  return format(new TZDate(Date.parse(instant), timeZone), 'd MMMM yyyy')
}

/** When a class is open: '06:00 to 22:00', or 'all day'. */
export function windowText(opensAt: string, closesAt: string, timeZone: string): string {
  const opens = timeOfDay(opensAt, timeZone)
  const closes = timeOfDay(closesAt, timeZone)
  if (opens === '00:00' && closes === '00:00') return 'all day'
  return `${opens} to ${closes === '00:00' ? 'midnight' : closes}`
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
