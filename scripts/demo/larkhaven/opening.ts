import { meanings } from './meanings.ts'
import { pairs } from './pairs.ts'
import { palette } from './palette.ts'
import type { DemoPair, DemoToken, Person, Step } from './step.ts'
import { rules, themes } from './themes.ts'

const AUTHORS: Readonly<Record<string, Person>> = {
  surface: 'maintainer',
  text: 'maintainer',
  action: 'maintainer',
  chart: 'pelle',
  tide: 'pelle',
  map: 'pelle',
  seat: 'sanna',
  sign: 'sanna',
  crew: 'sanna',
}
const authorOf = (name: string): Person => AUTHORS[name.split('.')[0] ?? ''] ?? 'maintainer'

const valueByName = new Map([...meanings, ...palette].map(({ name, value }) => [name, value]))
const isMeaning = new Set(meanings.map(({ name }) => name))

/** The token that a value follows. */
const followed = (value: DemoToken['value']): string | undefined => {
  const braced = typeof value === 'object' && 'derive' in value ? value.derive : value
  return typeof braced === 'string' && braced.startsWith('{') ? braced.slice(1, -1) : undefined
}

/** What a token held before the palette was drawn out of it: the colour itself. */
const literalOf = (value: DemoToken['value']): DemoToken['value'] => {
  const name = followed(value)
  if (name === undefined) return value
  const target = valueByName.get(name)
  if (target === undefined) throw new TypeError(`The demo has no token ${name}`)
  return literalOf(target)
}

/** Meanings come first in the ledger and follow the palette, which comes after: so they start as colours. */
const asColors = meanings.map(({ rules: _, ...token }): Step => {
  const target = followed(token.value)
  const isReady = target !== undefined && isMeaning.has(target)
  const value = isReady ? token.value : literalOf(token.value)
  return { by: authorOf(token.name), kind: 'create-token', body: { ...token, value } }
})

const followPalette = meanings.flatMap(({ name, value, rules: own }): Step[] => {
  const target = followed(value)
  const follows = target !== undefined && !isMeaning.has(target)
  if (!follows && own === undefined) return []
  const message = follows ? `Takes its colour from ${target}` : 'A rule of its own'
  const body = { ...(follows ? { value } : {}), ...(own ? { rules: own } : {}), message }
  return [{ by: authorOf(name), kind: 'patch-token', name, body }]
})

const PRODUCT_AUTHORS: Readonly<Record<string, Person>> = {
  'quayside-kiosk': 'pelle',
  'crew-tablet': 'sanna',
}

/** A pair that joins a group lets another off: that is not for a maintainer alone. */
const joinsGroup = ({ anyOf }: DemoPair, at: number): boolean =>
  anyOf !== undefined && pairs.findIndex((other) => other.anyOf === anyOf) < at

const declare = (pair: DemoPair, at: number): Step => ({
  by: joinsGroup(pair, at) ? 'admin' : (PRODUCT_AUTHORS[pair.product ?? ''] ?? 'maintainer'),
  kind: 'create-pair',
  body: { ...pair, message: `Declared for the ${pair.product?.replace('-', ' ')}` },
})

/** What must stay tellable apart on the charts, the board and the seat plan. */
const distinctSets: readonly Step[] = [
  {
    by: 'pelle',
    kind: 'create-distinct-set',
    body: {
      name: 'Routes on the chart',
      tokens: [1, 2, 3, 4, 5, 6].map((route) => `chart.route.${route}`),
      message: 'Six lines that cross',
    },
  },
  {
    by: 'maintainer',
    kind: 'create-distinct-set',
    body: {
      name: 'Status of a sailing',
      tokens: ['ontime', 'delayed', 'cancelled', 'boarding'].map((status) => `status.${status}`),
      message: 'Told apart at a glance, also by those who see no red',
    },
  },
]

/** How the ledger came to be: meanings, palette, themes, rules, what stands on what, and what is kept apart. */
export const opening: readonly Step[] = [
  ...asColors,
  ...palette.map((body): Step => ({ by: 'maintainer', kind: 'create-token', body })),
  ...themes.map((theme): Step => ({ by: 'maintainer', kind: 'put-theme', theme })),
  { by: 'maintainer', kind: 'put-rules', body: rules },
  ...followPalette,
  ...pairs.map(declare),
  ...distinctSets,
]
