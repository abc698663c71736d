import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import type { Account } from '#scripts/demo/people.ts'
import { countInWords } from '#shared/checks/finding-words.ts'
import { listBreaches } from '#shared/contracts/breaches.contract.ts'
import { getTheme, patchTheme } from '#shared/contracts/themes.contract.ts'
import { watchedConsole } from '#tests/support/console-page.ts'

const SYSTEM = '/systems/larkhaven'
const params = { system: 'larkhaven' }
const site = watchedConsole()

async function openTheme(key: string, as: Account, refusals: readonly number[] = []) {
  const page = await site.open(`${SYSTEM}/themes/${key}`, { as, refusals })
  await page.getByRole('heading', { level: 1, name: key }).waitFor()
  return page
}

const effect = (page: Page) => page.getByRole('region', { name: 'Effect on the verdicts' })
const saveButton = (page: Page) => page.getByRole('button', { name: 'Save to the head' })
const field = (page: Page, name: string) => page.getByRole('textbox', { name, exact: true })

async function openBreaches(theme: string): Promise<number> {
  const call = await site.api('maintainer')
  const query = { theme, origin: 'head' as const, limit: 1 }
  return (await call(listBreaches, { params, query })).body.total
}

const inWords = (count: number) =>
  count === 0 ? 'None' : countInWords(count).replace(/^./, (letter) => letter.toUpperCase())

describe('the themes of a system', () => {
  it('answers each under its parent, with what breaches in it', async () => {
    const page = await site.open(`${SYSTEM}/themes`, { as: 'engineer' })
    const rows = page.getByRole('table', { name: 'Themes' }).locator('tbody tr')
    await rows.first().waitFor()
    expect(await rows.locator('a[data-row]').allTextContents()).toEqual(['light', 'dark', 'kiosk'])
    const breaching = await openBreaches('light')
    await rows.first().getByText(countInWords(breaching), { exact: true }).waitFor()
    await rows.nth(1).getByRole('link').click()
    await page.getByRole('heading', { level: 1, name: 'dark' }).waitFor()
  })
})

describe('an edit of a theme', () => {
  it('answers what it moves before it is saved, and the service then does the same', async () => {
    const page = await openTheme('kiosk', 'maintainer')
    const before = await openBreaches('kiosk')
    await field(page, 'Lightness +').fill('0.02')
    await effect(page)
      .getByRole('heading', { name: /^(?!None).* newly breaching$/ })
      .waitFor()
    const said = await effect(page)
      .getByRole('heading', { name: /newly breaching/ })
      .textContent()
    await field(page, 'Why, stands on the revision').fill('Lighter in glare')
    await saveButton(page).click()
    await page.getByText(/^Saved as revision \d+\.$/).waitFor()
    const opened = (await openBreaches('kiosk')) - before
    expect(opened).toBeGreaterThan(0)
    expect(said).toBe(`${inWords(opened)} newly breaching`)
  })

  it('answers a field that holds no number with what it takes, and saves nothing', async () => {
    const page = await openTheme('dark', 'maintainer')
    await field(page, 'Chroma ×').fill('a lot')
    await page.getByText('Write a number from 0 to 10.').waitFor()
    expect(await saveButton(page).isDisabled()).toBe(true)
    await page.getByRole('button', { name: 'Put back', exact: true }).click()
    expect(await field(page, 'Chroma ×').inputValue()).toBe('0.92')
  })

  it('answers a value taken away with what that moves, and puts it back', async () => {
    const page = await openTheme('dark', 'maintainer')
    await page.getByRole('button', { name: 'Take away status.delayed rest' }).click()
    await effect(page).getByText('status.delayed').first().waitFor()
    await page.getByRole('button', { name: 'Put back status.delayed rest' }).click()
    await effect(page).getByText('Nothing is edited yet.').waitFor()
  })

  it('refuses an engineer the save, and says whom it takes', async () => {
    const page = await openTheme('dark', 'engineer')
    await field(page, 'Chroma ×').fill('0.5')
    await effect(page)
      .getByRole('heading', { name: /newly breaching$/ })
      .waitFor()
    await page.getByText(/saving takes a maintainer\. .+ is one\./).waitFor()
    expect(await saveButton(page).isDisabled()).toBe(true)
  })

  it('refuses what weakens to a maintainer, each weakening in a sentence', async () => {
    const page = await openTheme('kiosk', 'maintainer', [403])
    await page.getByRole('button', { name: 'Gating' }).click()
    await page.getByRole('option', { name: 'is only reported' }).click()
    await saveButton(page).click()
    const refusal = page.getByRole('alert')
    await refusal.waitFor()
    expect(await refusal.getByRole('listitem').count()).toBeGreaterThan(0)
  })

  it('leaves both versions where somebody saved meanwhile, and then saves the one chosen', async () => {
    const page = await openTheme('dark', 'maintainer', [412])
    await field(page, 'Chroma ×').fill('0.91')
    const call = await site.api('maintainer')
    const theme = { ...params, theme: 'dark' }
    const { etag, rule } = (await call(getTheme, { params: theme })).body
    const body = { rule: { ...rule, chroma: 0.9 } }
    await call(patchTheme, { params: theme, ifMatch: etag, body })
    await saveButton(page).click()
    const both = page.getByRole('table', { name: 'Both versions' })
    await both.getByText('chroma × 0.9', { exact: false }).first().waitFor()
    const row = both.getByRole('row').filter({ hasText: 'Rule' })
    expect((await row.textContent()) ?? '').toMatch(/chroma × 0\.9(?!1).*chroma × 0\.91/)
    await page.getByRole('button', { name: 'Save yours over it' }).click()
    await page.getByText(/^Saved as revision \d+\.$/).waitFor()
    expect((await call(getTheme, { params: theme })).body.rule.chroma).toBe(0.91)
  })
})

describe('a new theme', () => {
  it('answers at its own address once made, and is gone once an administrator removes it', async () => {
    const page = await site.open(`${SYSTEM}/new-theme?from=light`, { as: 'admin' })
    await field(page, 'Key, in addresses and file names').fill('Night Watch')
    await page.getByText('Lower-case letters, digits and single hyphens.').first().waitFor()
    await field(page, 'Key, in addresses and file names').fill('night')
    await field(page, 'Name').fill('Night')
    await page.getByRole('button', { name: 'Make the theme' }).click()
    await page.getByRole('heading', { level: 1, name: 'night' }).waitFor()
    await page.getByRole('button', { name: 'Remove night' }).click()
    await effect(page)
      .last()
      .getByText(/No verdict moves|newly breaching/)
      .first()
      .waitFor()
    await page.getByRole('button', { name: 'Remove night for good' }).click()
    const table = page.getByRole('table', { name: 'Themes' })
    await table.waitFor()
    await expect.poll(() => table.locator('a[data-row]').allTextContents()).not.toContain('night')
  })
})
