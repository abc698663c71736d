import type {
  DistinctSet,
  PairModel,
  PrefixRules,
  StateRules,
  SystemModel,
  SystemSettings,
  ThemeModel,
  TokenModel,
} from './model.ts'

/** Items to put (replaced in place, new ones last) and ids to remove. */
export interface ItemEdits<Item> {
  readonly put?: readonly Item[]
  readonly remove?: readonly string[]
}

/** A set of edits to a system. Members other than tokens, pairs and distinct sets are given whole. */
export interface SystemEdits {
  readonly tokens?: ItemEdits<TokenModel>
  readonly pairs?: ItemEdits<PairModel>
  readonly themes?: readonly ThemeModel[]
  readonly prefixes?: readonly PrefixRules[]
  readonly states?: StateRules
  readonly settings?: SystemSettings
  readonly distinctSets?: ItemEdits<DistinctSet>
  /** `null` leaves none. */
  readonly remainder?: string | null
}

/** Items replaced in their places; undefined where one is new, or none can be found by position. */
function replaceItems<Item extends { readonly id: string }>(
  items: readonly Item[],
  put: readonly Item[],
  positions: ReadonlyMap<string, number> | undefined,
): Item[] | undefined {
  if (positions === undefined || !put.every(({ id }) => positions.has(id))) return undefined
  const result = [...items]
  for (const item of put) result[positions.get(item.id)!] = item
  return result
}

/** An item that is both removed and put is put. */
function applyItemEdits<Item extends { readonly id: string }>(
  items: readonly Item[],
  edits: ItemEdits<Item> | undefined,
  positions?: ReadonlyMap<string, number>,
): readonly Item[] {
  if (!edits?.put?.length && !edits?.remove?.length) return items
  const replaced = edits.remove?.length ? undefined : replaceItems(items, edits.put!, positions)
  if (replaced !== undefined) return replaced
  const put = new Map((edits.put ?? []).map((item) => [item.id, item]))
  const removed = new Set(edits.remove)
  const result: Item[] = []
  for (const item of items) {
    const replacement = put.get(item.id)
    if (replacement !== undefined) result.push(replacement)
    else if (!removed.has(item.id)) result.push(item)
    put.delete(item.id)
  }
  result.push(...put.values())
  return result
}

/**
 * The model as the edits leave it; the one given is untouched, and parts that did not change are shared.
 * @param positions of the model's tokens by id, where they are known: what is replaced is then not looked for
 */
export function applyEdits(
  model: SystemModel,
  edits: SystemEdits,
  positions?: ReadonlyMap<string, number>,
): SystemModel {
  const distinctSets = applyItemEdits(model.distinctSets ?? [], edits.distinctSets)
  const remainder = edits.remainder === undefined ? model.remainder : (edits.remainder ?? undefined)
  return {
    settings: edits.settings ?? model.settings,
    states: edits.states ?? model.states,
    prefixes: edits.prefixes ?? model.prefixes,
    themes: edits.themes ?? model.themes,
    tokens: applyItemEdits(model.tokens, edits.tokens, positions),
    pairs: applyItemEdits(model.pairs, edits.pairs),
    ...(distinctSets.length > 0 ? { distinctSets } : {}),
    ...(remainder === undefined ? {} : { remainder }),
  }
}
