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

/** A screen of Display P3, rastered as on a graphics card: without one, raster clips to sRGB. */
const WIDE = [
  ...QUIET.filter((flag) => flag !== '--disable-gpu'),
  '--force-color-profile=display-p3-d65',
  '--enable-gpu-rasterization',
  '--ignore-gpu-blocklist',
  '--use-gl=angle',
  '--use-angle=swiftshader',
  '--enable-unsafe-swiftshader',
]

/** Debian's Chromium, without a window. Close it in `afterAll`. */
export function launchBrowser(): Promise<Browser> {
  return launchWith(QUIET)
}

/** The same on a Display P3 screen: pixels of its screenshots are Display P3. */
export function launchWideBrowser(): Promise<Browser> {
  return launchWith(WIDE)
}

function launchWith(args: string[]): Promise<Browser> {
  const executablePath = findProgram('chromium')
  if (executablePath === undefined) throw new TypeError('chromium is not installed')
  return chromium.launch({ executablePath, args })
}
