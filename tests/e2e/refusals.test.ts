import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import type { Account } from '#scripts/demo/people.ts'
import { getToken, patchToken } from '#shared/contracts/tokens.contract.ts'
import { emailOf, NARROW, watchedConsole } from '#tests/support/console-page.ts'

const SYSTEM = '/systems/larkhaven'
const TOKEN = 'chart.route.3'
const params = { system: 'larkhaven', name: TOKEN }
const site = watchedConsole()

async function fillSignIn(page: Page, account: Account, password = site.password): Promise<void> {
  await page.getByLabel('E-mail').fill(emailOf(account))
  await page.getByLabel('Password').fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
}

const colorField = (page: Page) => page.getByLabel('Trying, any CSS colour')
const messageField = (page: Page) => page.getByLabel('Why, stands on the revision')
const saveButton = (page: Page) => page.getByRole('button', { name: 'Save to the head' })
const isThere = (page: Page, path: string) => page.waitForURL((url) => url.pathname === path)

async function openToken(page: Page): Promise<void> {
  await page.getByRole('heading', { level: 1, name: TOKEN }).waitFor()
  await page.getByRole('heading', { name: 'Its pairs' }).waitFor()
}

describe('signing in', () => {
  it('refuses a wrong password in words, and keeps the address that was typed', async () => {
    const page = await site.open('/sign-in', { refusals: [401] })
    await fillSignIn(page, 'maintainer', 'not the password of anybody')
    await page.getByRole('alert').getByText('E-mail and password do not match.').waitFor()
    expect(await page.getByLabel('E-mail').inputValue()).toBe(emailOf('maintainer'))
    expect(new URL(page.url()).pathname).toBe('/sign-in')
  })

  it('refuses empty fields, each in its own words', async () => {
    const page = await site.open('/sign-in')
    await page.getByRole('button', { name: 'Sign in' }).click()
    for (const [label, words] of [
      ['E-mail', 'Which address were you invited at?'],
      ['Password', 'The password is missing.'],
    ] as const) {
      const field = page.getByLabel(label)
      expect(await field.getAttribute('aria-invalid')).toBe('true')
      const described = await field.getAttribute('aria-describedby')
      expect(await page.locator(`[id="${described}"]`).textContent()).toBe(words)
    }
  })

  it('answers with the place that was asked for, filter and all', async () => {
    const asked = `${SYSTEM}/breaches?status=resolved`
    const page = await site.open(asked, { refusals: [401] })
    await isThere(page, '/sign-in')
    await fillSignIn(page, 'engineer')
    await page.getByRole('table', { name: 'Breaches' }).waitFor()
    expect(page.url()).toBe(site.baseUrl + asked)
  })

  it('leaves this console for no address that the link asks for', async () => {
    const page = await site.open(`/sign-in?next=${encodeURIComponent('//example.net/')}`)
    await fillSignIn(page, 'engineer')
    await isThere(page, '/systems')
    expect(new URL(page.url()).origin).toBe(site.baseUrl)
  })
})

describe('a session that ends', () => {
  it('answers with signing in, and then with the place it ended at', async () => {
    const page = await site.open(`${SYSTEM}/tokens`, { refusals: [401] })
    await fillSignIn(page, 'maintainer')
    await page.getByRole('table', { name: 'Tokens' }).waitFor()
    const ended = await page.context().request.post('/v1/sign-out')
    expect(ended.status()).toBe(204)
    await page.goto(`${SYSTEM}/tokens/${TOKEN}`)
    await isThere(page, '/sign-in')
    await fillSignIn(page, 'maintainer')
    await openToken(page)
    await isThere(page, `${SYSTEM}/tokens/${TOKEN}`)
  })

  it('leaves nothing of a system on screen after signing out', async () => {
    const page = await site.open('/sign-in', { refusals: [401] })
    await fillSignIn(page, 'maintainer')
    await page.getByRole('link', { name: 'larkhaven' }).click()
    await page.getByRole('table', { name: 'Tokens' }).waitFor()
    await page.getByRole('button', { name: 'Sign out' }).click()
    await isThere(page, '/sign-in')
    await page.goBack()
    await isThere(page, '/sign-in')
  })

  it('leaves what was typed through signing in again, and then saves it', async () => {
    const page = await site.open(`${SYSTEM}/tokens/${TOKEN}`, { refusals: [401] })
    await fillSignIn(page, 'maintainer')
    await openToken(page)
    await colorField(page).fill('oklch(0.5 0.1 150)')
    await messageField(page).fill('Deeper')
    expect((await page.context().request.post('/v1/sign-out')).status()).toBe(204)
    await saveButton(page).click()
    await page.getByRole('alert').getByText('Your session has ended').waitFor()
    expect(await colorField(page).inputValue()).toBe('oklch(0.5 0.1 150)')
    await page.getByRole('link', { name: 'Sign in and come back to it' }).click()
    await fillSignIn(page, 'maintainer')
    await openToken(page)
    expect(await colorField(page).inputValue()).toBe('oklch(0.5 0.1 150)')
    expect(await messageField(page).inputValue()).toBe('Deeper')
    await saveButton(page).click()
    await page.getByText(/^Saved as revision \d+\.$/).waitFor()
  })
})

