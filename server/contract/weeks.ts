/** Weeks as lists group by them: from Monday, of local dates yyyy-mm-dd. */
import { addDays, differenceInCalendarWeeks, format, startOfISOWeek } from 'date-fns'
import { dayMonth, type DateStyle } from './format'

const noon = (day: string): Date => new Date(`${day}T12:00:00`)

/** The Monday of a day's week. */
export function weekStart(day: string): string {
  return format(startOfISOWeek(noon(day)), 'yyyy-MM-dd')
}

/** 'This week', 'Next week', 'Last week', else '7 December to 13 December'. `week` is a Monday. */
export function weekTitle(week: string, today: string, style: DateStyle): string {
  const away = differenceInCalendarWeeks(noon(week), noon(today), { weekStartsOn: 1 })
  if (away === 0) return 'This week'
  if (away === 1) return 'Next week'
  if (away === -1) return 'Last week'
  const end = format(addDays(noon(week), 6), 'yyyy-MM-dd')
  return `${dayMonth(week, style)} to ${dayMonth(end, style)}`
}
