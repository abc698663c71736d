import { AxeBuilder } from '@axe-core/playwright'
import type { Page, Route } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import { NARROW, WIDE, watchedConsole } from '#tests/support/console-page.ts'
import { openPlace, PLACES } from '#tests/support/console-places.ts'
import { focusFaults, overlaps, sidewaysScroll } from '#tests/support/page-measures.ts'

/** WCAG 2.0 to 2.2, A and AA, as axe-core tags its rules. */
const WCAG_AA = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22a', 'wcag22aa']
const LOOKS = [
  ['light', 'wide', WIDE],
  ['dark', 'wide', WIDE],
  ['dark', 'narrow', NARROW],
  ['light', 'narrow', NARROW],
] as const
const site = watchedConsole()

async function axeFaults(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page })
    .options({ resultTypes: ['violations'] })
    .withTags(WCAG_AA)
    .setLegacyMode(true)
    .analyze()
  return violations.flatMap(({ id, nodes }) =>
    nodes.map(({ target, failureSummary }) => `${id} ${target.join(' ')}: ${failureSummary}`),
  )
}

describe.each(PLACES)('the page %s', (place) => {
  it('leaves axe without a violation and nothing to scroll sideways to, in every look', async () => {
    const page = await openPlace(site, place)
    const faults: string[] = []
    for (const [mode, width, size] of LOOKS) {
      await page.setViewportSize(size)
      await page.emulateMedia({ colorScheme: mode })
      const found = [...(await axeFaults(page)), ...(await sidewaysScroll(page))]
      faults.push(...found.map((fault) => `${mode} ${width}: ${fault}`))
    }
    expect(faults).toEqual([])
  })

  it.each([
    ['wide', WIDE],
    ['narrow', NARROW],
  ] as const)('answers Tab with each control in turn, seen and outlined: %s', async (_, size) => {
    expect(await focusFaults(await openPlace(site, place, { size }))).toEqual([])
  })

  it('leaves its title clear of the navigation at 200 % zoom', async () => {
    const page = await openPlace(site, place, {
      size: { width: WIDE.width / 2, height: WIDE.height / 2 },
      context: { deviceScaleFactor: 2 },
    })
    expect(await overlaps(page, 'h1', 'nav, header, form, main p')).toEqual([])
    expect(await sidewaysScroll(page)).toEqual([])
  })
})

describe('motion', () => {
  /** What moves while a page is waited for. */
  async function moving(reducedMotion: 'reduce' | 'no-preference'): Promise<number> {
    const page = await openPlace(site, 'tokens', { context: { reducedMotion } })
    const held: Route[] = []
    await page.route('**/breaches?**', (route) => void held.push(route))
    await page.getByRole('navigation').getByRole('link', { name: 'Breaches' }).click()
    await page.locator('.waiting-line').waitFor()
    const running = await page.evaluate(
      () => document.getAnimations().filter(({ playState }) => playState === 'running').length,
    )
    for (const route of held) await route.continue()
    await page.getByRole('table', { name: 'Breaches' }).waitFor()
    return running
  }

  it('leaves a waiting page still for whoever wants no motion', async () => {
    expect(await moving('reduce')).toBe(0)
    expect(await moving('no-preference')).toBeGreaterThan(0)
  })
})

describe('the watch on every page', () => {
  it('answers a breach of the policy, an error and a refused request with a complaint each', async () => {
    const page = await openPlace(site, 'sign-in')
    await page.evaluate(async () => {
      document.body.setAttribute('style', 'color: red')
      setTimeout(() => {
        throw new Error('on purpose')
      })
      reportError(new Error('reported on purpose'))
      await fetch('/v1/nowhere')
      await fetch('http://127.0.0.1:1/').catch(() => undefined)
    })
    const complaints: string[] = []
    const starts = [
      'policy: style-src-attr blocked inline',
      'log: Applying inline style violates',
      'policy: connect-src blocked http://127.0.0.1:1/',
      'log: Connecting to',
      'log: Fetch API cannot load',
      'thrown: on purpose',
      'thrown: reported on purpose',
      'refused: 404 GET',
    ]
    await expect
      .poll(
        () => {
          complaints.push(...site.takeComplaints())
          return starts.filter((start) => !complaints.some((each) => each.startsWith(start)))
        },
        { timeout: 20_000 },
      )
      .toEqual([])
  })
})
