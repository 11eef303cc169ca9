import { redirect } from 'next/navigation'
import { landingPath, requireViewer } from '@/server/auth/viewer'
import { paths } from '@/server/contract/paths'

/** Each role lands where its work is. */
export default async function HomePage() {
  const viewer = await requireViewer(paths.home())
  redirect(landingPath(viewer))
}
