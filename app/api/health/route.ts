/** GET: whether the server and its database answer. For whoever watches the server; says nothing of anybody. */
import { defaultDb } from '@/server/data/db'
import { checkDatabase } from '@/server/data/health-check'
import { answer, errorResponse } from '@/server/http/handler'

export const dynamic = 'force-dynamic'

export async function GET(): Promise<Response> {
  try {
    await checkDatabase(defaultDb())
    return answer({ ok: true })
  } catch (error) {
    return errorResponse(error, '/api/health')
  }
}
