import type { Movement } from './movement'
import type { SessionSpec } from './schema'

/** What a published version freezes: player, forecast, captions and board read only this. */
export interface PublishedVersion {
  spec: SessionSpec
  movements: Movement[]
}