describe('an edit that is not taken', () => {
  it('refuses an engineer the save, says whom it takes, and still measures what is tried', async () => {
    const page = await site.open(`${SYSTEM}/tokens/${TOKEN}`, { as: 'engineer' })
    await openToken(page)
    await colorField(page).fill('oklch(0.49 0.1 150)')
    await page.getByRole('heading', { name: /^None newly breaching$/ }).waitFor()
    expect(await saveButton(page).isDisabled()).toBe(true)
    const described = await saveButton(page).getAttribute('aria-describedby')
    await page
      .locator(`#${described}`)
      .getByText(/saving takes a maintainer\. (Ines Marrow|Pelle Strand|Sanna Quill) is one\.$/)
      .waitFor()
    await messageField(page).fill('Deeper')
    await page.keyboard.press('Enter')
    const maintainer = await site.api('maintainer')
    expect((await maintainer(getToken, { params })).body.value).not.toMatchObject({
      components: [0.49, 0.1, 150],
    })
  })

  it('leaves what was typed when somebody else was first, and saves it when told to again', async () => {
    const page = await site.open(`${SYSTEM}/tokens/${TOKEN}`, { as: 'maintainer', refusals: [412] })
    await openToken(page)
    const other = await site.api('pelle')
    const { body } = await other(getToken, { params })
    await other(patchToken, {
      params,
      ifMatch: body.etag,
      body: { value: 'oklch(0.52 0.11 150)', message: 'First' },
    })
    await colorField(page).fill('oklch(0.48 0.1 150)')
    await messageField(page).fill('Second')
    await saveButton(page).click()
    const alert = page.getByRole('alert')
    await alert.getByText('Somebody has saved this token since you opened it.').waitFor()
    const versions = alert.getByRole('table', { name: 'Both versions' })
    expect(await versions.locator('tbody td').allInnerTexts()).toEqual([
      'Colour',
      'oklch(0.52 0.11 150)',
      'oklch(0.48 0.1 150)',
    ])
    expect(await colorField(page).inputValue()).toBe('oklch(0.48 0.1 150)')
    expect(await messageField(page).inputValue()).toBe('Second')
    await alert.getByRole('button', { name: 'Save yours over it' }).click()
    await page.getByText(/^Saved as revision \d+\.$/).waitFor()
    expect((await other(getToken, { params })).body.value).toMatchObject({
      components: [0.48, 0.1, 150],
    })
  })

  it('refuses what is no colour at its own field, before anything is sent', async () => {
    const page = await site.open(`${SYSTEM}/tokens/${TOKEN}`, { as: 'maintainer' })
    await openToken(page)
    await colorField(page).fill('a lighter blue')
    expect(await colorField(page).getAttribute('aria-invalid')).toBe('true')
    expect(await saveButton(page).isDisabled()).toBe(true)
  })
})

describe('what is not there', () => {
  it('answers a name that no token has with those that begin alike', async () => {
    const page = await site.open(`${SYSTEM}/tokens?named=chart.rx`, {
      as: 'engineer',
      size: NARROW,
    })
    await page.getByText('No token has this name.').waitFor()
    expect(await page.getByRole('main').getByRole('link', { name: TOKEN }).count()).toBe(1)
  })

  it.each([
    ['a token', `${SYSTEM}/tokens/no.such`],
    ['a breach', `${SYSTEM}/breaches/brc_none`],
    ['a system', '/systems/nowhere/tokens'],
  ])('answers in words that %s is not there', async (_, path) => {
    const page = await site.open(path, { as: 'engineer', refusals: [404] })
    await page.getByRole('heading', { level: 1, name: 'There is nothing here' }).waitFor()
  })

  it('answers in words, and with a way on, while the service does not answer', async () => {
    const page = await site.open(`${SYSTEM}/tokens`, { as: 'engineer' })
    await page.getByRole('table', { name: 'Tokens' }).waitFor()
    await page.route('**/v1/**', (route) => route.abort('connectionrefused'))
    await page.getByRole('navigation').getByRole('link', { name: 'Breaches' }).click()
    await page.getByRole('heading', { name: 'The service does not answer' }).waitFor()
    expect(site.takeComplaints().join()).toContain('net::ERR_CONNECTION_REFUSED')
    await page.unroute('**/v1/**')
    await page.getByRole('button', { name: 'Try once more' }).click()
    await page.getByRole('table', { name: 'Breaches' }).waitFor()
  })
})
