/** GET: a class as WebVTT (W3C), its captions with chapters or, with `kind=chapters`, the chapters alone. For the gym's coaches. */
import { captionsOf, chaptersOf } from '@/server/engine/captions/write'
import { defaultDb } from '@/server/data/db'
import { getPlannedClass } from '@/server/data/planned-classes'
import { handler } from '@/server/http/handler'

export const GET = handler<{ classId: string }>(async (request, { classId }, { viewer }) => {
  const { version } = await getPlannedClass(viewer, { classId, now: new Date() }, defaultDb())
  const isChapters = new URL(request.url).searchParams.get('kind') === 'chapters'
  const name = `${slugOf(version.spec.title)}-${isChapters ? 'chapters' : 'captions'}.vtt`
  return new Response(isChapters ? chaptersOf(version) : captionsOf(version), {
    headers: {
      'content-type': 'text/vtt; charset=utf-8',
      'content-disposition': `attachment; filename="${name}"`,
      'cache-control': 'no-store',
    },
  })
})

/** Letters and figures of a title that any file system takes. */
function slugOf(title: string): string {
  const plain = title.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase()
  return plain.replace(/[^a-z0-9]+/g, '-').replace(/^-|-$/g, '') || 'class'
}
