import type { Page } from 'playwright-core'
import type { Account } from '#scripts/demo/people.ts'
import { listBreaches } from '#shared/contracts/breaches.contract.ts'
import { listPairs } from '#shared/contracts/pairs.contract.ts'
import type { ConsoleUnderTest, Opening } from './console-page.ts'

/** One address of each route of the console. */
export const PLACES = [
  'sign-in',
  'systems',
  'tokens',
  'token',
  'import',
  'pairs',
  'pair',
  'new pair',
  'pair sheet',
  'coverage',
  'distinct sets',
  'breaches',
  'opened breach',
  'sightings',
  'settings',
  'themes',
  'theme',
  'new theme',
  'rules',
  'members',
  'keys',
  'not found',
] as const
export type PlaceName = (typeof PLACES)[number]

const SYSTEM = '/systems/larkhaven'

interface Place {
  readonly path: string
  readonly title: string
  /** What comes last, where the title does not. */
  readonly last?: string
  /** Who sees all of it; a maintainer where absent. */
  readonly as?: Account
}

const FIXED: Readonly<Record<Exclude<PlaceName, 'opened breach' | 'pair'>, Place>> = {
  'sign-in': { path: '/sign-in', title: 'Dyewright' },
  systems: { path: '/systems', title: 'Systems' },
  tokens: { path: `${SYSTEM}/tokens`, title: 'larkhaven' },
  token: {
    path: `${SYSTEM}/tokens/action.board.fill`,
    title: 'action.board.fill',
    last: 'Its pairs',
  },
  import: { path: `${SYSTEM}/import`, title: 'larkhaven', last: 'Import a file' },
  pairs: { path: `${SYSTEM}/pairs?order=short`, title: 'larkhaven' },
  'new pair': {
    path: `${SYSTEM}/new-pair?foreground=text.muted&background=chart.paper`,
    title: 'larkhaven',
    last: 'What it would measure',
  },
  'pair sheet': { path: `${SYSTEM}/pair-sheet`, title: 'larkhaven', last: 'surface.hull' },
  coverage: { path: `${SYSTEM}/coverage`, title: 'larkhaven', last: 'Pairs that nobody declared' },
  'distinct sets': {
    path: `${SYSTEM}/distinct-sets?set=new`,
    title: 'larkhaven',
    last: 'Make a set',
  },
  breaches: { path: `${SYSTEM}/breaches`, title: 'larkhaven' },
  sightings: { path: `${SYSTEM}/sightings`, title: 'larkhaven' },
  settings: { path: `${SYSTEM}/settings`, title: 'larkhaven', last: 'Protected branches' },
  themes: { path: `${SYSTEM}/themes`, title: 'larkhaven' },
  theme: { path: `${SYSTEM}/themes/dark`, title: 'dark', last: 'Remove it' },
  'new theme': {
    path: `${SYSTEM}/new-theme?from=light`,
    title: 'larkhaven',
    last: 'What it sets itself',
  },
  rules: { path: `${SYSTEM}/rules?of=prefix:action`, title: 'larkhaven', last: 'Governs' },
  members: { path: `${SYSTEM}/members`, title: 'larkhaven', last: 'Add somebody', as: 'admin' },
  keys: { path: `${SYSTEM}/keys`, title: 'larkhaven', last: 'Make a key' },
  'not found': { path: '/nowhere', title: 'Nothing here' },
}

async function placeOf(site: ConsoleUnderTest, name: PlaceName): Promise<Place> {
  if (name !== 'opened breach' && name !== 'pair') return FIXED[name]
  const call = await site.api('maintainer')
  if (name === 'pair') {
    const query = { token: 'status.delayed', limit: 1 }
    const [pair] = (await call(listPairs, { params: { system: 'larkhaven' }, query })).body.items
    const title = `${pair?.foreground} on ${pair?.background}`
    return { path: `${SYSTEM}/pairs/${pair?.id}`, title, last: 'Remove it' }
  }
  const { body } = await call(listBreaches, {
    params: { system: 'larkhaven' },
    query: { limit: 1 },
  })
  const path = `${SYSTEM}/breaches/${body.items[0]?.id}`
  return { path, title: 'larkhaven', last: 'History' }
}

/** Opens the page as a maintainer, but for the one to sign in at, and waits until it is whole. */
export async function openPlace(
  site: ConsoleUnderTest,
  name: PlaceName,
  opening: Opening = {},
): Promise<Page> {
  const { path, title, last, as = 'maintainer' } = await placeOf(site, name)
  const who = name === 'sign-in' ? {} : { as }
  const page = await site.open(path, { ...who, ...opening })
  await page.getByRole('heading', { level: 1, name: title }).waitFor()
  if (last !== undefined) await page.getByRole('heading', { name: last }).waitFor()
  await page.evaluate(() => document.fonts.ready)
  return page
}
