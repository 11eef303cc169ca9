/** What classes ask of a body, for a coach. */
import type { ClassLoad } from '../engine/load/class-load'

export interface WeeksLoad extends Pick<
  ClassLoad,
  'patterns' | 'pushReps' | 'pullReps' | 'pushToPull' | 'jumpContacts'
> {
  /** Classes in them, the day of asking not among them. */
  classes: number
}

/** Members who would start a station on another option than planned. */
export interface StationSwaps {
  block: string
  station: number
  members: number
  /** How many members there are. */
  of: number
}
