import type { Page } from 'playwright-core'
import { listBreaches } from '#shared/contracts/breaches.contract.ts'
import type { ConsoleUnderTest, Opening } from './console-page.ts'

/** One address of each route of the console. */
export const PLACES = [
  'sign-in',
  'systems',
  'tokens',
  'token',
  'breaches',
  'opened breach',
  'not found',
] as const
export type PlaceName = (typeof PLACES)[number]

const SYSTEM = '/systems/larkhaven'

interface Place {
  readonly path: string
  readonly title: string
  /** What comes last, where the title does not. */
  readonly last?: string
}

const FIXED: Readonly<Record<Exclude<PlaceName, 'opened breach'>, Place>> = {
  'sign-in': { path: '/sign-in', title: 'Dyewright' },
  systems: { path: '/systems', title: 'Systems' },
  tokens: { path: `${SYSTEM}/tokens`, title: 'larkhaven' },
  token: {
    path: `${SYSTEM}/tokens/action.board.fill`,
    title: 'action.board.fill',
    last: 'Its pairs',
  },
  breaches: { path: `${SYSTEM}/breaches`, title: 'larkhaven' },
  'not found': { path: '/nowhere', title: 'Nothing here' },
}

async function placeOf(site: ConsoleUnderTest, name: PlaceName): Promise<Place> {
  if (name !== 'opened breach') return FIXED[name]
  const call = await site.api('maintainer')
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
  const { path, title, last } = await placeOf(site, name)
  const who = name === 'sign-in' ? {} : ({ as: 'maintainer' } as const)
  const page = await site.open(path, { ...who, ...opening })
  await page.getByRole('heading', { level: 1, name: title }).waitFor()
  if (last !== undefined) await page.getByRole('heading', { name: last }).waitFor()
  await page.evaluate(() => document.fonts.ready)
  return page
}
