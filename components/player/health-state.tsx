import type { HealthStanding } from '@/server/contract/classes'
import { paths } from '@/server/contract/paths'

/** Why a class cannot be started now, in a sentence, or null. */
export function startBar(health: HealthStanding): string | null {
  if (health.consentMissing) {
    return 'A guardian’s consent is missing. Your gym can record it; then you can start.'
  }
  switch (health.standing) {
    case 'open':
      return 'Answer the health questions first. It takes a minute.'
    case 'blocked':
      return 'After your health answers you can read this class, and play it once you state that a licensed professional has cleared you.'
    case 'clearance':
      return 'State that you have been cleared, or choose limits, and you can start.'
    case 'clear':
      return null
  }
}

const LINK_WORDS: Record<HealthStanding['standing'], string> = {
  open: 'Answer the health questions',
  blocked: 'State clearance, or change an answer',
  clearance: 'State clearance or choose limits',
  clear: 'Something has changed',
}

/** Where the member's own answers stand, and the way to the form and back. */
export function HealthState({
  health,
  timeZone,
  returnTo,
}: {
  health: HealthStanding
  timeZone: string
  returnTo: string
}) {
  const day = (instant: string) =>
    new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', timeZone }).format(
      new Date(instant),
    )
  const bar = startBar(health)
  return (
    <div className="grid gap-3">
      {bar ? (
        <p className="border-l-8 border-stop pl-3">{bar}</p>
      ) : (
        <p>
          {health.answeredAt ? `You answered on ${day(health.answeredAt)}: ` : null}
          {health.limits.length > 0
            ? 'you chose limits, and your coach knows them.'
            : health.clearedAt
              ? 'you stated that you have been cleared.'
              : 'nothing to hold you back.'}
          {health.goodUntil ? ` Good until ${day(health.goodUntil)}.` : null}
        </p>
      )}
      <p>
        <a
          href={`${paths.health()}?next=${encodeURIComponent(returnTo)}`}
          className="inline-flex min-h-12 items-end border-b-4 border-rest font-bold"
        >
          {LINK_WORDS[health.standing]}
        </a>
      </p>
    </div>
  )
}
