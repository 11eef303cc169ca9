/**
 * A coach's clip or picture of one option. GET: its bytes, whole or by range, for everybody of the gym; with
 * `v` exactly that version. PUT: the raw file as the body (`OptionMedia`), in the place of what is there.
 * DELETE: removes it. Both for the gym's coaches.
 */
import { v7 } from 'uuid'
import { defaultDb } from '@/server/data/db'
import { getMediaObject, mustHaveOption, removeMedia, setMedia } from '@/server/data/media'
import { answer, handler } from '@/server/http/handler'
import { discard, named, sendObject, storeBody } from '@/server/http/media'

type Params = { slug: string; option: string }

export const GET = handler<Params>(async (request, { slug: movement, option }, { viewer }) => {
  const version = new URL(request.url).searchParams.get('v')
  const asked = { movement, option, part: 'media' as const, version }
  return sendObject(request, await getMediaObject(viewer, asked, defaultDb()))
})

export const PUT = handler<Params>(
  async (request, { slug: movement, option }, { viewer }) => {
    const db = defaultDb()
    await mustHaveOption(viewer, { movement, option }, db)
    const mediaId = v7()
    const storageKey = `media/${viewer.gymId}/${mediaId}`
    const { type, bytes } = await storeBody(request, storageKey, 'any')
    const row = { movement, option, mediaId, type, bytes, storageKey, now: new Date() }
    const { media } = await named(storageKey, () => setMedia(viewer, row, db))
    return answer(media)
  },
  { body: 'file' },
)

export const DELETE = handler<Params>(async (_request, { slug: movement, option }, { viewer }) => {
  const { unused } = await removeMedia(viewer, { movement, option }, defaultDb())
  await discard(unused)
  return answer({ removed: true })
})
