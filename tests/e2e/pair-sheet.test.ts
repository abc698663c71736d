import type { Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import { truncateRatio } from '#shared/checks/finding-words.ts'
import type { FindingWire } from '#shared/contracts/findings.ts'
import { NARROW, watchedConsole } from '#tests/support/console-page.ts'
import { measureWith } from '#tests/support/measured-head.ts'

const SYSTEM = '/systems/larkhaven'
const site = watchedConsole()

const measured = async () => measureWith(await site.api('maintainer'))

/** Every word of the sheet: the band it stands on and what its link says. */
function sheetWords(page: Page) {
  return page.evaluate(() =>
    [...document.querySelectorAll('section[aria-label^="On "]')].flatMap((band) =>
      [...band.querySelectorAll('a[data-row]')].map((word) => ({
        background: band.getAttribute('aria-label')?.slice(3) ?? '',
        label: word.getAttribute('aria-label') ?? '',
      })),
    ),
  )
}

/** The words that the API's findings come to in a theme at rest. */
function wantedWords(findings: readonly FindingWire[], theme: string): string[] {
  return findings
    .filter((finding) => finding.theme === theme && finding.state === 'rest/rest')
    .map(({ foreground, background, ratio, required, outcome }) => {
      const needs = outcome === 'exempt' || required === 0 ? '' : ` of ${required}`
      const said = outcome === 'pass' ? '' : `, ${outcome}`
      return `${background}: ${foreground}, rest, ${truncateRatio(ratio, 2)}${needs}${said}`
    })
    .sort()
}

describe('the pair sheet', () => {
  it('answers each theme in place with every finding on its band', async () => {
    const page = await site.open(`${SYSTEM}/pair-sheet`, { as: 'engineer' })
    await page.getByRole('region', { name: 'On surface.hull' }).waitFor()
    const findings = await measured()
    const shown = async () =>
      (await sheetWords(page)).map(({ background, label }) => `${background}: ${label}`).sort()
    expect(await shown()).toEqual(wantedWords(findings, 'light'))

    await page
      .getByRole('navigation', { name: 'Theme' })
      .getByRole('link', { name: 'kiosk' })
      .click()
    await page.waitForURL(/\?theme=kiosk$/)
    await expect.poll(shown).toEqual(wantedWords(findings, 'kiosk'))
    await page
      .getByRole('navigation', { name: 'State' })
      .getByRole('link', { name: 'hover' })
      .click()
    await page.waitForURL(/theme=kiosk&state=hover$/)
    await expect
      .poll(async () => (await sheetWords(page)).every(({ label }) => label.includes('hover')))
      .toBe(true)
  })

  it('answers the arrows with the next word, its name seen, Enter with its pair', async () => {
    const page = await site.open(`${SYSTEM}/pair-sheet`, { as: 'engineer' })
    const words = page.locator('section a[data-row]')
    await words.first().focus()
    await page.keyboard.press('ArrowDown')
    const focused = page.locator('section a[data-row]:focus')
    expect(await focused.getAttribute('data-row')).toBe('1')
    expect(await focused.locator('.sheet-name').isVisible()).toBe(true)
    const name = (await focused.locator('.sheet-name').textContent())?.split(',')[0]
    await page.keyboard.press('Enter')
    await page.getByRole('heading', { level: 1, name: new RegExp(`^${name} on `) }).waitFor()
  })

  it.each([
    ['wide', undefined],
    ['narrow', NARROW],
  ] as const)('leaves every word and figure within its band: %s', async (_, size) => {
    const page = await site.open(`${SYSTEM}/pair-sheet`, {
      as: 'engineer',
      ...(size === undefined ? {} : { size }),
    })
    await page.getByRole('region', { name: 'On surface.hull' }).waitFor()
    await page.evaluate(() => document.fonts.ready)
    const outside = await page.evaluate(() =>
      [...document.querySelectorAll('.sheet-cloth')].flatMap((cloth) => {
        const band = cloth.getBoundingClientRect()
        return [...cloth.querySelectorAll('.sheet-word, [data-ratio]')].flatMap((word) => {
          const { left, right } = word.getBoundingClientRect()
          return left < band.left - 1 || right > band.right + 1 ? [word.textContent] : []
        })
      }),
    )
    expect(outside).toEqual([])
  })

  it('leaves the sheet, its names and its foot on paper, in light, and no controls', async () => {
    const page = await site.open(`${SYSTEM}/pair-sheet`, { as: 'engineer', mode: 'dark' })
    await page.getByRole('region', { name: 'On surface.hull' }).waitFor()
    await page.emulateMedia({ media: 'print' })
    const names = page.locator('.sheet-name')
    expect(await names.evaluateAll((all) => all.every((name) => name.checkVisibility()))).toBe(true)
    for (const role of ['navigation', 'banner', 'search', 'button'] as const) {
      expect([role, await page.getByRole(role).count()]).toEqual([role, 0])
    }
    const edges = await page.evaluate(() =>
      [...document.querySelectorAll('.sheet-ruler > :last-child, .sheet-cloth')].map((part) => {
        const { left, right } = part.getBoundingClientRect()
        return `${Math.round(left)} to ${Math.round(right)}`
      }),
    )
    expect(new Set(edges).size).toBe(1)
    const foot = page.locator('.sheet-foot')
    await expect
      .poll(() => foot.textContent())
      .toMatch(/^larkhaven, revision \d+, engine 1\.\d+\.\d+, wcag-2\.2, digest [0-9a-f]{16}$/)
    const ground = await page.evaluate(() => getComputedStyle(document.body).backgroundColor)
    expect(ground).toBe('rgb(255, 255, 255)')
  })
})
