/** Times as a board says them. */
import { TZDate } from '@date-fns/tz'
import { format } from 'date-fns'

/** '18:46' in the gym's zone, from an ISO 8601 instant. */
export function timeOfDay(instant: string, timeZone: string): string {
  return format(new TZDate(Date.parse(instant), timeZone), 'HH:mm')
}

/** 'Tuesday 2 December' in the gym's zone, from a local date yyyy-mm-dd. */
export function dayName(day: string): string {
  return format(new Date(`${day}T12:00:00`), 'EEEE d MMMM')
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
