import { fileURLToPath } from 'node:url'
import react from '@vitejs/plugin-react'
import { defineConfig } from 'vitest/config'

const root = fileURLToPath(new URL('.', import.meta.url))
const alias = {
  '@': root.replace(/\/$/, ''),
  // It throws outside the server's own bundle, which a test is.
  'server-only': `${root}node_modules/server-only/empty.js`,
}
const common = { resolve: { alias } }
/** A hang, not a busy computer: the slowest unit test takes two seconds on a quiet one. */
const testTimeout = 60_000

export default defineConfig({
  plugins: [react()],
  ...common,
  test: {
    projects: [
      { ...common, test: { name: 'engine', testTimeout, include: ['tests/engine/**/*.test.ts'] } },
      {
        ...common,
        test: { name: 'contract', testTimeout, include: ['tests/contract/**/*.test.ts'] },
      },
      {
        ...common,
        plugins: [react()],
        test: {
          name: 'components',
          environment: 'jsdom',
          testTimeout,
          include: ['tests/components/**/*.test.{ts,tsx}'],
          setupFiles: ['tests/support/dom.ts'],
        },
      },
      {
        ...common,
        plugins: [react()],
        test: {
          name: 'hooks',
          environment: 'jsdom',
          testTimeout,
          include: ['tests/hooks/**/*.test.{ts,tsx}'],
          setupFiles: ['tests/support/dom.ts'],
        },
      },
      {
        ...common,
        test: {
          name: 'server',
          include: ['tests/server/**/*.test.ts'],
          globalSetup: ['tests/support/database-setup.ts'],
          testTimeout,
          hookTimeout: 60_000,
          // Each file has a database of its own, but they share two cores.
          maxWorkers: 2,
        },
      },
    ],
  },
})
