import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Browser, BrowserContext, BrowserContextOptions, Page } from 'playwright-core'
import { afterAll, afterEach, beforeAll, expect, inject } from 'vitest'
import demo from '#scripts/demo/demo-accounts.json' with { type: 'json' }
import { type Account, createPeople } from '#scripts/demo/people.ts'
import type { Call } from '#shared/client/client.ts'
import { launchBrowser } from './browser.ts'
import { type DemoService, startDemoService } from './demo-service.ts'

/** Steps of a page wait this long: the machine may be busy. */
const PATIENCE_MS = 30_000
const REPORT = 'reportPolicyViolation'

export const WIDE = { width: 1440, height: 900 }
export const NARROW = { width: 320, height: 720 }

export interface Opening {
  /** Who is signed in; nobody where absent. */
  readonly as?: Account
  readonly size?: { readonly width: number; readonly height: number }
  readonly mode?: 'light' | 'dark'
  /** Statuses that this page is meant to be answered with; any other refusal is a complaint. */
  readonly refusals?: readonly number[]
  readonly context?: BrowserContextOptions
}

/** The built console over the seeded demo, in one Chromium. */
export interface ConsoleUnderTest {
  readonly baseUrl: string
  readonly password: string
  /** A page in a profile of its own, watched for complaints. */
  open(path: string, opening?: Opening): Promise<Page>
  /** The API as that person, beside the browser. */
  api(account: Account): Promise<Call>
  /** What went wrong on any page since it was last asked; asking empties it. */
  takeComplaints(): string[]
}

/**
 * Starts it before the file's tests and ends it after them. After each test every page of it is closed,
 * and the test fails on what the pages complained of: a policy violation, an error in the log, a script
 * that threw, a request that failed or was refused.
 */
export function watchedConsole(): ConsoleUnderTest {
  let service: DemoService
  let browser: Browser
  const contexts: BrowserContext[] = []
  const complaints: string[] = []
  const sessions = new Map<Account, BrowserContextOptions['storageState']>()
  const people = new Map<Account, Promise<Call>>()
  let person: ReturnType<typeof createPeople>

  beforeAll(async () => {
    const [started, launched] = await Promise.all([startBuiltService(), launchBrowser()])
    service = started
    browser = launched
    person = createPeople(service)
  })
  afterEach(async () => {
    await Promise.all(contexts.splice(0).map(closeQuietened))
    expect(complaints.splice(0)).toEqual([])
  })
  afterAll(async () => {
    await browser?.close()
    await service?.close()
  })

  async function open(path: string, opening: Opening = {}): Promise<Page> {
    const context = await browser.newContext({
      viewport: opening.size ?? WIDE,
      colorScheme: opening.mode ?? 'light',
      baseURL: service.baseUrl,
      ...(opening.as && sessions.has(opening.as) ? { storageState: sessions.get(opening.as) } : {}),
      ...opening.context,
    })
    contexts.push(context)
    context.setDefaultTimeout(PATIENCE_MS)
    if (opening.as !== undefined && !sessions.has(opening.as)) {
      await signIn(context, opening.as)
      sessions.set(opening.as, await context.storageState())
    }
    const page = await context.newPage()
    await watch(page, complaints, opening.refusals ?? [])
    await page.goto(path)
    return page
  }

  return {
    get baseUrl() {
      return service.baseUrl
    },
    password: demo.password,
    open,
    api: (account) => {
      const call = people.get(account) ?? person(account)
      people.set(account, call)
      return call
    },
    takeComplaints: () => complaints.splice(0),
  }
}

function startBuiltService(): Promise<DemoService> {
  const dist = inject('dist')
  const folder = join(dist, 'console')
  return startDemoService({
    console: { folder, page: readFileSync(join(folder, 'index.html'), 'utf8') },
    document: readFileSync(join(dist, 'openapi/openapi.json'), 'utf8'),
  })
}

export const emailOf = (account: Account): string => `${account}@larkhaven.example`

async function signIn(context: BrowserContext, account: Account): Promise<void> {
  const answer = await context.request.post('/v1/sign-in', {
    data: { email: emailOf(account), password: demo.password },
  })
  expect(answer.status()).toBe(200)
}

/** Lets pages tell what they have still to tell: a report of the policy is a task of its own. */
async function closeQuietened(context: BrowserContext): Promise<void> {
  const turn = () => new Promise<void>((done) => setTimeout(done))
  await Promise.all(context.pages().map((page) => page.evaluate(turn)))
  await context.close()
}

/** Writes down whatever a page should never do. */
async function watch(page: Page, complaints: string[], refusals: readonly number[]): Promise<void> {
  await page.exposeFunction(REPORT, (what: string) => complaints.push(`policy: ${what}`))
  await page.addInitScript((report) => {
    addEventListener('securitypolicyviolation', ({ violatedDirective, blockedURI, sourceFile }) => {
      const tell = Reflect.get(globalThis, report) as (what: string) => void
      tell(`${violatedDirective} blocked ${blockedURI} in ${sourceFile}`)
    })
  }, REPORT)
  page.on('console', (message) => {
    // A refused request is told of by its answer below, with its status.
    const isRefusal = message.text().startsWith('Failed to load resource: the server responded')
    if (message.type() === 'error' && !isRefusal) complaints.push(`log: ${message.text()}`)
  })
  page.on('pageerror', (error) => complaints.push(`thrown: ${error.message}`))
  page.on('requestfailed', (request) => {
    complaints.push(`failed: ${request.url()} ${request.failure()?.errorText}`)
  })
  page.on('response', (answer) => {
    const status = answer.status()
    if (status < 400 || refusals.includes(status)) return
    complaints.push(`refused: ${status} ${answer.request().method()} ${answer.url()}`)
  })
}
