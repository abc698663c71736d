import type { Locator, Page } from 'playwright-core'
import { describe, expect, it } from 'vitest'
import breachingChange from '#scripts/demo/breaching-change.tokens.json' with { type: 'json' }
import fix from '#scripts/demo/fix.tokens.json' with { type: 'json' }
import {
  type BreachEventWire,
  type BreachWire,
  getBreach,
} from '#shared/contracts/breaches.contract.ts'
import type { FindingWire } from '#shared/contracts/findings.ts'
import { listRevisions } from '#shared/contracts/revisions.contract.ts'
import { emailOf, NARROW, watchedConsole } from '#tests/support/console-page.ts'
import { type MeasuredHead, measureHead, measureWith } from '#tests/support/measured-head.ts'
import { type Answers, claimedFigures, cut, findingsOn } from '#tests/support/ratio-claims.ts'
import { type RatioPlace, readRatios } from '#tests/support/screen-ratios.ts'

const TOKEN = 'sea.7'
const params = { system: 'larkhaven' }
const site = watchedConsole()
const api = () => site.api('maintainer')

/** Each ratio on the page is the one that the API has of the finding which it claims to be of. */
async function expectRatios(
  page: Page,
  places: readonly RatioPlace[],
  answers: Answers,
): Promise<void> {
  const { ratios, strays } = await readRatios(page)
  const asked = ratios.map((shown) => ({ ...shown, ...claimedFigures(shown, answers) }))
  expect(ratios).toEqual(asked)
  expect(strays).toEqual([])
  expect([...new Set(ratios.map(({ place }) => place))].sort()).toEqual([...places].sort())
}

const cssOf = (document: typeof fix): string => {
  const [l, c, h] = document.sea['7'].$value.components
  return `oklch(${l} ${c} ${h})`
}

/** Presses Tab until the focus is where it is wanted. */
async function tabTo(page: Page, wanted: Locator): Promise<void> {
  for (let presses = 0; presses < 40; presses++) {
    if (await wanted.evaluate((element) => element === document.activeElement)) return
    await page.keyboard.press('Tab')
  }
  throw new Error(`Tab does not reach ${wanted}`)
}

/** Finds the token with `/`, walks to it with the arrows and opens it, all by keyboard. */
async function openByKeyboard(page: Page, name: string): Promise<void> {
  await page.getByRole('table', { name: 'Tokens' }).waitFor()
  await page.keyboard.press('/')
  await page.locator('#find:focus').waitFor()
  await page.keyboard.type(name.split('.')[0] ?? '')
  await page.getByRole('status').filter({ hasText: ' of 122 tokens' }).waitFor()
  const rows = page.getByRole('table', { name: 'Tokens' }).locator('a[data-row]')
  await tabTo(page, rows.first())
  const names = await rows.evaluateAll((links) => links.map((link) => link.ariaLabel))
  for (let row = 0; row < names.indexOf(name); row++) await page.keyboard.press('ArrowDown')
  await page.keyboard.press('Enter')
  await page.getByRole('heading', { level: 1, name }).waitFor()
  await page.getByRole('heading', { name: 'Its pairs' }).waitFor()
}

async function tryColor(page: Page, css: string): Promise<void> {
  await page.getByLabel('Trying, any CSS colour').fill(css)
  await page.getByRole('heading', { name: / newly breaching$/ }).waitFor()
}

async function save(page: Page, message: string): Promise<void> {
  await page.getByLabel('Why, stands on the revision').fill(message)
  await page.getByRole('button', { name: 'Save to the head' }).click()
  await page.getByText(/^Saved as revision \d+\.$/).waitFor()
}

/** Identities of what breaches. */
const short = (findings: readonly FindingWire[]): string[] =>
  findings.filter(({ outcome }) => outcome === 'breach').map(({ fingerprint }) => fingerprint)

async function newestRevision() {
  const { body } = await (await api())(listRevisions, { params, query: { limit: 1 } })
  return body.items[0]
}

async function eventsOf(page: Page): Promise<readonly BreachEventWire[]> {
  const id = new URL(page.url()).pathname.split('/').at(-1) ?? ''
  return (await (await api())(getBreach, { params: { ...params, id } })).body.events
}

async function openBreach(page: Page, { number, foreground, background }: BreachWire) {
  const name = `Breach ${number}: ${foreground} on ${background}`
  await page.getByRole('link', { name, exact: true }).press('Enter')
  await page.getByRole('heading', { name: 'History' }).waitFor()
}

/** Takes another option of a choice in the filter's sentence. */
async function choose(page: Page, choice: string, option: string): Promise<void> {
  await page.getByRole('button', { name: choice }).click()
  await page.getByRole('option', { name: option, exact: true }).click()
}

/** How a breach ended, on which day, and the lowest that it had come to, as its row says it. */
const endingIn = (words: string, lowest: string) =>
  new RegExp(`^${words} \\d{1,2} [A-Z][a-z]+, lowest ${lowest.replace('.', '\\.')}$`)

const NUMBERS = 'None One Two Three Four Five Six Seven Eight Nine Ten Eleven Twelve'.split(' ')

/** The link on the page's ground in light, which the lighter blue makes too faint. */
function linkBreach({ breaches }: MeasuredHead): BreachWire {
  const found = breaches.find(
    ({ foreground, background, theme, state }) =>
      foreground === 'text.link' &&
      background === 'surface.hull' &&
      theme === 'light' &&
      state === 'rest/rest',
  )
  if (found === undefined) throw new Error('the log has no breach of the link')
  return found
}

