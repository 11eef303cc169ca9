import type { MetadataRoute } from 'next'

/** For whoever puts it on a phone's or TV's home screen. */
export default function manifest(): MetadataRoute.Manifest {
  return {
    name: 'Floorside',
    short_name: 'Floorside',
    description: 'Follow-along strength classes at home, led by your own coach.',
    start_url: '/',
    display: 'standalone',
    background_color: '#f5ecdc',
    theme_color: '#f5ecdc',
    icons: [{ src: '/icon.svg', sizes: 'any', type: 'image/svg+xml', purpose: 'any' }],
  }
}
