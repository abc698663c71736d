import { describe, expect, it } from 'vitest'
import { createToken } from '#shared/contracts/tokens.contract.ts'
import { watchedConsole } from '#tests/support/console-page.ts'

/** Every token has an address of its own, whatever its name is made of. RFC 3986, 2.1 and 2.4. */
const site = watchedConsole()
const params = { system: 'larkhaven' }

const NAMES = [
  'odd.two words',
  'odd.a/b',
  'odd.%2F',
  'odd.100%',
  'odd.a?b=c&d#e',
  'odd.<b>"quotes"</b>',
  'odd.👩‍🎨',
  '/',
]

const titleOf = (name: string) => `${name} · larkhaven · Dyewright`

describe.each(NAMES.map((name) => [name]))('the token %j', (name) => {
  it('answers at its address, from the ledger, after a reload and by going back', async () => {
    const call = await site.api('maintainer')
    await call(createToken, { params, body: { name, value: '#204a5c' } })
    const address = `/systems/larkhaven/tokens/${encodeURIComponent(name)}`
    const page = await site.open(address, { as: 'maintainer' })
    const heading = page.getByRole('heading', { level: 1, name, exact: true })
    await heading.waitFor()
    await expect.poll(() => page.title()).toBe(titleOf(name))
    await page.waitForLoadState('networkidle')
    await page.reload()
    await heading.waitFor()
    await page.waitForLoadState('networkidle')

    await page.goto(`/systems/larkhaven/tokens?named=${encodeURIComponent(name)}`)
    await page.getByRole('link', { name, exact: true }).first().click()
    await heading.waitFor()
    expect(new URL(page.url()).pathname).toBe(address)
    await page.goBack()
    await page.getByRole('link', { name, exact: true }).first().waitFor()
    await page.goForward()
    await heading.waitFor()
    await page.waitForLoadState('networkidle')
  })
})
