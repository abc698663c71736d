import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import { truncateRatio } from '#shared/checks/finding-words.ts'
import type { FindingWire } from '#shared/contracts/findings.ts'
import { getPair, listPairs, type PairWire, patchPair } from '#shared/contracts/pairs.contract.ts'
import { watchedConsole } from '#tests/support/console-page.ts'
import { measureWith } from '#tests/support/measured-head.ts'

const SYSTEM = '/systems/larkhaven'
const params = { system: 'larkhaven' }
const site = watchedConsole()

async function everyPair(): Promise<readonly PairWire[]> {
  const call = await site.api('maintainer')
  return (await call(listPairs, { params, query: { limit: 500 } })).body.items
}

async function pairOf(foreground: string, background: string): Promise<PairWire> {
  const found = (await everyPair()).find(
    (pair) => pair.foreground === foreground && pair.background === background,
  )
  if (found === undefined) throw new Error(`no pair ${foreground} on ${background}`)
  return found
}

const measured = async () => measureWith(await site.api('maintainer'))

async function openPair(
  { id, foreground, background }: PairWire,
  refusals: readonly number[] = [],
) {
  const page = await site.open(`${SYSTEM}/pairs/${id}`, { as: 'maintainer', refusals })
  await page.getByRole('heading', { level: 1, name: `${foreground} on ${background}` }).waitFor()
  await page.getByRole('heading', { name: 'Remove it' }).waitFor()
  return page
}

const effect = (page: Page) => page.getByRole('region', { name: 'Effect on the verdicts' })
const save = (page: Page) => page.getByRole('button', { name: 'Save to the head' }).click()

/** Takes a token in a combobox by keyboard: its name typed, the first offer taken. */
async function takeToken(page: Page, label: string, name: string): Promise<void> {
  const box = page.getByRole('combobox', { name: label, exact: true })
  await box.fill(name)
  await page.getByRole('option', { name, exact: true }).waitFor()
  await page.keyboard.press('ArrowDown')
  await page.keyboard.press('Enter')
  expect(await box.inputValue()).toBe(name)
}

async function choose(page: Page, choice: string, option: string): Promise<void> {
  await page.getByRole('button', { name: choice }).click()
  await page.getByRole('option', { name: option, exact: true }).click()
}

/** What each row of the table shows: its link's name, and its figures by theme. */
async function tableRows(page: Page) {
  await page.locator('[data-theme-column] [data-ratio]').first().waitFor()
  return page.getByRole('table', { name: 'Pairs' }).evaluate((table) =>
    [...table.querySelectorAll('tr:has(a[data-row])')].map((row) => ({
      name: row.querySelector('a')?.ariaLabel ?? '',
      figures: [...row.querySelectorAll<HTMLElement>('[data-theme-column]')].flatMap((cell) => {
        const text = cell.querySelector('[data-ratio]')?.textContent
        return text ? [{ theme: cell.dataset.themeColumn ?? '', text }] : []
      }),
    })),
  )
}

/** Two decimals of the findings furthest short, of those that can fall short, and else of the lowest. */
function lowestTexts(findings: readonly FindingWire[]): string[] {
  const counting = findings.filter(
    ({ outcome, ratio, required }) =>
      outcome !== 'exempt' && required > 0 && (outcome !== 'pass' || ratio >= required),
  )
  const reach = ({ ratio, required }: FindingWire) =>
    counting.length > 0 ? ratio / required : ratio
  const from = counting.length > 0 ? counting : findings
  const least = Math.min(...from.map(reach))
  return from.filter((each) => reach(each) === least).map(({ ratio }) => truncateRatio(ratio, 2))
}

const KINDS: Readonly<Record<string, string>> = {
  'large-text': 'text',
  'focus-adjacent': 'focus',
  'focus-change': 'focus',
}
const kindOf = (use: string) => KINDS[use] ?? use

describe('the table of pairs', () => {
  it('answers every pair in its order, each figure as the API has it', async () => {
    const page = await site.open(`${SYSTEM}/pairs`, { as: 'engineer' })
    const [rows, pairs, findings] = [await tableRows(page), await everyPair(), await measured()]
    expect(rows.map(({ name }) => name).slice(0, 12)).toEqual(
      pairs.map((pair) => `${pair.foreground} on ${pair.background}, ${pair.use}`).slice(0, 12),
    )
    const wrong: unknown[] = []
    let compared = 0
    for (const [at, { name, figures }] of rows.entries()) {
      const pair = pairs[at]
      if (pair === undefined || name !== `${pair.foreground} on ${pair.background}, ${pair.use}`) {
        throw new Error(`row ${at} is ${name}`)
      }
      // A pair that limits its states has some of the findings that another one may declare besides.
      if (pair.states !== undefined) continue
      for (const { theme, text } of figures) {
        const own = findings.filter(
          (finding) =>
            finding.theme === theme &&
            finding.foreground === pair.foreground &&
            finding.background === pair.background &&
            kindOf(finding.use) === kindOf(pair.use),
        )
        compared++
        if (!lowestTexts(own).includes(text)) wrong.push({ name, theme, text })
      }
    }
    expect(wrong).toEqual([])
    expect(compared).toBeGreaterThan(50)
  })

  it('answers a sentence with the pairs it names, kept by the address', async () => {
    const page = await site.open(`${SYSTEM}/pairs`, { as: 'maintainer' })
    await page.locator('[data-theme-column] [data-ratio]').first().waitFor()
    await choose(page, 'Outcome', 'that breach')
    await choose(page, 'Use', 'text')
    await takeToken(page, 'Token', 'status.delayed')
    await page
      .getByRole('status')
      .filter({ hasText: / of 157 pairs/ })
      .waitFor()
    const search = new URL(page.url()).searchParams
    expect(Object.fromEntries(search)).toEqual({
      outcome: 'breach',
      use: 'text',
      token: 'status.delayed',
    })
    const shown = (await tableRows(page)).map(({ name }) => name)
    const short = (await measured()).filter(
      ({ outcome, foreground, use }) =>
        outcome === 'breach' && foreground === 'status.delayed' && use === 'text',
    )
    expect(shown.sort()).toEqual(
      [...new Set(short.map((each) => `${each.foreground} on ${each.background}, text`))].sort(),
    )
    await page.reload()
    expect((await tableRows(page)).map(({ name }) => name).sort()).toEqual(shown)
  })
})

