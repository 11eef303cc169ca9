/** A coach's clip or picture of one option of a movement: what players and the library get of it. */
import type { MediaContentType, MediaKind } from './media-types'

export interface OptionMedia {
  mediaId: string
  kind: MediaKind
  contentType: MediaContentType
  bytes: number
  /** Stays the same for the same bytes: a browser may keep what it got there. */
  url: string
  /** A still of a clip, JPEG; null where there is none, and for a picture. */
  posterUrl: string | null
}

/** How `mediaOf` names an option of a movement. */
export function optionKey(movement: string, option: string): string {
  return `${movement}/${option}`
}

/** Where the media of an option are put, removed and, with a version, read. */
export const mediaPaths = {
  media: (movement: string, option: string, mediaId?: string) =>
    withVersion(`${baseOf(movement, option)}/media`, mediaId),
  /** With the media's id: the clip that a still is put to. With the still's own: what is read. */
  poster: (movement: string, option: string, version: string) =>
    withVersion(`${baseOf(movement, option)}/media/poster`, version),
}

function baseOf(movement: string, option: string): string {
  return `/api/v1/movements/${encodeURIComponent(movement)}/options/${encodeURIComponent(option)}`
}

function withVersion(path: string, version: string | undefined): string {
  return version === undefined ? path : `${path}?v=${encodeURIComponent(version)}`
}
