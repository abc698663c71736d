import { describe, expect, it } from 'vitest'
import { createCheck } from '#shared/contracts/checks.contract.ts'
import { getCoverage } from '#shared/contracts/coverage.contract.ts'
import { watchedConsole } from '#tests/support/console-page.ts'

const COVERAGE = '/systems/larkhaven/coverage'
const params = { system: 'larkhaven' }
const site = watchedConsole()

const coverage = async () => (await (await site.api('maintainer'))(getCoverage, { params })).body

describe('what no declared pair measures', () => {
  it('answers the tokens that stand in no pair, each with the way into one', async () => {
    const { uncovered } = await coverage()
    const page = await site.open(COVERAGE, { as: 'engineer' })
    const table = page.getByRole('table', { name: 'Tokens in no pair' })
    await table.getByRole('link', { name: uncovered[0]!.name, exact: true }).waitFor()
    const names = await table.locator('td:nth-child(2) a').allTextContents()
    expect(names).toEqual(uncovered.map(({ name }) => name))
    await table.getByRole('link', { name: `Declare a pair with ${names[0]}` }).click()
    const foreground = page.getByRole('combobox', { name: 'Foreground', exact: true })
    await foreground.waitFor()
    expect(await foreground.inputValue()).toBe(names[0])
  })

  it('answers a pair that a pipeline alone measures, and leaves it out once it is declared', async () => {
    const [token] = (await coverage()).uncovered
    const call = await site.api('maintainer')
    const sent = {
      foreground: token!.name,
      background: 'surface.deck',
      relation: 'inside',
    } as const
    const source = { repository: 'larkhaven/quay', branch: 'fog' }
    await call(createCheck, {
      params,
      body: { newOnly: true, pairs: [{ ...sent, use: 'non-text' }], source },
    })
    const page = await site.open(COVERAGE, { as: 'maintainer' })
    const row = page
      .getByRole('table', { name: 'Pairs that nobody declared' })
      .getByRole('row', { name: `${sent.foreground} on ${sent.background}` })
    await row.getByText('fog of larkhaven/quay').filter({ visible: true }).waitFor()
    await row.getByRole('link', { name: 'Declare' }).click()
    await page.getByRole('button', { name: 'Use' }).getByText('non-text').waitFor()
    await page.getByRole('button', { name: 'Declare the pair' }).click()
    await page.getByRole('heading', { level: 1, name: `${sent.foreground} on` }).waitFor()
    const after = await coverage()
    expect(after.observed.map(({ pair }) => pair.foreground)).not.toContain(sent.foreground)
    expect(after.uncovered.map(({ name }) => name)).not.toContain(sent.foreground)
  })
})
