import { type Browser, chromium } from 'playwright-core'
import { findProgram } from '#scripts/start/debian.mjs'

const QUIET = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--disable-dev-shm-usage',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]

/** Debian's Chromium, without a window. Close it in `afterAll`. */
export function launchBrowser(): Promise<Browser> {
  const executablePath = findProgram('chromium')
  if (executablePath === undefined) throw new TypeError('chromium is not installed')
  return chromium.launch({ executablePath, args: QUIET })
}
