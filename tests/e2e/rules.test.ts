import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import { getRules, putRules } from '#shared/contracts/rules.contract.ts'
import { getToken } from '#shared/contracts/tokens.contract.ts'
import { watchedConsole } from '#tests/support/console-page.ts'

const RULES = '/systems/larkhaven/rules'
const params = { system: 'larkhaven' }
const site = watchedConsole()

const effect = (page: Page) => page.getByRole('region', { name: 'Effect on the verdicts' })
const saveButton = (page: Page) => page.getByRole('button', { name: 'Save to the head' })
const stateOf = (page: Page, state: string) => page.getByRole('group', { name: state, exact: true })
const step = (page: Page, state: string) =>
  stateOf(page, state).getByRole('textbox', { name: 'Step' })

async function save(page: Page): Promise<void> {
  await saveButton(page).click()
  await page.getByText(/^Saved as revision \d+\.$/).waitFor()
}

describe('the rules of a system', () => {
  it('answers each scope with what it says and how many tokens it governs', async () => {
    const page = await site.open(RULES, { as: 'engineer' })
    const rows = page.getByRole('table', { name: 'Rules' }).locator('tbody tr')
    await rows.first().waitFor()
    const chart = rows.filter({ hasText: 'chart' }).first()
    await chart
      .getByText('match the contrast they have in the parent, against chart.paper')
      .first()
      .waitFor()
    expect(await chart.locator('td').last().textContent()).toBe('9')
  })

  it('answers a prefix that is narrowed with the tokens it governs, what it moves, and then its row', async () => {
    const page = await site.open(RULES, { as: 'maintainer' })
    await page.getByLabel('Narrow on a prefix, or on one token').fill('text')
    await page.keyboard.press('Escape')
    await page.getByRole('button', { name: 'Open its rules' }).click()
    await page.waitForURL((url) => url.searchParams.get('of') === 'prefix:text')
    await page.getByRole('main').getByRole('link', { name: 'text.primary', exact: true }).waitFor()
    await page.getByRole('button', { name: 'In dark colours: rule' }).click()
    await page.getByRole('option', { name: 'keep the parent’s' }).click()
    await effect(page)
      .getByRole('heading', { name: /^(?!None).* newly breaching$/ })
      .waitFor()
    await page.getByRole('button', { name: 'In dark colours: rule' }).click()
    await page.getByRole('option', { name: 'mirror their lightness' }).click()
    await effect(page)
      .getByText(/No verdict moves|None newly breaching/)
      .first()
      .waitFor()
    await save(page)
    const call = await site.api('maintainer')
    const { prefixes } = (await call(getRules, { params })).body
    expect(prefixes.find(({ prefix }) => prefix === 'text')?.themes).toEqual({
      dark: { kind: 'mirror' },
    })
  })

  it('answers a token’s own rule as the token’s, saved on it', async () => {
    const page = await site.open(`${RULES}?of=token:surface.chosen`, { as: 'maintainer' })
    await step(page, 'hover').fill('0.04')
    await effect(page)
      .getByText(/No verdict moves|newly breaching/)
      .first()
      .waitFor()
    await save(page)
    const call = await site.api('maintainer')
    const token = (await call(getToken, { params: { ...params, name: 'surface.chosen' } })).body
    expect(token.rules?.states?.hover?.lightness).toBe(0.04)
  })

  it('refuses a step that is no number in its own words', async () => {
    const page = await site.open(`${RULES}?of=system`, { as: 'maintainer' })
    await step(page, 'hover').fill('2')
    await stateOf(page, 'hover').getByText('Write a number from 0 to 1.').waitFor()
    expect(await saveButton(page).isDisabled()).toBe(true)
  })

  it('refuses an accessibility lead the save, and says whom it takes', async () => {
    const page = await site.open(`${RULES}?of=system`, { as: 'a11y' })
    await step(page, 'hover').fill('0.06')
    await effect(page)
      .getByRole('heading', { name: /newly breaching$/ })
      .waitFor()
    await page.getByText(/saving takes a maintainer\. .+ is one\./).waitFor()
    expect(await saveButton(page).isDisabled()).toBe(true)
  })

  it('leaves both versions where somebody saved meanwhile', async () => {
    const page = await site.open(`${RULES}?of=system`, { as: 'maintainer', refusals: [412] })
    await step(page, 'active').fill('0.12')
    const call = await site.api('maintainer')
    const { etag, states, prefixes } = (await call(getRules, { params })).body
    const body = { states: { ...states, active: { ...states.active, lightness: 0.11 } }, prefixes }
    await call(putRules, { params, ifMatch: etag, body })
    await saveButton(page).click()
    const row = page
      .getByRole('table', { name: 'Both versions' })
      .getByRole('row')
      .filter({ hasText: 'active' })
    await row.getByText('0.11').waitFor()
    expect(await row.getByText('0.12').count()).toBe(1)
    await page.getByRole('button', { name: 'Take it as it is now' }).click()
    await expect.poll(() => step(page, 'active').inputValue()).toBe('0.11')
  })
})
