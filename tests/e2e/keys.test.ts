import { describe, expect, it } from 'vitest'
import { watchedConsole } from '#tests/support/console-page.ts'

const KEYS = '/systems/larkhaven/keys'
const site = watchedConsole()

const statusWith = async (key: string, path: string) =>
  (await fetch(`${site.baseUrl}${path}`, { headers: { authorization: `Bearer ${key}` } })).status

describe('the keys of a system', () => {
  it('answers a maintainer with a key, once, and with its command; revoked it answers no more', async () => {
    const page = await site.open(KEYS, { as: 'maintainer' })
    await page.getByLabel('Name, to know it by').fill('Slipway pipeline')
    await page.getByRole('button', { name: 'What it is for' }).click()
    await page
      .getByRole('option', { name: 'check the builds of a pipeline and fetch themes' })
      .click()
    await page.getByRole('button', { name: 'Make the key' }).click()
    const shown = page.getByRole('region', { name: 'The new key' })
    const key = (await shown.locator('pre').first().textContent()) ?? ''
    expect(key).toMatch(/^dyw_ci_/)
    expect(await shown.locator('pre').last().textContent()).toContain(
      `gate --url ${site.baseUrl} --system larkhaven`,
    )
    const theme = '/v1/systems/larkhaven/themes/light.css'
    expect(await statusWith(key, theme)).toBe(200)
    await page.reload()
    const row = page
      .getByRole('table', { name: 'Keys' })
      .getByRole('row', { name: /Slipway pipeline/ })
    await row.waitFor()
    expect(await page.content()).not.toContain(key)
    await row.getByRole('button', { name: 'Revoke' }).click()
    await page.getByRole('button', { name: 'Yes, revoke Slipway pipeline' }).click()
    await page.getByText('Slipway pipeline is revoked.').waitFor()
    expect(await statusWith(key, theme)).toBe(401)
  })

  it('answers an engineer with read keys alone, and says whom the others take', async () => {
    const page = await site.open(KEYS, { as: 'engineer' })
    await page.getByText(/A key that checks or writes takes a maintainer\. .+ is one\./).waitFor()
    await page.getByLabel('Name, to know it by').fill('Kiosk build')
    await page.getByRole('button', { name: 'Make the key' }).click()
    const key = await page
      .getByRole('region', { name: 'The new key' })
      .locator('pre')
      .first()
      .textContent()
    expect(key).toMatch(/^dyw_read_/)
  })

  it('refuses a key without a name or with too long a life, beside the fields', async () => {
    const page = await site.open(KEYS, { as: 'maintainer' })
    await page.getByLabel('Days until it expires').fill('91')
    await page.getByText('Whole days, from 1 to 90.').waitFor()
    await page.getByRole('button', { name: 'Make the key' }).click()
    await page.getByText('What is it called?').waitFor()
    expect(await page.getByRole('region', { name: 'The new key' }).count()).toBe(0)
  })
})
