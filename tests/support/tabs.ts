/**
 * A Chromium whose tabs are hidden and slowed as on a desk. Playwright's own browsers emulate focus in
 * every tab, which keeps all of them 'visible', and switch off what slows a tab in the background; one
 * that it only connects to, without its defaults, does neither.
 */
import { spawn } from 'node:child_process'
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { setTimeout as sleep } from 'node:timers/promises'
import { chromium, type BrowserContext } from '@playwright/test'

const START_MS = 20_000

export interface Tabs {
  context: BrowserContext
  close(): Promise<void>
}

/** Starts one with a profile of its own, signed in with `cookie` at `origin`. */
export async function openTabs(origin: string, cookie: string): Promise<Tabs> {
  const profile = mkdtempSync(join(tmpdir(), 'floorside-tabs-'))
  const browserProcess = spawn(
    '/usr/bin/chromium',
    [
      '--headless',
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
      '--window-size=1440,900',
      '--remote-debugging-port=0',
      `--user-data-dir=${profile}`,
      'about:blank',
    ],
    { stdio: 'ignore' },
  )
  const ended = new Promise((resolve) => browserProcess.once('exit', resolve))
  const end = async () => {
    await Promise.race([ended, sleep(5_000)])
    browserProcess.kill('SIGKILL')
    rmSync(profile, { recursive: true, force: true, maxRetries: 10, retryDelay: 200 })
  }
  try {
    const port = await portIn(join(profile, 'DevToolsActivePort'))
    const browser = await chromium.connectOverCDP(`http://127.0.0.1:${port}`, { noDefaults: true })
    const context = browser.contexts()[0]
    if (!context) throw new Error('Chromium has no context.')
    await context.addCookies([{ name: 'floorside', value: cookie, url: origin, httpOnly: true }])
    return {
      context,
      async close() {
        // Disconnecting alone would leave it running; killed, it would still write to its profile.
        await browser
          .newBrowserCDPSession()
          .then((session) => session.send('Browser.close'))
          // Where it is gone already, what it was gone of is the error to be told.
          .catch(() => undefined)
        await end()
      },
    }
  } catch (error) {
    browserProcess.kill()
    await end()
    throw error
  }
}

async function portIn(file: string): Promise<string> {
  for (const from = Date.now(); Date.now() - from < START_MS; await sleep(50)) {
    // Its second line comes last: then the first is whole.
    const [port, path] = existsSync(file) ? readFileSync(file, 'utf8').split('\n') : []
    if (port && path) return port
  }
  throw new Error('Chromium did not start.')
}
