import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import { parseColor } from '#shared/color/parse-color.ts'
import { getToken } from '#shared/contracts/tokens.contract.ts'
import { watchedConsole } from '#tests/support/console-page.ts'
import { measureWith } from '#tests/support/measured-head.ts'

const TOKEN = 'action.board.fill'
const site = watchedConsole()

/** The token's page, its card cut to the last row. */
async function openCard(search = ''): Promise<Page> {
  const page = await site.open(`/systems/larkhaven/tokens/${TOKEN}${search}`, { as: 'maintainer' })
  await page.getByRole('list', { name: 'Limits' }).waitFor()
  await page.locator('[data-chip^="12 "]').first().waitFor()
  return page
}

const chips = (page: Page) => page.getByRole('gridcell')
const field = (page: Page) => page.getByLabel('Trying, any CSS colour')

/** A DTCG document that sets the token to what a chip writes. */
function candidate(css: string): Record<string, unknown> {
  const read = parseColor(css)
  if (!read.ok) throw new Error(read.reason)
  const { l, c, h, alpha } = read.color
  const components = [l, c, h].map((component) => component ?? 'none')
  return {
    action: {
      board: {
        fill: { $type: 'color', $value: { colorSpace: 'oklch', components, alpha: alpha ?? 1 } },
      },
    },
  }
}

describe('the shade card', () => {
  it('answers each chip as the service does when it is sent its colour', async () => {
    const page = await openCard()
    const call = await site.api('maintainer')
    const known = new Set(
      (await measureWith(call))
        .filter(({ outcome }) => outcome === 'breach')
        .map(({ fingerprint }) => fingerprint),
    )
    const cards = await chips(page).evaluateAll((all) =>
      all.map((chip) => ({
        css: (chip as HTMLElement).dataset.css ?? '',
        outcome: (chip as HTMLElement).dataset.outcome ?? '',
      })),
    )
    expect(cards.length).toBeGreaterThan(200)
    expect(new Set(cards.map(({ outcome }) => outcome))).toEqual(new Set(['whole', 'breaching']))
    // Breaches that do not hang on the token stay, whatever is tried.
    const others = new Set(known)
    const sampled = cards.filter((_, at) => at % 29 === 0)
    const answers = []
    for (const { css, outcome } of sampled) {
      const findings = await measureWith(call, candidate(css))
      const breaching = findings.filter((finding) => finding.outcome === 'breach')
      for (const fingerprint of others) {
        if (!breaching.some((each) => each.fingerprint === fingerprint)) others.delete(fingerprint)
      }
      answers.push({ css, outcome, breaching: breaching.map(({ fingerprint }) => fingerprint) })
    }
    for (const { css, outcome, breaching } of answers) {
      const own = breaching.filter((fingerprint) => !others.has(fingerprint))
      expect([css, outcome]).toEqual([css, own.length > 0 ? 'breaching' : 'whole'])
    }
  })

  it('answers the arrows by walking, Enter by trying, and the save by taking it', async () => {
    const page = await openCard()
    const present = page.locator('[role=gridcell][tabindex="0"]')
    await present.focus()
    const start = await present.getAttribute('data-css')
    expect(await present.getAttribute('data-outcome')).toBe('breaching')
    let css = start
    for (let step = 0; step < 10; step++) {
      await page.keyboard.press('ArrowLeft')
      const focused = page.locator('[role=gridcell]:focus')
      css = await focused.getAttribute('data-css')
      if ((await focused.getAttribute('data-outcome')) === 'whole') break
    }
    expect(css).not.toBe(start)
    await page.getByRole('heading', { name: 'What this shade would move' }).waitFor()
    await page.keyboard.press('Enter')
    expect(await field(page).inputValue()).toBe(css)
    await expect
      .poll(() => page.locator('[role=gridcell]:focus').getAttribute('aria-selected'))
      .toBe('true')

    await page.getByLabel('Why, stands on the revision').fill('As the card allows')
    await page.getByRole('heading', { name: 'None newly breaching' }).waitFor()
    await page.getByRole('button', { name: 'Save to the head' }).click()
    await page.getByText(/^Saved as revision \d+\.$/).waitFor()
    const call = await site.api('maintainer')
    const { value } = (await call(getToken, { params: { system: 'larkhaven', name: TOKEN } })).body
    const read = parseColor(css ?? '')
    if (!read.ok) throw new Error(read.reason)
    const { l, c, h } = read.color
    expect(value).toMatchObject({ colorSpace: 'oklch', components: [l, c, h] })
  })

  it('answers a pointer that is drawn across it with every chip it passes', async () => {
    const page = await openCard()
    const row = page.getByRole('row').nth(3).getByRole('gridcell')
    const [first, last] = [await row.nth(2).boundingBox(), await row.nth(6).boundingBox()]
    if (first === null || last === null) throw new Error('the chips have no boxes')
    const middle = (box: { x: number; y: number; width: number; height: number }) =>
      [box.x + box.width / 2, box.y + box.height / 2] as const
    const start = await field(page).inputValue()
    await page.mouse.move(...middle(first))
    await page.getByRole('heading', { name: 'What this shade would move' }).waitFor()
    expect(await field(page).inputValue()).toBe(start)
    await page.mouse.down()
    await page.mouse.move(...middle(last), { steps: 12 })
    expect(await field(page).inputValue()).toBe(await row.nth(6).getAttribute('data-css'))
    await page.mouse.up()
  })

  it('answers a neighbouring hue with a card cut at it, and the address keeps it', async () => {
    const page = await openCard()
    const hues = page.getByRole('row').first().getByRole('gridcell')
    const css = await hues.nth(12).getAttribute('data-css')
    await hues.nth(12).click()
    await page.waitForURL(/\?hue=\d+/)
    expect(await field(page).inputValue()).toBe(css)
    const hue = new URL(page.url()).searchParams.get('hue')
    await page.getByText(`at hue ${Math.round(Number(hue))}°`).waitFor()
    await page.reload()
    await page.getByText(`at hue ${Math.round(Number(hue))}°`).waitFor()
    await page.getByRole('button', { name: 'Back to its own hue' }).click()
    await page.waitForURL((url) => !url.searchParams.has('hue'))
  })
})