describe('a maintainer at the console', () => {
  it('answers a breach to a lighter blue, and resolves it with the fix', async () => {
    const call = await api()
    const page = await site.open('/systems/larkhaven/tokens', { refusals: [401] })
    await page.getByLabel('E-mail').fill(emailOf('maintainer'))
    await page.getByLabel('Password').fill(site.password)
    await page.keyboard.press('Enter')
    await page.getByRole('table', { name: 'Tokens' }).waitFor()
    expect(new URL(page.url()).pathname).toBe('/systems/larkhaven/tokens')

    const opening = await measureHead(call)
    await expectRatios(page, ['tokens'], { head: opening })

    await openByKeyboard(page, TOKEN)
    await expectRatios(page, ['pairs'], { head: opening, token: TOKEN })

    const lighter = await measureWith(call, breachingChange)
    const breaking = short(lighter).filter((one) => !short(opening.findings).includes(one)).length
    expect(breaking).toBeGreaterThan(0)
    await tryColor(page, cssOf(breachingChange))
    await page.getByRole('heading', { name: `${NUMBERS[breaking]} newly breaching` }).waitFor()
    await expectRatios(page, ['pairs', 'moves'], {
      head: opening,
      token: TOKEN,
      tried: lighter,
    })

    await save(page, 'A lighter link blue')
    const broken = await measureHead(call)
    expect(short(broken.findings)).toEqual(short(lighter))
    const breakingRevision = await newestRevision()
    expect(breakingRevision).toMatchObject({ message: 'A lighter link blue' })
    await page.getByText(`${NUMBERS[breaking]} breach`).waitFor()
    await expectRatios(page, ['pairs'], { head: broken, token: TOKEN })

    await page.getByRole('navigation', { name: 'larkhaven' }).getByText('Breaches').click()
    await page.getByRole('table', { name: 'Breaches' }).waitFor()
    await expectRatios(page, ['breaches'], { head: broken })
    const breach = linkBreach(broken)
    expect(breach).toMatchObject({ status: 'open', firstSeenRevision: breakingRevision?.number })
    await openBreach(page, breach)
    await page.getByText(`Fell short in revision ${breakingRevision?.number}`).waitFor()
    await page.getByText(/Ines Marrow: A lighter link blue$/).waitFor()
    await expectRatios(page, ['breaches', 'history', 'steps'], {
      head: broken,
      events: await eventsOf(page),
    })
    await page.getByRole('link', { name: 'Open text.link' }).click()
    await page.getByRole('heading', { level: 1, name: 'text.link' }).waitFor()
    await expectRatios(page, ['pairs', 'ships'], {
      head: broken,
      token: 'text.link',
    })

    await page.getByRole('navigation', { name: 'larkhaven' }).getByText('Tokens').click()
    await openByKeyboard(page, TOKEN)
    const fixed = await measureWith(call, fix)
    expect(short(fixed)).toEqual(short(opening.findings))
    await tryColor(page, cssOf(fix))
    await page.getByRole('heading', { name: `${NUMBERS[breaking]} newly passing` }).waitFor()
    await expectRatios(page, ['pairs', 'moves'], {
      head: broken,
      token: TOKEN,
      tried: fixed,
    })
    await save(page, 'As light as its pairs allow')
    const mended = await measureHead(call)
    const mendingRevision = await newestRevision()
    expect(mendingRevision?.number).toBe((breakingRevision?.number ?? 0) + 1)

    await page.getByRole('navigation', { name: 'larkhaven' }).getByText('Breaches').click()
    await page.getByRole('table', { name: 'Breaches' }).waitFor()
    await choose(page, 'Status', 'resolved')
    await openBreach(page, linkBreach(mended))
    await page.getByText(`Passed again in revision ${mendingRevision?.number}`).waitFor()
    await page.getByText(/Ines Marrow: As light as its pairs allow$/).waitFor()
    const row = page.getByRole('row').filter({ has: page.getByRole('link', { expanded: true }) })
    const lowest = cut(linkBreach(mended).lowestRatio)
    await row.getByRole('cell', { name: endingIn('resolved, fixed', lowest) }).waitFor()
    await expectRatios(page, ['breaches', 'history', 'steps'], {
      head: mended,
      events: await eventsOf(page),
    })
    expect(linkBreach(mended)).toMatchObject({ status: 'resolved', closingReason: 'fixed' })
  })
  it.each(['light', 'dark', 'kiosk'])(
    'answers the ratios of %s alone, as the API has them',
    async (theme) => {
      const page = await site.open(`/systems/larkhaven/tokens?theme=${theme}`, { as: 'engineer' })
      await page.getByRole('table', { name: 'Tokens' }).waitFor()
      const head = await measureHead(await api())
      await expectRatios(page, ['tokens'], { head, theme })
      const { ratios } = await readRatios(page)
      const measured = [...head.tokens.keys()].filter((token) =>
        findingsOn(head.findings, token, theme).some(({ outcome }) => outcome !== 'exempt'),
      )
      expect(ratios.map(({ label }) => label)).toEqual(measured)
    },
  )

  it('answers the same ratios on a screen of 320 px', async () => {
    const page = await site.open('/systems/larkhaven/tokens', { as: 'engineer', size: NARROW })
    await page.getByRole('link', { name: 'sea.7' }).last().waitFor()
    const head = await measureHead(await api())
    await expectRatios(page, ['tokens'], { head })
    const measured = [...head.tokens.values()].filter(({ standing }) => standing.lowest !== null)
    expect((await readRatios(page)).ratios).toHaveLength(measured.length)
    await page.goto('/systems/larkhaven/breaches')
    await page
      .getByRole('link', { name: /^Breach / })
      .first()
      .press('Enter')
    await page.getByRole('heading', { name: 'History' }).waitFor()
    await expectRatios(page, ['breaches', 'history'], { head, events: await eventsOf(page) })
  })
})
