import type {
  DistinctSet,
  PairModel,
  PrefixRules,
  StateRules,
  SystemSettings,
} from '#shared/checks/model.ts'
import type { GovernedSystem, GovernedTheme, GovernedToken } from '#shared/checks/governed-model.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'

/** What becomes of the versions of one kind of item. */
export interface ItemChanges<Item> {
  /** Versions that end: of items edited or removed. */
  readonly closed: readonly string[]
  /** Versions that begin, with the place of the item in its list. */
  readonly opened: readonly { readonly item: Item; readonly position: number }[]
  /** Ids of the opened ones that were not there before. */
  readonly added: readonly string[]
}

/** The difference of two states of a system as versions to close and to open. */
export interface VersionChanges {
  readonly tokens: ItemChanges<GovernedToken>
  readonly pairs: ItemChanges<PairModel>
  readonly themes: ItemChanges<GovernedTheme>
  /** By prefix. */
  readonly prefixes: ItemChanges<PrefixRules>
  readonly distinctSets: ItemChanges<DistinctSet>
  readonly states?: StateRules
  readonly settings?: SystemSettings
  /** `null`: nothing is left of it. */
  readonly remainder?: string | null
}

/** Compares contents, so that an edit without net effect leaves no change. */
export function changesBetween(before: GovernedSystem, after: GovernedSystem): VersionChanges {
  const byId = ({ id }: { readonly id: string }) => id
  return {
    tokens: itemChanges(before.tokens, after.tokens, { keyOf: byId, placed: false }),
    pairs: itemChanges(before.pairs, after.pairs, { keyOf: byId, placed: false }),
    themes: itemChanges(before.themes, after.themes, { keyOf: byId, placed: true }),
    prefixes: itemChanges(before.prefixes, after.prefixes, {
      keyOf: ({ prefix }) => prefix,
      placed: true,
    }),
    distinctSets: itemChanges(before.distinctSets ?? [], after.distinctSets ?? [], {
      keyOf: byId,
      placed: false,
    }),
    ...(isSame(before.states, after.states) ? {} : { states: after.states }),
    ...(isSame(before.settings, after.settings) ? {} : { settings: after.settings }),
    ...(before.remainder === after.remainder ? {} : { remainder: after.remainder ?? null }),
  }
}

/** Whether nothing changes. */
export function isEmpty(changes: VersionChanges): boolean {
  const { tokens, pairs, themes, prefixes, distinctSets, states, settings, remainder } = changes
  const moved = [tokens, pairs, themes, prefixes, distinctSets].some(
    ({ closed, opened }) => closed.length > 0 || opened.length > 0,
  )
  return !moved && states === undefined && settings === undefined && remainder === undefined
}

interface ItemKind<Item> {
  readonly keyOf: (item: Item) => string
  /** The place in the list is part of the version. */
  readonly placed: boolean
}

function itemChanges<Item extends object>(
  before: readonly Item[],
  after: readonly Item[],
  { keyOf, placed }: ItemKind<Item>,
): ItemChanges<Item> {
  if (before === after) return { closed: [], opened: [], added: [] }
  const standing = new Map(before.map((item, position) => [keyOf(item), { item, position }]))
  const closed: string[] = []
  const opened: { item: Item; position: number }[] = []
  const added: string[] = []
  after.forEach((item, position) => {
    const key = keyOf(item)
    const old = standing.get(key)
    standing.delete(key)
    if (old && isSame(old.item, item) && !(placed && old.position !== position)) return
    opened.push({ item, position })
    ;(old ? closed : added).push(key)
  })
  closed.push(...standing.keys())
  return { closed, opened, added }
}

const isSame = (a: object, b: object) => a === b || canonicalJson(a) === canonicalJson(b)
