import type { GovernedSystem } from '#shared/checks/governed-model.ts'
import { indexSystem } from '#shared/contracts/governed-system.ts'
import type { ImportChangeWire, ImportWire } from '#shared/contracts/import-outcome.ts'
import {
  presentPair,
  presentSettings,
  presentTheme,
  presentToken,
} from '#shared/contracts/present-items.ts'
import { writeRuleScope, writeStateRules } from '#shared/contracts/wire-values.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'

type Members = Readonly<Record<string, unknown>>
type Kind = ImportChangeWire['item']
type Tally = ImportWire['counts']['tokens']

/** An item that differs; its id on the sides that have it. */
export interface ItemChange {
  readonly id?: string
  readonly wire: ImportChangeWire
}

export interface ImportChanges {
  readonly changes: readonly ItemChange[]
  readonly counts: Omit<ImportWire['counts'], 'derivedAgain'>
}

/** What differs between two states of a system, item by item, in the words of the wire. */
export function importChanges(before: GovernedSystem, after: GovernedSystem): ImportChanges {
  const sides = [before, after].map(partsOf) as [Parts, Parts]
  const of = <Item extends Identified>(kind: Kind, part: (parts: Parts) => Listed<Item>) =>
    itemChanges(kind, part(sides[0]), part(sides[1]))
  const tokens = of('token', ({ tokens }) => tokens)
  const pairs = of('pair', ({ pairs }) => pairs)
  const themes = of('theme', ({ themes }) => themes)
  const distinctSets = of('distinct-set', ({ distinctSets }) => distinctSets)
  const whole = (['rules', 'settings', 'other'] as const).flatMap((kind) =>
    wholeChange(kind, sides[0][kind](), sides[1][kind]()),
  )
  return {
    changes: [themes, tokens, pairs, distinctSets].flatMap(({ changes }) => changes).concat(whole),
    counts: {
      tokens: tokens.tally,
      pairs: pairs.tally,
      themes: themes.tally,
      distinctSets: distinctSets.tally,
    },
  }
}

interface Identified {
  readonly id: string
}

/** Items of one kind, and how each is shown. */
interface Listed<Item extends Identified> {
  readonly items: readonly Item[]
  readonly nameOf: (item: Item) => string
  readonly show: (item: Item) => Members
}

type Parts = ReturnType<typeof partsOf>

function partsOf(model: GovernedSystem) {
  const { names } = indexSystem(model)
  const tokenName = (id: string) => names.tokenName(id)
  const listed = <Item extends Identified>(list: Listed<Item>) => list
  return {
    tokens: listed({
      items: model.tokens,
      nameOf: ({ name }) => name,
      show: (token) => presentToken(token, names) as unknown as Members,
    }),
    pairs: listed({
      items: model.pairs,
      nameOf: ({ foreground, background }) =>
        `${tokenName(foreground)} on ${tokenName(background)}`,
      show: (pair) => presentPair(pair, names) as Members,
    }),
    themes: listed({
      items: model.themes,
      nameOf: ({ key }) => key,
      show: (theme) => presentTheme(theme, { model, names }) as Members,
    }),
    distinctSets: listed({
      items: model.distinctSets ?? [],
      nameOf: ({ name }) => name,
      show: ({ name, tokens }) => ({ name, tokens: tokens.map(tokenName) }),
    }),
    rules: (): Members => ({
      states: writeStateRules(model.states, names),
      prefixes: model.prefixes.map(({ prefix, ...scope }) => ({
        prefix,
        ...writeRuleScope(scope, names),
      })),
    }),
    settings: (): Members => presentSettings(model.settings),
    other: (): Members => (model.remainder === undefined ? {} : JSON.parse(model.remainder)),
  }
}

function itemChanges<Item extends Identified>(
  item: Kind,
  before: Listed<Item>,
  after: Listed<Item>,
): { readonly changes: ItemChange[]; readonly tally: Tally } {
  const standing = new Map(before.items.map((one) => [one.id, one]))
  const changes: ItemChange[] = []
  const tally = { added: 0, edited: 0, removed: 0, unchanged: 0 }
  for (const next of after.items) {
    const old = standing.get(next.id)
    standing.delete(next.id)
    if (old === next || (old && canonicalJson(old) === canonicalJson(next))) {
      tally.unchanged += 1
      continue
    }
    const name = after.nameOf(next)
    const shown = after.show(next)
    tally[old ? 'edited' : 'added'] += 1
    const wire: ImportChangeWire = old
      ? { item, operation: 'edited', name, ...difference(before.show(old), shown) }
      : { item, operation: 'added', name, after: shown }
    changes.push({ id: next.id, wire })
  }
  for (const old of standing.values()) {
    tally.removed += 1
    const [name, shown] = [before.nameOf(old), before.show(old)]
    changes.push({ id: old.id, wire: { item, operation: 'removed', name, before: shown } })
  }
  return { changes, tally }
}

function wholeChange(item: Kind, before: Members, after: Members): ItemChange[] {
  const moved = difference(before, after)
  return Object.keys({ ...moved.before, ...moved.after }).length === 0
    ? []
    : [{ wire: { item, operation: 'edited', name: item, ...moved } }]
}

/** The members that differ, on both sides. */
function difference(before: Members, after: Members) {
  const moved = [...new Set([...Object.keys(before), ...Object.keys(after)])].filter(
    (member) => canonicalJson(before[member] ?? null) !== canonicalJson(after[member] ?? null),
  )
  const part = (members: Members) =>
    Object.fromEntries(moved.flatMap((name) => (name in members ? [[name, members[name]]] : [])))
  return { before: part(before), after: part(after) }
}
