import type { GovernedSystem, GovernedTheme } from '#shared/checks/governed-model.ts'
import {
  type DistinctSet,
  type PairModel,
  type PrefixRules,
  STATES,
  type StateRules,
} from '#shared/checks/model.ts'
import { declarationOf } from '#shared/checks/pair-declaration.ts'
import type { SystemIndex } from '#shared/contracts/governed-system.ts'
import { pairFromWire } from '#shared/contracts/system-model.ts'
import {
  type Reading,
  readRuleScope,
  readStateRules,
  readTokenName,
} from '#shared/contracts/wire-values.ts'
import type { ImportFile } from './import-file.ts'
import type { ItemIds } from './import-names.rules.ts'
import { pairWithoutThemes, withoutThemes } from './import-themes.rules.ts'

interface ItemsOf {
  readonly index: SystemIndex
  readonly file: ImportFile
  readonly reading: Reading
  readonly keeps: boolean
  readonly ids: ItemIds
  /** As they will be. */
  readonly themes: readonly GovernedTheme[]
  readonly goneThemes: ReadonlySet<string>
}

/** The pairs as they will be: of the file each is the one of its id, else the one declared alike, else new. */
export function pairsOf(given: ItemsOf): readonly PairModel[] {
  const { index, file, keeps, goneThemes, reading } = given
  const standing = index.model.pairs
  const put = file.pairs === undefined ? new Map<string, PairModel>() : filePairs(given)
  const kept =
    keeps || file.pairs === undefined ? standing : standing.filter(({ id }) => put.has(id))
  const left = kept.flatMap((pair) => {
    const moved = put.get(pair.id) ?? pairWithoutThemes(pair, goneThemes)
    if (moved === undefined) {
      reading.faults.push({ pointer: '', detail: `Pair ${pair.id} occurs in removed themes alone` })
    }
    put.delete(pair.id)
    return moved ?? []
  })
  return [...left, ...put.values()]
}

function filePairs({ index, file, reading, ids, themes }: ItemsOf): Map<string, PairModel> {
  const byDeclaration = new Map(index.model.pairs.map((pair) => [declarationOf(pair), pair.id]))
  const put = new Map<string, PairModel>()
  const declared = new Set<string>()
  for (const { id, pair, pointer } of file.pairs ?? []) {
    const read = normal(pairFromWire({ ...pair, id: '' }, pointer, reading), themes)
    const declaration = declarationOf(read)
    if (declared.has(declaration)) {
      const detail = `${pair.foreground} on ${pair.background} is declared so twice`
      reading.faults.push({ pointer, detail })
    }
    declared.add(declaration)
    const own = id !== undefined && index.pairsById.has(id) ? id : undefined
    const known = [own, byDeclaration.get(declaration)].find((one) => one && !put.has(one))
    const key = known ?? ids('pair', declaration)
    put.set(key, { ...read, id: key })
  }
  return put
}

/** Lists that are sets, in one order and without doubles. */
function normal(pair: PairModel, themes: readonly GovernedTheme[]): PairModel {
  const { states, themes: own, ...rest } = pair
  return {
    ...rest,
    ...(states ? { states: STATES.filter((state) => states.includes(state)) } : {}),
    ...(own ? { themes: themes.flatMap(({ id }) => (own.includes(id) ? [id] : [])) } : {}),
  }
}

/** Where in a file the rules of the whole system stand. */
const RULES = '/$extensions/dev.dyewright/rules'

/** The rules of the system and of its prefixes as they will be. */
export function rulesOf({ index, file, reading, keeps, goneThemes }: ItemsOf): {
  readonly states: StateRules
  readonly prefixes: readonly PrefixRules[]
} {
  const { model } = index
  const standing = model.prefixes.map((scope) => withoutThemes(scope, goneThemes))
  if (file.rules === undefined) return { states: model.states, prefixes: standing }
  const states = readStateRules(file.rules.states, `${RULES}/states`, reading)
  const read = file.rules.prefixes.map(({ prefix, ...scope }, at) => ({
    prefix,
    ...readRuleScope(scope, `${RULES}/prefixes/${at}`, reading),
  }))
  const put = new Map(read.map((scope) => [scope.prefix, scope]))
  if (!keeps) return { states, prefixes: [...put.values()] }
  const prefixes = standing.map((scope) => put.get(scope.prefix) ?? scope)
  const placed = new Set(prefixes.map(({ prefix }) => prefix))
  return {
    states: { ...model.states, ...states },
    prefixes: [...prefixes, ...[...put.values()].filter(({ prefix }) => !placed.has(prefix))],
  }
}

/** The distinct sets as they will be, by id, else by name. */
export function distinctSetsOf({
  index,
  file,
  reading,
  keeps,
  ids,
}: ItemsOf): readonly DistinctSet[] {
  const standing = index.model.distinctSets ?? []
  if (file.distinctSets === undefined) return standing
  const put = new Map<string, DistinctSet>()
  for (const { id, name, tokens, pointer } of file.distinctSets) {
    const known = standing.find((set) => set.id === id) ?? standing.find((set) => set.name === name)
    const key = known?.id ?? ids('set', name)
    const members = tokens.map((token, at) =>
      readTokenName(token, `${pointer}/tokens/${at}`, reading),
    )
    put.set(key, { id: key, name, tokens: members })
  }
  const kept = standing.flatMap((set) => put.get(set.id) ?? (keeps ? [set] : []))
  const placed = new Set(kept.map(({ id }) => id))
  return [...kept, ...[...put.values()].filter(({ id }) => !placed.has(id))]
}

/** Where names of removed tokens still stand in a system. */
export function usesLeft(after: GovernedSystem, removed: ReadonlySet<string>) {
  const uses = new Map<string, Set<string>>()
  const note = (id: string | undefined, by: string) => {
    if (id !== undefined && removed.has(id)) uses.set(id, (uses.get(id) ?? new Set()).add(by))
  }
  const names = new Map(after.tokens.map(({ id, name }) => [id, name]))
  for (const { foreground, background, backdrop } of after.pairs) {
    const by = `a pair with ${names.get(foreground) ?? names.get(background) ?? 'another'}`
    for (const id of [foreground, background, ...(backdrop === 'unknown' ? [] : backdrop)]) {
      note(id, by)
    }
  }
  for (const { key, ground, ink } of after.themes) {
    note(ground, `theme ${key} as ground`)
    note(ink, `theme ${key} as ink`)
  }
  for (const { name, value, values, deprecated } of after.tokens) {
    const all = [value, ...Object.values(values).flatMap((states) => Object.values(states))]
    for (const one of all) if (one && one.kind !== 'color') note(one.token, name)
    note(deprecated?.replacement, `${name} as replacement`)
  }
  for (const { name, tokens } of after.distinctSets ?? []) {
    for (const id of tokens) note(id, `the distinct set ${name}`)
  }
  return uses
}
