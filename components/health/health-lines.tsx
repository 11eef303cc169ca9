import Link from 'next/link'
import { buttonClass } from '@/components/ui/button'
import type { HealthStanding } from '@/server/contract/classes'
import { dateOf, type DateStyle } from '@/server/contract/format'
import { paths } from '@/server/contract/paths'

interface HealthLinesProps {
  health: HealthStanding
  timeZone: string
  dateStyle: DateStyle
  /** The page to come back to after the form. */
  from: string
}

const LINK_TEXT: Record<HealthStanding['standing'], string> = {
  open: 'Answer the health questions',
  blocked: 'State clearance, or change an answer',
  clearance: 'State clearance, or choose limits',
  clear: 'Something has changed',
}

/** How the member's own answers stand, what that means for playing, and the way to the form. */
export function HealthLines({ health, timeZone, dateStyle, from }: HealthLinesProps) {
  const mayPlay = health.standing === 'clear' && !health.consentMissing
  return (
    <>
      <p className={mayPlay ? undefined : 'border-l-8 border-stop pl-4'}>
        {standingText(health, (instant) => dateOf(instant, timeZone, dateStyle))}
      </p>
      <Link
        className={buttonClass('text')}
        href={`${paths.health()}?next=${encodeURIComponent(from)}`}
      >
        {LINK_TEXT[health.standing]}
      </Link>
    </>
  )
}

function standingText(health: HealthStanding, date: (instant: string) => string): string {
  if (health.consentMissing) {
    return 'A guardian’s consent is not on record yet. Your gym can record it; until then you can read classes and not play them.'
  }
  const { answeredAt, goodUntil } = health
  switch (health.standing) {
    case 'open':
      return answeredAt
        ? `Your answers of ${date(answeredAt)} are out of date. It takes a minute to answer again; then you can play.`
        : 'You have not answered them yet. It takes a minute; then you can play.'
    case 'blocked':
      return 'After your answers you can read classes, and play them once you state that a licensed professional has cleared you.'
    case 'clearance':
      return 'State that you have been cleared, or choose limits. Then you can play.'
    case 'clear': {
      const outcome =
        health.limits.length > 0
          ? 'you chose limits, and your coach knows them'
          : health.clearedAt
            ? 'you stated that you have been cleared'
            : 'nothing to hold you back'
      return [
        answeredAt ? `You answered on ${date(answeredAt)}: ${outcome}.` : '',
        goodUntil ? `Good until ${date(goodUntil)}.` : '',
      ].join(' ')
    }
  }
}
