import { readFileSync } from 'node:fs'
import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import type { Account } from '#scripts/demo/people.ts'
import { getResolverFile } from '#shared/contracts/imports.contract.ts'
import { getSystem } from '#shared/contracts/systems.contract.ts'
import { getToken } from '#shared/contracts/tokens.contract.ts'
import { NARROW, watchedConsole } from '#tests/support/console-page.ts'
import { sidewaysScroll } from '#tests/support/page-measures.ts'

const PAGE = '/systems/larkhaven/import'
const params = { system: 'larkhaven' }
const site = watchedConsole()

interface Visit {
  readonly as?: Account
  readonly search?: string
  readonly refusals?: readonly number[]
}

async function openImport({ as = 'maintainer', search = '', refusals = [] }: Visit = {}) {
  const page = await site.open(`${PAGE}${search}`, { as, refusals })
  await page.getByRole('heading', { name: 'Import a file' }).waitFor()
  return page
}

const button = (page: Page, name: string) => page.getByRole('button', { name, exact: true })
const changes = (page: Page) => page.getByRole('table', { name: 'Changes' })
const field = (page: Page) => page.getByRole('textbox', { name: 'or drop it here' })
const revision = async () =>
  (await (await site.api('maintainer'))(getSystem, { params })).body.head.revision
const wholeSystem = async () =>
  JSON.parse((await (await site.api('maintainer'))(getResolverFile, { params })).body)

async function choose(page: Page, name: string, content: object | string) {
  const text = typeof content === 'string' ? content : JSON.stringify(content)
  const file = { name, mimeType: 'application/json', buffer: Buffer.from(text) }
  await page.locator('input[type=file]').setInputFiles(file)
}

async function tryIt(page: Page) {
  await button(page, 'Try it').click()
  await page.getByRole('region', { name: 'What this would change' }).waitFor()
}

const color = (lightness: number) => ({
  $type: 'color',
  $value: { colorSpace: 'oklch', components: [lightness, 0.1, 240] },
})

describe('a file', () => {
  it('answers what it would change, and once imported the one revision that it made', async () => {
    const before = await revision()
    const page = await openImport()
    const file = readFileSync('scripts/demo/breaching-change.tokens.json', 'utf8')
    await choose(page, 'brand.tokens.json', file)
    expect(await button(page, 'Import').isDisabled()).toBe(true)
    await tryIt(page)
    await page.getByText('The check fails').waitFor()
    await page.getByRole('heading', { name: /newly breaching$/ }).waitFor()
    const row = changes(page).getByRole('row').filter({ hasText: 'sea.7' })
    await row.getByRole('img', { name: 'sea.7 before, in light and dark' }).waitFor()
    await row.getByRole('img', { name: 'sea.7 after, in light and dark' }).waitFor()
    expect(await revision()).toBe(before)
    await page.getByRole('textbox', { name: 'Why' }).fill('Lighter, for the summer')
    await button(page, 'Import').click()
    await page.getByRole('heading', { name: `Imported as revision ${before + 1}.` }).waitFor()
    await page.getByText(`Head is revision ${before + 1},`, { exact: false }).waitFor()
    expect(await revision()).toBe(before + 1)
  })

  it('answers nothing to import where the system says all of it already', async () => {
    const page = await openImport()
    await choose(page, 'larkhaven.resolver.json', await wholeSystem())
    await tryIt(page)
    await page.getByText('There is nothing to import.').waitFor()
    expect(await button(page, 'Import').isDisabled()).toBe(true)
  })

  it('answers pasted text and a style sheet like a file, and lists what is left out', async () => {
    const page = await openImport()
    await field(page).fill(':root { --paste-test: #123456; --paste-gap: 4px }')
    await page.getByRole('button', { name: 'Names in a style sheet' }).click()
    await page.getByRole('option', { name: 'action.board' }).click()
    await expect.poll(() => new URL(page.url()).search).toBe('?hyphensAsDots=true')
    await tryIt(page)
    await changes(page).getByText('paste.test', { exact: true }).waitFor()
    await page.getByRole('heading', { name: 'One left out' }).waitFor()
  })

  it('leaves only the changes that the sentence asks for, and says so in the address', async () => {
    const page = await openImport()
    await choose(page, 'more.tokens.json', {
      'shown-first': color(0.4),
      'shown-gap': { $type: 'dimension', $value: { value: 4, unit: 'px' } },
    })
    await tryIt(page)
    const rows = changes(page).locator('tbody tr')
    await expect.poll(() => rows.count()).toBe(2)
    await page.getByRole('button', { name: 'Kind' }).click()
    await page.getByRole('option', { name: 'tokens', exact: true }).click()
    await expect.poll(() => rows.count()).toBe(1)
    expect(new URL(page.url()).search).toBe('?show=token')
    await page.setViewportSize(NARROW)
    expect(await sidewaysScroll(page)).toEqual([])
  })
})

