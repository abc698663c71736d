import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import { createCheck } from '#shared/contracts/checks.contract.ts'
import { listDistinctSets, patchDistinctSet } from '#shared/contracts/distinct-sets.contract.ts'
import { watchedConsole } from '#tests/support/console-page.ts'
import { cut } from '#tests/support/ratio-claims.ts'

const PAGE = '/systems/larkhaven/distinct-sets'
const params = { system: 'larkhaven' }
const site = watchedConsole()

const everySet = async () =>
  (await (await site.api('maintainer'))(listDistinctSets, { params })).body.items

async function setNamed(name: string) {
  const set = (await everySet()).find((one) => one.name === name)
  if (set === undefined) throw new Error(`there is no set ${name}`)
  return set
}

/** What a check answers of a set, as the page should say it: theme by theme, view by view. */
async function couplesOf(id: string): Promise<string[]> {
  const call = await site.api('maintainer')
  const { body } = await call(createCheck, { params, body: {} })
  return body.distinctSets
    .filter((measure) => measure.id === id)
    .flatMap(({ plain, protan, deutan, tritan }) =>
      [plain, protan, deutan, tritan].map(
        ({ first, second, deltaE2000 }) => `ΔE ${cut(deltaE2000)}: ${first} and ${second}`,
      ),
    )
}

/** Every couple of a list, in the order in which a person reads it. */
function shownCouples(page: Page, list: string): Promise<string[]> {
  return page
    .getByRole('list', { name: list })
    .locator('li > span:has(> span)')
    .evaluateAll((couples) =>
      couples.map((one) => `${one.children[0]?.textContent}: ${one.children[2]?.textContent}`),
    )
}

async function addToken(page: Page, name: string): Promise<void> {
  const box = page.getByRole('combobox', { name: 'Add a token', exact: true })
  await box.scrollIntoViewIfNeeded()
  await box.pressSequentially(name)
  await page.getByRole('option', { name, exact: true }).waitFor()
  await page.keyboard.press('ArrowDown')
  await page.keyboard.press('Enter')
  await page.getByRole('button', { name: `Take ${name} away` }).waitFor()
}

describe('the distinct sets', () => {
  it('answers the closest couples of each set as a check has them', async () => {
    const page = await site.open(PAGE, { as: 'engineer' })
    const sets = await everySet()
    expect(sets.length).toBeGreaterThan(1)
    for (const { id, name } of sets) {
      const list = `Closest couples of ${name}`
      await page.getByRole('list', { name: list }).waitFor()
      expect(await shownCouples(page, list)).toEqual(await couplesOf(id))
    }
  })

  it('answers a set that is made, measured while it is written, and lets it go again', async () => {
    const page = await site.open(`${PAGE}?set=new`, { as: 'maintainer' })
    await page.getByLabel('Name of the set').fill('Marks of the quay')
    await addToken(page, 'status.ontime')
    await page.getByText('A distinct set has two tokens or more.').waitFor()
    await addToken(page, 'status.cancelled')
    await page.getByRole('list', { name: 'Closest couples as written here' }).waitFor()
    const foreseen = await shownCouples(page, 'Closest couples as written here')
    await page.getByRole('button', { name: 'Make the set' }).click()
    const made = page.getByRole('region', { name: 'Marks of the quay' })
    await made.getByRole('button', { name: 'Remove the set' }).waitFor()
    const set = await setNamed('Marks of the quay')
    expect(set.tokens).toEqual(['status.ontime', 'status.cancelled'])
    expect(foreseen).toEqual(await couplesOf(set.id))
    expect(foreseen.length).toBeGreaterThan(0)

    await made.getByRole('button', { name: 'Remove the set' }).click()
    await made.getByRole('button', { name: /^Remove it for good/ }).click()
    await made.waitFor({ state: 'detached' })
    expect((await everySet()).map(({ name }) => name)).not.toContain('Marks of the quay')
  })

  it('leaves both versions to choose from where somebody saved in between', async () => {
    const set = await setNamed('Status of a sailing')
    const page = await site.open(`${PAGE}?set=${set.id}`, { as: 'maintainer', refusals: [412] })
    await page.getByLabel('Name of the set').fill('How a sailing stands')
    const call = await site.api('pelle')
    const path = { ...params, id: set.id }
    await call(patchDistinctSet, { params: path, ifMatch: set.etag, body: { name: 'Sailings' } })
    await page.getByRole('button', { name: 'Save to the head' }).click()
    const versions = page.getByRole('table', { name: 'Both versions' })
    await versions.waitFor()
    expect(await versions.locator('tbody td').allInnerTexts()).toEqual([
      'Name',
      'Sailings',
      'How a sailing stands',
    ])
    await page.getByRole('button', { name: 'Save yours over it' }).click()
    await page.getByText(/^Saved as revision \d+\.$/).waitFor()
    expect((await setNamed('How a sailing stands')).tokens).toEqual(set.tokens)
  })

  it('answers who may not save with who may', async () => {
    const page = await site.open(`${PAGE}?set=new`, { as: 'engineer' })
    await page.getByText(/saving takes a maintainer\. .+ is one\./).waitFor()
  })
})
