/** The coach's board of one scheduled class: members by blocks. GET paths.api.board. */
import type { PublishedVersion } from '../engine/spec/version'
import type { AttemptTally } from '../engine/tally/types'
import type { ScheduledClassSummary } from './classes'
import type { ForecastDto } from './paces'

export interface BoardRow {
  membershipId: string
  memberName: string
  /** The attempt that is shown: the latest finished one, else the latest. */
  attemptId: string | null
  /** More attempts than the one shown. */
  otherAttempts: number
  late: boolean
  startedAt: string | null
  finishedAt: string | null
  lastEventAt: string | null
  todayNote: string | null
  /** What the coach should know of the health answers: words, not answers; null where nothing. */
  healthNote: string | null
  /** Null: not started. */
  tally: AttemptTally | null
}

export interface BoardDto {
  scheduledClass: ScheduledClassSummary
  /** IANA name of the gym's zone: times of day are in it. */
  timeZone: string
  versionId: string
  version: PublishedVersion
  /** Of every `rounds` and `for-time` block, at the expected pace. */
  forecast: ForecastDto[]
  rows: BoardRow[]
  /** Grows with every change; an event stream carries it. */
  revision: number
  /** Server's clock as this was read, ISO 8601. */
  readAt: string
}

/** Data of a live event `board`: this board changed, read it again if yours is older. */
export interface LiveBoardChange {
  scheduledClassId: string
  revision: number
}
