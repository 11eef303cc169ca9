/**
 * The still of a coach's clip. GET: a JPEG, for everybody of the gym; with `v` exactly that version. PUT: the
 * JPEG as the body, for the clip whose id is `v` (`OptionMedia`). For the gym's coaches.
 */
import { v7 } from 'uuid'
import { defaultDb } from '@/server/data/db'
import { getMediaObject, mustHaveClip, setPoster } from '@/server/data/media'
import { answer, handler } from '@/server/http/handler'
import { named, sendObject, storeBody } from '@/server/http/media'

type Params = { slug: string; option: string }

const versionOf = (request: Request): string | null => new URL(request.url).searchParams.get('v')

export const GET = handler<Params>(async (request, { slug: movement, option }, { viewer }) => {
  const asked = { movement, option, part: 'poster' as const, version: versionOf(request) }
  return sendObject(request, await getMediaObject(viewer, asked, defaultDb()))
})

export const PUT = handler<Params>(
  async (request, { slug: movement, option }, { viewer }) => {
    const db = defaultDb()
    const mediaId = versionOf(request) ?? ''
    await mustHaveClip(viewer, { movement, option, mediaId }, db)
    const posterKey = `media/${viewer.gymId}/${mediaId}/${v7()}`
    await storeBody(request, posterKey, 'still')
    const row = { movement, option, mediaId, posterKey }
    const { media } = await named(posterKey, () => setPoster(viewer, row, db))
    return answer(media)
  },
  { body: 'file' },
)
