import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import type { Account } from '#scripts/demo/people.ts'
import { getBreach, listBreaches, patchBreach } from '#shared/contracts/breaches.contract.ts'
import { listMembers } from '#shared/contracts/members.contract.ts'
import { watchedConsole } from '#tests/support/console-page.ts'

const BREACHES = '/systems/larkhaven/breaches'
const params = { system: 'larkhaven' }
const site = watchedConsole()

/** An open breach that nobody is on. */
async function freeBreach(): Promise<string> {
  const call = await site.api('a11y')
  const query = { status: ['open' as const], assignee: 'none', limit: 1 }
  const id = (await call(listBreaches, { params, query })).body.items[0]?.id
  if (id === undefined) throw new TypeError('the demo has an open breach that nobody is on')
  return id
}

async function openBreach(id: string, as: Account, refusals: readonly number[] = []) {
  const page = await site.open(`${BREACHES}/${id}`, { as, refusals })
  await page.getByRole('heading', { name: 'History' }).waitFor()
  return page
}

const history = (page: Page) => page.locator('section:has(> h2:text-is("History"))')
const assigned = (page: Page) => page.getByRole('combobox', { name: 'Assigned to' })

describe('handling a breach', () => {
  it('answers an assignment in the row, in the history and in the filter', async () => {
    const id = await freeBreach()
    const page = await openBreach(id, 'a11y')
    await assigned(page).fill('Pelle')
    await page.getByRole('option', { name: 'Pelle Strand' }).click()
    await history(page).getByText('Assigned to Pelle Strand').waitFor()
    const opened = page.getByRole('row').filter({ has: page.getByRole('link', { expanded: true }) })
    await opened.getByRole('cell', { name: 'Pelle Strand', exact: true }).waitFor()
    await page.goto(BREACHES)
    await page.getByRole('button', { name: 'Assignee' }).click()
    await page.getByRole('option', { name: 'Pelle Strand' }).click()
    await page.waitForURL((url) => url.searchParams.has('with'))
    const rows = page.getByRole('table', { name: 'Breaches' }).locator('tbody tr')
    await expect.poll(() => rows.count()).toBeGreaterThan(0)
    await expect
      .poll(async () => (await rows.allTextContents()).every((row) => row.includes('Pelle Strand')))
      .toBe(true)
  })

  it('answers one’s own taking it, and its being taken off', async () => {
    const page = await openBreach(await freeBreach(), 'a11y')
    await page.getByRole('button', { name: 'Take it yourself' }).click()
    await history(page).getByText('Assigned to Noor Haddad').waitFor()
    await page.getByRole('button', { name: 'Take it off' }).click()
    await history(page).getByText('Taken off Noor Haddad').waitFor()
    expect(await assigned(page).inputValue()).toBe('')
  })

  it('refuses a maintainer to assign in words, and takes their comment', async () => {
    const page = await openBreach(await freeBreach(), 'maintainer')
    await page.getByText(/Assigning takes an accessibility lead\. .+ is one\./).waitFor()
    await page.getByLabel('Add a comment').fill('Two lines:\n<b>as text</b>')
    await page.getByRole('button', { name: 'Add it to the history' }).click()
    await history(page).getByRole('listitem').getByText('<b>as text</b>').waitFor()
    expect(await page.getByLabel('Add a comment').inputValue()).toBe('')
  })

  it('leaves a comment that was typed through a reload and a session that ends', async () => {
    const id = await freeBreach()
    const page = await site.open('/sign-in', { refusals: [401] })
    const signIn = async () => {
      await page.getByLabel('E-mail').fill('engineer@larkhaven.example')
      await page.getByLabel('Password').fill(site.password)
      await page.getByRole('button', { name: 'Sign in' }).click()
    }
    await signIn()
    await page.getByRole('heading', { level: 1, name: 'Systems' }).waitFor()
    await page.goto(`${BREACHES}/${id}`)
    const comment = page.getByLabel('Add a comment')
    await comment.fill('Seen on the pier, too.')
    await page.reload()
    expect(await comment.inputValue()).toBe('Seen on the pier, too.')
    expect((await page.context().request.post('/v1/sign-out')).status()).toBe(204)
    await page.getByRole('button', { name: 'Add it to the history' }).click()
    await page.getByRole('alert').getByText('Your session has ended').waitFor()
    await page.goto(`${BREACHES}/${id}`)
    await signIn()
    expect(await comment.inputValue()).toBe('Seen on the pier, too.')
    await page.getByRole('button', { name: 'Add it to the history' }).click()
    await history(page).getByRole('listitem').getByText('Seen on the pier, too.').waitFor()
  })

  it('leaves somebody else’s assignment until it is asked again', async () => {
    const id = await freeBreach()
    const page = await openBreach(id, 'a11y', [412])
    const call = await site.api('a11y')
    const { items } = (await call(listMembers, { params })).body
    const idOf = (name: string) => items.find((member) => member.name === name)?.id ?? ''
    const { etag } = (await call(getBreach, { params: { ...params, id } })).body
    const body = { assignee: idOf('Sanna Quill') }
    await call(patchBreach, { params: { ...params, id }, ifMatch: etag, body })
    await page.getByRole('button', { name: 'Take it yourself' }).click()
    await page.getByRole('alert').getByText('Somebody has handled this breach').waitFor()
    await expect.poll(() => assigned(page).inputValue()).toBe('Sanna Quill')
    await page.getByRole('button', { name: 'Assign it all the same' }).click()
    await history(page).getByText('Assigned to Noor Haddad').waitFor()
  })

  it('answers a resolved row with its lowest ratio, when it closed and by what', async () => {
    const call = await site.api('a11y')
    const query = { status: ['resolved' as const], limit: 1 }
    const [breach] = (await call(listBreaches, { params, query })).body.items
    const page = await site.open(`${BREACHES}?status=resolved`, { as: 'engineer' })
    const row = page
      .getByRole('table', { name: 'Breaches' })
      .getByRole('row')
      .filter({ has: page.getByRole('link', { name: `Breach ${breach?.number}:` }) })
    await row.getByText('resolved').first().waitFor()
    const lowest = String(breach?.lowestRatio).match(/^\d+\.\d{2}/)?.[0]
    expect(await row.locator('[data-ratio=lowest]').textContent()).toBe(lowest)
  })
})
