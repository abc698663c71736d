import { execFile } from 'node:child_process'
import { mkdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { promisify } from 'node:util'
import { type Browser, chromium, type Page } from 'playwright-core'
import demo from '#scripts/demo/demo-accounts.json' with { type: 'json' }
import { ensurePrograms, findProgram } from '#scripts/start/debian.mjs'

/**
 * Takes the pictures of the README from a running service with the demo in it; it changes nothing there.
 * `npx tsx scripts/pictures.ts [http://127.0.0.1:4310]`
 */
const FOLDER = fileURLToPath(new URL('./demo/pictures/', import.meta.url))
const SYSTEM = '/systems/larkhaven'
const SIZE = { width: 1440, height: 900 }
const baseURL = process.argv[2] ?? 'http://127.0.0.1:4310'
const execute = promisify(execFile)

interface Picture {
  readonly name: string
  readonly mode: 'light' | 'dark'
  readonly path: string
  /** Brings the page to what is shown. */
  readonly pose: (page: Page) => Promise<unknown>
}

const PICTURES: readonly Picture[] = [
  {
    name: 'tokens-light',
    mode: 'light',
    path: `${SYSTEM}/tokens`,
    pose: (page) => page.getByRole('table', { name: 'Tokens' }).waitFor(),
  },
  {
    name: 'token-dark',
    mode: 'dark',
    path: `${SYSTEM}/tokens/action.board.fill`,
    pose: async (page) => {
      await page.getByRole('heading', { name: 'Its pairs' }).waitFor()
      await page.getByLabel('Trying, any CSS colour').fill('oklch(0.551 0.128 243)')
      await page.getByRole('heading', { name: / newly passing$/ }).waitFor()
    },
  },
  {
    name: 'breach-light',
    mode: 'light',
    path: `${SYSTEM}/breaches?order=shortfall`,
    pose: async (page) => {
      await page.getByRole('table', { name: 'Breaches' }).getByRole('link').first().click()
      await page.getByRole('heading', { name: 'History' }).waitFor()
    },
  },
]

await ensurePrograms({ programs: ['chromium', 'pngquant'], packages: ['chromium', 'pngquant'] })
mkdirSync(FOLDER, { recursive: true })
const browser = await chromium.launch({
  executablePath: findProgram('chromium'),
  args: ['--no-sandbox', '--disable-dev-shm-usage'],
})
try {
  for (const picture of PICTURES) await take(browser, picture)
} finally {
  await browser.close()
}

async function take(within: Browser, { name, mode, path, pose }: Picture): Promise<void> {
  const context = await within.newContext({ baseURL, viewport: SIZE, colorScheme: mode })
  const page = await context.newPage()
  await page.goto(path)
  await page.getByLabel('E-mail').fill('maintainer@larkhaven.example')
  await page.getByLabel('Password').fill(demo.password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await pose(page)
  await page.evaluate(() => document.fonts.ready)
  await page.mouse.move(SIZE.width - 1, 0)
  const file = `${FOLDER}${name}.png`
  await page.screenshot({ path: file, animations: 'disabled', caret: 'hide' })
  await context.close()
  // A palette of 256: a third of the bytes, and no colour off by what an eye could see.
  await execute('pngquant', ['--force', '--nofs', '--speed', '1', '--output', file, file])
}
