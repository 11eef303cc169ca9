import 'server-only'
import { headers } from 'next/headers'
import { dateStyleOf, type DateStyle } from '@/server/contract/format'

/** How whoever asks for this page writes dates, after their browser's languages. */
export async function readerDateStyle(): Promise<DateStyle> {
  return dateStyleOf((await headers()).get('accept-language'))
}
