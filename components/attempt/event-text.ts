/** What happened in a class, event by event, in words. */
import { HURT_PLACE_TEXT } from '@/server/engine/fit/hurt'
import { STOP_SIGN_TEXT } from '@/server/engine/fit/stop-signs'
import type { PublishedVersion } from '@/server/engine/spec/version'
import type { ClassEvent } from '@/server/engine/tally/events'
import { clockText } from '@/server/engine/tally/score'

function stationName(version: PublishedVersion, blockId: string, station: number): string {
  const format = version.spec.blocks.find((block) => block.id === blockId)?.format
  if (!format || format.type === 'rest') return ''
  const slug = format.stations[station]?.movement
  return version.movements.find((one) => one.slug === slug)?.name ?? ''
}

function optionName(version: PublishedVersion, slug: string): string {
  for (const movement of version.movements) {
    const option = movement.options.find((one) => one.option === slug)
    if (option) return option.name.toLowerCase()
  }
  return slug
}

const BY = {
  member: '',
  lead: ', counted by the lead',
  afterwards: ', counted after class',
} as const

/** One event as a sentence; null for those that say nothing to a reader. */
export function eventText(version: PublishedVersion, event: ClassEvent): string | null {
  const blockTitle = (id: string | undefined) =>
    version.spec.blocks.find((block) => block.id === id)?.title ?? ''
  switch (event.type) {
    case 'started':
      return 'Started'
    case 'brief-passed':
      return null
    case 'round-done':
      return `${blockTitle(event.block)}: round ${event.round} done${BY[event.by]}`
    case 'round-undone':
      return `${blockTitle(event.block)}: round ${event.round} taken back`
    case 'reps-noted':
      return `${blockTitle(event.block)}: ${event.reps} reps of round ${event.round}`
    case 'block-finished':
      return `${blockTitle(event.block)}: worked off in ${clockText(event.ms)}`
    case 'option-chosen':
      return `${stationName(version, event.block, event.station)}: ${optionName(version, event.option)}`
    case 'load-noted':
      return `${stationName(version, event.block, event.station)}: ${event.kilograms} kg`
    case 'lead-followed':
      return `${blockTitle(event.block)}: follows the lead`
    case 'lead-left':
      return `${blockTitle(event.block)}: left the lead`
    case 'paused':
      return 'Paused'
    case 'resumed':
      return 'Went on'
    case 'rest-taken':
      return `${blockTitle(event.block)}: rested ${clockText(event.ms)} as needed`
    case 'rest-lengthened':
      return `Rest ${clockText(event.ms)} longer`
    case 'rest-cut':
      return `Rest ${clockText(event.ms)} shorter`
    case 'block-skipped':
      return `${blockTitle(event.block)}: skipped${event.reason ? `, ${event.reason}` : ''}`
    case 'hurt':
      return `${HURT_PLACE_TEXT[event.where]} hurts${event.note ? `: ${event.note}` : ''}`
    case 'stopped':
      return ['Stopped', event.sign ? STOP_SIGN_TEXT[event.sign] : null, event.where, event.note]
        .filter(Boolean)
        .join(': ')
    case 'finished':
      return 'Finished'
    case 'rated':
      return `RPE ${event.rpe}${event.note ? `: “${event.note}”` : ''}`
  }
}
