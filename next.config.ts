import type { NextConfig } from 'next'

/**
 * Next starts its pages with inline scripts, and a nonce would make every page dynamic and refuse
 * server-rendered styles: so inline is allowed, and nothing from elsewhere is.
 */
const contentSecurityPolicy = [
  "default-src 'self'",
  `script-src 'self' 'unsafe-inline'${process.env.NODE_ENV === 'production' ? '' : " 'unsafe-eval'"}`,
  "style-src 'self' 'unsafe-inline'",
  "img-src 'self' data: blob:",
  "media-src 'self' blob:",
  "font-src 'self'",
  "connect-src 'self'",
  // The player's ticker is a worker made from text.
  "worker-src 'self' blob:",
  "frame-ancestors 'none'",
  "base-uri 'self'",
  "form-action 'self'",
  "object-src 'none'",
].join('; ')

const headers = [
  { key: 'Content-Security-Policy', value: contentSecurityPolicy },
  { key: 'X-Content-Type-Options', value: 'nosniff' },
  { key: 'Referrer-Policy', value: 'same-origin' },
  {
    key: 'Permissions-Policy',
    value:
      'fullscreen=(self), screen-wake-lock=(self), autoplay=(self), camera=(), microphone=(), geolocation=()',
  },
]

const config: NextConfig = {
  reactStrictMode: true,
  poweredByHeader: false,
  // `npm start`, `npm run dev` and `npm test` build apart and do not disturb each other.
  distDir: process.env.NEXT_DIST_DIR ?? '.next',
  // Types are a check of their own (`npm run check`, `npm test`) and include the tests.
  typescript: { ignoreBuildErrors: true },
  serverExternalPackages: ['@node-rs/argon2'],
  devIndicators: false,
  headers: async () => [{ source: '/:path*', headers }],
}

export default config
