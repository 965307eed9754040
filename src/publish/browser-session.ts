import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Browser } from 'puppeteer-core'
import { cleanUpOnExit } from './clean-up.ts'
import { browserHint } from './find-browser.ts'
import { PublishProblem } from './publish-problem.ts'
import { thisSystem } from './system.ts'

/** A running browser. `close` ends it and removes its profile folder; it never throws, and may be called twice. */
export interface BrowserSession {
  readonly browser: Browser
  readonly sandboxed: boolean
  readonly close: () => Promise<void>
}

/** Nothing is loaded from outside the page, and paper does not depend on how a screen hints its fonts. */
const ARGUMENTS = ['--host-resolver-rules=MAP * ~NOTFOUND', '--font-render-hinting=none', '--disable-gpu']

/**
 * Starts a browser with an empty profile of its own. It is spoken to over a pipe, not a port: no other process can reach
 * it, and it ends by itself if this process is killed.
 *
 * @param path the program, from `findBrowser`
 * @param startLimit milliseconds it may take to start
 * @throws {PublishProblem} `browser-failed`, with what the browser said
 */
export async function openBrowser(path: string, startLimit: number): Promise<BrowserSession> {
  const { default: puppeteer } = await import('puppeteer-core')
  const sandboxed = !thisSystem().root
  const args = sandboxed ? ARGUMENTS : [...ARGUMENTS, '--no-sandbox']
  const profile = mkdtempSync(join(tmpdir(), 'stanchion-browser-'))
  const stop = new AbortController()
  const end = () => {
    stop.abort()
    rmSync(profile, { recursive: true, force: true, maxRetries: 10, retryDelay: 50 })
  }
  const forget = cleanUpOnExit(end)
  const close = async (browser?: Browser) => {
    if (browser) await closed(browser)
    end()
    forget()
  }
  const timer = setTimeout(() => stop.abort(), startLimit)
  try {
    const browser = await puppeteer.launch({
      executablePath: path,
      headless: true,
      pipe: true,
      userDataDir: profile,
      args,
      signal: stop.signal,
      handleSIGINT: false,
      handleSIGTERM: false,
      handleSIGHUP: false,
      protocolTimeout: 0,
      waitForInitialPage: false,
    })
    return { browser, sandboxed, close: () => close(browser) }
  } catch (error) {
    const late = stop.signal.aborted
    await close()
    const why = late ? `it did not answer in ${startLimit / 1000} s` : whyNotStarted(path, args)
    throw new PublishProblem(
      'browser-failed',
      `the browser \`${path}\` does not start: ${why}`,
      browserHint(),
      error,
    )
  } finally {
    clearTimeout(timer)
  }
}

/** Asks the browser to end and waits for it, but not for ever: `end` kills what is left. */
async function closed(browser: Browser): Promise<void> {
  const patience = new Promise<void>((resolve) => setTimeout(resolve, 5000).unref())
  // A browser that has crashed cannot be asked; that it is gone is what was wanted.
  await Promise.race([browser.close().catch(() => undefined), patience])
}

/** Runs the browser once more, without the pipe, to hear what it complains of. */
function whyNotStarted(path: string, args: readonly string[]): string {
  const profile = mkdtempSync(join(tmpdir(), 'stanchion-browser-'))
  try {
    const options = ['--headless', ...args, `--user-data-dir=${profile}`, '--dump-dom', 'about:blank']
    const run = spawnSync(path, options, { timeout: 10_000, killSignal: 'SIGKILL', encoding: 'utf8' })
    if (run.error) return run.error.message
    const said = run.stderr
      .split('\n')
      .filter((line) => line.trim() && !/dbus|unexpected operator/.test(line))
    const how = run.signal ? `it was ended by ${run.signal}` : `it ended with status ${run.status}`
    return said[0] ? `${how}, saying \`${said[0].trim().slice(0, 300)}\`` : how
  } finally {
    rmSync(profile, { recursive: true, force: true, maxRetries: 10, retryDelay: 50 })
  }
}