describe('a pair', () => {
  it('answers a declaration with what it measures, an edit with what it moves, and goes again', async () => {
    const page = await site.open(`${SYSTEM}/new-pair`, {
      as: 'maintainer',
      refusals: [403],
    })
    await takeToken(page, 'Foreground', 'text.muted')
    await takeToken(page, 'Background', 'chart.paper')
    const measures = page.locator('section', { has: page.getByText('What it would measure') })
    await measures.getByRole('listitem').first().waitFor()
    const foreseen = await measures.getByRole('listitem').allInnerTexts()
    await page.getByRole('button', { name: 'Declare the pair' }).click()
    await page.getByRole('heading', { level: 1, name: 'text.muted on chart.paper' }).waitFor()

    const made = await pairOf('text.muted', 'chart.paper')
    expect(new URL(page.url()).pathname).toBe(`${SYSTEM}/pairs/${made.id}`)
    const findings = (await measured()).filter(
      ({ foreground, background }) => foreground === 'text.muted' && background === 'chart.paper',
    )
    expect(findings.length).toBeGreaterThan(0)
    for (const { theme, ratio } of findings) {
      const text = truncateRatio(ratio, 2)
      expect(foreseen.some((line) => line.includes(theme) && line.includes(text))).toBe(true)
    }

    await page.getByLabel('Least ratio of its own').fill('9')
    await effect(page)
      .getByRole('heading', { name: /^(?!None).* newly breaching$/ })
      .waitFor()
    await save(page)
    await page.getByText(/^Saved as revision \d+\.$/).waitFor()
    const call = await site.api('maintainer')
    expect((await call(getPair, { params: { ...params, id: made.id } })).body.minimum).toBe(9)

    await page.getByLabel('Least ratio of its own').fill('')
    await page.getByText('This asks for less than before.').waitFor()
    await save(page)
    const refused = page.getByRole('alert')
    await refused.getByText('text.muted on chart.paper', { exact: false }).first().waitFor()
    expect(await page.getByLabel('Least ratio of its own').inputValue()).toBe('')
    expect((await call(getPair, { params: { ...params, id: made.id } })).body.minimum).toBe(9)

    const admin = await site.open(`${SYSTEM}/pairs/${made.id}`, { as: 'admin' })
    await admin.getByRole('button', { name: 'Remove the pair' }).click()
    await admin.getByText(/open breach(es)? (is|are) closed/).waitFor()
    await admin.getByRole('button', { name: 'Remove it for good' }).click()
    await admin.getByRole('table', { name: 'Pairs' }).waitFor()
    expect((await everyPair()).some(({ id }) => id === made.id)).toBe(false)
  })

  it('leaves both versions to choose from where somebody saved in between', async () => {
    const pair = await pairOf('text.muted', 'surface.deck')
    const page = await openPair(pair, [412])
    await page.getByLabel('Least ratio of its own').fill('4.75')
    const call = await site.api('maintainer')
    await call(patchPair, {
      params: { ...params, id: pair.id },
      ifMatch: pair.etag,
      body: { minimum: 4.6 },
    })
    await save(page)
    const versions = page.getByRole('table', { name: 'Both versions' })
    await versions.waitFor()
    expect(await versions.locator('tbody td').allInnerTexts()).toEqual(['Minimum', '4.6', '4.75'])
    await page.getByRole('button', { name: 'Save yours over it' }).click()
    await page.getByText(/^Saved as revision \d+\.$/).waitFor()
    expect((await call(getPair, { params: { ...params, id: pair.id } })).body.minimum).toBe(4.75)
  })

  it('answers who may not save with who may, and measures all the same', async () => {
    const pair = await pairOf('text.muted', 'surface.hull')
    const page = await site.open(`${SYSTEM}/pairs/${pair.id}`, { as: 'engineer' })
    await page.getByText(/saving takes a maintainer\. .+ is one\./).waitFor()
    await page.getByLabel('Least ratio of its own').fill('21')
    await effect(page)
      .getByRole('heading', { name: /^(?!None).* newly breaching$/ })
      .waitFor()
  })
})
