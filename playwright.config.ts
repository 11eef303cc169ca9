import { defineConfig } from '@playwright/test'

const port = Number(process.env.TEST_PORT ?? 3300)
const origin = `http://127.0.0.1:${port}`
const folder = process.env.NEXT_DIST_DIR ?? '.next-test'

/** Run by `npm test`, which gives the build's folder, a free port and a database to throw away. */
export default defineConfig({
  testDir: 'tests/e2e',
  outputDir: 'test-results',
  timeout: 120_000,
  expect: { timeout: 10_000 },
  // Two cores serve, play and look at once; the tests share one gym.
  workers: 1,
  fullyParallel: false,
  forbidOnly: process.env.CI !== undefined,
  retries: 0,
  use: {
    baseURL: origin,
    trace: 'retain-on-failure',
    screenshot: 'only-on-failure',
    viewport: { width: 1440, height: 900 },
    launchOptions: {
      executablePath: '/usr/bin/chromium',
      args: [
        '--no-sandbox',
        '--disable-gpu',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
      ],
    },
  },
  webServer: {
    command: `node scripts/serve-test.mjs ${port}`,
    url: `${origin}/api/health`,
    timeout: 120_000,
    stdout: 'pipe',
    env: {
      NODE_ENV: 'production',
      NEXT_DIST_DIR: folder,
      NEXT_TELEMETRY_DISABLED: '1',
      DATABASE_URL: process.env.DATABASE_URL ?? '',
      APP_ORIGIN: origin,
    },
    gracefulShutdown: { signal: 'SIGTERM', timeout: 10_000 },
  },
})