describe('a bad file', () => {
  it('refuses it with every fault at its place, changes nothing and keeps the file', async () => {
    const before = await revision()
    const page = await openImport({ refusals: [422] })
    await choose(page, 'bad.tokens.json', {
      fine: color(0.5),
      first: { $type: 'color', $value: 'red' },
      second: {
        third: { $type: 'color', $value: { colorSpace: 'nowhere', components: [1, 1, 1] } },
      },
    })
    await button(page, 'Try it').click()
    const table = page.getByRole('table', { name: 'What is wrong with it' })
    await table.getByText('/first/$value').waitFor()
    await table.getByText('/second/third/$value/colorSpace').waitFor()
    await page.getByText('bad.tokens.json').waitFor()
    expect(await button(page, 'Import').isDisabled()).toBe(true)
    expect(await revision()).toBe(before)
  })

  it('refuses what is no JSON before it is sent, and keeps the text', async () => {
    const page = await openImport()
    await field(page).fill('{\n  "a": \n}')
    await page.getByText(/^This is not JSON\. The browser says: .*\}/).waitFor()
    expect(await button(page, 'Try it').isDisabled()).toBe(true)
    expect(await field(page).inputValue()).toContain('"a"')
  })

  it('refuses a file of over 8 MiB with its size', async () => {
    const page = await openImport()
    await choose(page, 'large.json', `{"a":"${'x'.repeat(8.5 * 2 ** 20)}"}`)
    await page.getByText('large.json has 8.6 MiB; at most 8 MiB are read.').waitFor()
  })
})

describe('a replacement', () => {
  it('refuses it to a maintainer with what it asks less for, and lets an administrator', async () => {
    const file = await wholeSystem()
    const call = await site.api('maintainer')
    const kept = (await call(getToken, { params: { ...params, name: 'chart.route.1' } })).body
    file.sets.core.sources[0]['kept-apart'] = color(0.5)
    const page = await openImport({ search: '?mode=replace' })
    await choose(page, 'whole.resolver.json', file)
    await tryIt(page)
    await page.getByText('This asks for less than before.').waitFor()
    await page
      .getByText(/which takes the approval of an accessibility lead\. .+ is one\./)
      .waitFor()
    expect(await button(page, 'Import').isDisabled()).toBe(true)
    const asAdmin = await openImport({ as: 'admin', search: '?mode=replace' })
    await choose(asAdmin, 'whole.resolver.json', file)
    await tryIt(asAdmin)
    await button(asAdmin, 'Import').click()
    await asAdmin.getByRole('heading', { name: /^Imported as revision \d+\.$/ }).waitFor()
    const after = (await call(getToken, { params: { ...params, name: 'chart.route.1' } })).body
    expect(after.id).toBe(kept.id)
  })

  it('refuses an engineer any import, and says whom it takes', async () => {
    const page = await openImport({ as: 'engineer' })
    await field(page).fill(JSON.stringify({ a: color(0.5) }))
    await page.getByText(/^Importing takes a maintainer\. .+ is one\.$/).waitFor()
    expect(await button(page, 'Try it').isDisabled()).toBe(true)
  })
})

describe('the head as files', () => {
  it('answers each theme in each format, and the whole system, from the themes page', async () => {
    const page = await site.open('/systems/larkhaven/themes', { as: 'engineer' })
    const links = page.getByRole('region', { name: 'Fetch' }).getByRole('link')
    await links.first().waitFor()
    const names = await links.allTextContents()
    expect(names).toContain('resolver.json')
    for (const theme of ['light', 'dark', 'kiosk']) expect(names).toContain(`${theme}.css`)
    for (const link of await links.all()) {
      const answer = await page.request.get((await link.getAttribute('href')) ?? '')
      expect(answer.status(), (await link.textContent()) ?? '').toBe(200)
    }
  })
})

describe('a file of 20,000 tokens', () => {
  const many = (): object => {
    const groups: Record<string, Record<string, object>> = {}
    for (let at = 0; at < 20_000; at += 1) {
      const name = `g${Math.floor(at / 100)}`
      groups[name] = { ...groups[name], [`t${at}`]: color(0.2 + (at % 600) / 1000) }
    }
    return groups
  }

  it('answers how far it is at an address of its own, and there what came of it', async () => {
    const page = await openImport()
    await choose(page, 'many.tokens.json', many())
    await button(page, 'Try it').click()
    await page.getByRole('progressbar', { name: 'The import' }).waitFor()
    const address = page.url()
    expect(new URL(address).searchParams.get('job')).toMatch(/^job_/)
    await page.getByRole('navigation').getByRole('link', { name: 'Pairs' }).click()
    await page.getByRole('table', { name: 'Pairs' }).waitFor()
    await page.goto(address)
    const region = page.getByRole('region', { name: 'What this would change' })
    await region.waitFor({ timeout: 120_000 })
    await region.getByText('20,000 added', { exact: false }).waitFor()
    await region.getByText('And 15,000 more, not listed here.').waitFor()
    expect(await changes(page).getAttribute('aria-rowcount')).toBe('5001')
    expect(await changes(page).locator('tbody tr').count()).toBeLessThan(100)
    expect(await button(page, 'Import').isDisabled()).toBe(true)
  }, 240_000)

  it('refuses an address of no work with what became of it', async () => {
    const page = await openImport({ search: '?job=job_unknown', refusals: [404] })
    await page.getByText('There is no such work any more').waitFor()
  })
})
