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

/** An item that is both removed and put is put. */
function applyItemEdits<Item extends { readonly id: string }>(
  items: readonly Item[],
  edits: ItemEdits<Item> | undefined,
): readonly Item[] {
  if (!edits?.put?.length && !edits?.remove?.length) return items
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

/** The model as the edits leave it; the one given is untouched, and parts that did not change are shared. */
export function applyEdits(model: SystemModel, edits: SystemEdits): SystemModel {
  const distinctSets = applyItemEdits(model.distinctSets ?? [], edits.distinctSets)
  const remainder = edits.remainder === undefined ? model.remainder : (edits.remainder ?? undefined)
  return {
    settings: edits.settings ?? model.settings,
    states: edits.states ?? model.states,
    prefixes: edits.prefixes ?? model.prefixes,
    themes: edits.themes ?? model.themes,
    tokens: applyItemEdits(model.tokens, edits.tokens),
    pairs: applyItemEdits(model.pairs, edits.pairs),
    ...(distinctSets.length > 0 ? { distinctSets } : {}),
    ...(remainder === undefined ? {} : { remainder }),
  }
}
