import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import { getSystem, patchSystem } from '#shared/contracts/systems.contract.ts'
import { watchedConsole } from '#tests/support/console-page.ts'

const SETTINGS = '/systems/larkhaven/settings'
const params = { system: 'larkhaven' }
const site = watchedConsole()

const saveButton = (page: Page) => page.getByRole('button', { name: 'Save the settings' })
const system = async () => (await (await site.api('maintainer'))(getSystem, { params })).body

describe('the settings of a system', () => {
  it('answers a level that is raised with every verdict it moves, before it is saved', async () => {
    const page = await site.open(SETTINGS, { as: 'maintainer' })
    await page.getByRole('button', { name: 'Level', exact: false }).first().click()
    await page.getByRole('option', { name: 'AAA' }).click()
    const effect = page.getByRole('region', { name: 'Effect on the verdicts' })
    await effect.getByRole('heading', { name: /^(?!None).* newly breaching$/ }).waitFor()
    await effect.getByText('asked for 4.5 before').first().waitFor()
    await page.getByRole('button', { name: 'Put back' }).click()
    expect((await system()).level).toBe('AA')
  })

  it('answers a protected branch as handling, without a revision', async () => {
    const page = await site.open(SETTINGS, { as: 'maintainer' })
    const before = (await system()).head.revision
    await page.getByLabel('Branch, * for any characters').fill('release-*')
    await page.getByLabel('Repository').fill('larkhaven/kiosk')
    await page.getByRole('button', { name: 'Protect it' }).click()
    await page.getByText('This moves no verdict').waitFor()
    await saveButton(page).click()
    await page.getByText('Saved; no verdict moved, and no revision was made.').waitFor()
    const { head, protectedBranches } = await system()
    expect(protectedBranches).toContainEqual({ repository: 'larkhaven/kiosk', branch: 'release-*' })
    expect(head.revision).toBe(before)
  })

  it('refuses an accessibility lead what takes a maintainer, and says so', async () => {
    const page = await site.open(SETTINGS, { as: 'a11y' })
    await page.getByLabel('Name of larkhaven').fill('Larkhaven Boats')
    await page.getByText(/the rest takes a maintainer\. .+ is one\./).waitFor()
    expect(await saveButton(page).isDisabled()).toBe(true)
  })

  it('leaves both names where somebody saved meanwhile', async () => {
    const page = await site.open(SETTINGS, { as: 'maintainer', refusals: [412] })
    await page.getByLabel('Name of larkhaven').fill('Larkhaven Boats')
    const call = await site.api('maintainer')
    const body = { name: 'Larkhaven Lines' }
    await call(patchSystem, { params, ifMatch: (await system()).etag, body })
    await saveButton(page).click()
    const both = page.getByRole('table', { name: 'Both versions' })
    await both.getByText('Larkhaven Lines').waitFor()
    await both.getByText('Larkhaven Boats').waitFor()
    await page.getByRole('button', { name: 'Save yours over it' }).click()
    await page.getByText('Saved; no verdict moved').waitFor()
    expect((await system()).name).toBe('Larkhaven Boats')
  })
})
