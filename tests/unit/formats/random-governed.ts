import type { Deprecation, GovernedSystem, GovernedToken } from '#shared/checks/governed-model.ts'
import type { DistinctSet, PairModel } from '#shared/checks/model.ts'
import type { Dice } from '#tests/unit/checks/random-system.ts'
import { randomSystem } from '#tests/unit/checks/random-system.ts'

/** What names may hold besides letters: nothing of it has a meaning in a token's name. */
const ENDS = ['', ' with spaces', '-🎨', '/slash', '%25', '~1~0', ' "quoted"', 'é', '#$ref', '"']
const GROUPS = ['', '', 'Timetable & quay', '__proto__', 'constructor', '12']

/** A system with all that a revision governs, under names that files have to take care of. */
export function randomGoverned(dice: Dice, size = 11): GovernedSystem {
  const model = randomSystem(dice, size)
  const ids = model.tokens.map(({ id }) => id)
  const themes = model.themes.map((theme) => ({
    ...theme,
    name: dice.pick([theme.key, `The “${theme.key}” one`]),
    rule: theme.rule ?? { kind: 'keep' as const },
  }))
  const tokens = model.tokens.map((token): GovernedToken => {
    const group = dice.pick(GROUPS)
    return {
      ...token,
      values: withoutEmpty(token.values),
      name: `${group === '' ? '' : `${group}.`}${token.name}${dice.pick(ENDS)}`,
      locked: dice.chance(0.2),
      ...dice.maybe(0.3, () => ({ description: dice.pick(['Board fill', '«Tinte» 🖋\n2', '{x}']) })),
      ...dice.maybe(0.3, () => ({ deprecated: deprecation(dice, ids) })),
    }
  })
  const sets = dice.some(['lines', 'zones'], 0.4).map(
    (name): DistinctSet => ({
      id: `set_${name}`,
      name,
      tokens: [...new Set([dice.pick(ids), dice.pick(ids), 'ground', 'ink'])],
    }),
  )
  return {
    ...model,
    themes,
    tokens,
    pairs: differently(model.pairs.map((pair) => worded(dice, pair))),
    ...(sets.length > 0 ? { distinctSets: sets } : {}),
    ...dice.maybe(0.6, () => ({ remainder: JSON.stringify(remainder(dice, { tokens, themes })) })),
  }
}

const withoutEmpty = (values: GovernedToken['values']): GovernedToken['values'] =>
  Object.fromEntries(Object.entries(values).filter(([, states]) => Object.keys(states).length > 0))

function deprecation(dice: Dice, ids: readonly string[]): Deprecation {
  return {
    ...dice.maybe(0.6, () => ({ reason: dice.pick(['Use the other', 'war «alt»']) })),
    ...dice.maybe(0.4, () => ({ replacement: dice.pick(ids) })),
    ...dice.maybe(0.4, () => ({ sunset: '2027-03-31' })),
  }
}

function worded(dice: Dice, { themes = [], ...pair }: PairModel): PairModel {
  const limits = themes.length > 0 ? { themes } : {}
  return {
    ...pair,
    ...limits,
    ...dice.maybe(0.3, () => ({ product: dice.pick(['kiosk', 'crew tablet']) })),
  }
}

/** The same declaration twice is refused, so products tell such pairs apart. */
const differently = (pairs: readonly PairModel[]): PairModel[] =>
  pairs.map((pair, at) => ({ ...pair, product: `${pair.product ?? 'site'} ${at}` }))

/** What a file brings that is no colour: other types, groups' own members, other vendors' words, a spelling. */
function remainder(dice: Dice, { tokens, themes }: Pick<GovernedSystem, 'tokens' | 'themes'>) {
  const [group = ''] = tokens[0]!.name.split('.')
  const owner = dice.pick(tokens)
  return {
    document: {
      $description: 'Brought along',
      $extensions: { 'org.example': { owner: 'quay', list: [1, null, { a: true }] } },
      space: { $type: 'dimension', small: { $value: { value: 4, unit: 'px' }, $description: 's' } },
      [group]: { $description: 'Of a group', $extensions: { 'org.example': 1 } },
    },
    tokens: { [owner.id]: { $extensions: { 'org.example': { note: 'kept' } }, hint: ['x', 1] } },
    ...dice.maybe(0.7, () => ({
      resolver: resolverParts(dice, {
        theme: themes.length > 1,
        state: tokens.some(({ states }) => states.length > 0),
      }),
    })),
  }
}

/** What a resolver file says of itself, its set and those modifiers that there are. */
function resolverParts(dice: Dice, has: { readonly theme: boolean; readonly state: boolean }) {
  const said = { description: dice.pick(['By day', '{x}']), $extensions: { 'org.example': [1] } }
  const root = {
    $schema: 'https://example.org/resolver.json',
    name: 'Quay',
    $defs: { sets: [null, { $ref: '#/nowhere' }] },
    'x~/y': 1,
    ...said,
  }
  return {
    root,
    ...dice.maybe(0.5, () => ({ core: said })),
    ...(has.theme ? dice.maybe(0.5, () => ({ theme: { ...said, order: 7 } })) : {}),
    ...(has.state ? dice.maybe(0.5, () => ({ state: said })) : {}),
  }
}
