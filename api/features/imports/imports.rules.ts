import { applyEdits } from '#shared/checks/edits.ts'
import type { GovernedEdits, GovernedSystem, GovernedToken } from '#shared/checks/governed-model.ts'
import type { ModelFault } from '#shared/checks/model.ts'
import {
  type Decision,
  refuse,
  refuseFaults,
  type SystemIndex,
} from '#shared/contracts/governed-system.ts'
import type { ImportWire } from '#shared/contracts/import-outcome.ts'
import type { Fault, ProblemCode } from '#shared/contracts/problems.ts'
import type { Reading } from '#shared/contracts/wire-values.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'
import { aliasesTooDeep } from './alias-depth.rules.ts'
import type { ImportFile } from './import-file.ts'
import { distinctSetsOf, pairsOf, rulesOf, usesLeft } from './import-items.rules.ts'
import { type Identities, identify, type ItemIds } from './import-names.rules.ts'
import { joinedRemainder, readRemainder } from './import-remainder.rules.ts'
import { filledThemes, type Span, themesOf, tokenWithoutThemes } from './import-themes.rules.ts'
import { tokensOf } from './import-tokens.rules.ts'

export interface ImportOptions {
  readonly mode: ImportWire['mode']
  readonly ids: ItemIds
  readonly span: Span
  /** Whether the caller may declare exemptions. */
  readonly exempts: boolean
}

/** What an import makes of a system, or every reason why it cannot. One fault and nothing changes. */
export function decideImport(
  index: SystemIndex,
  file: ImportFile,
  options: ImportOptions,
): Decision {
  const keeps = options.mode === 'merge'
  const identities = identify(index, file, { keeps, ids: options.ids })
  const reading: Reading = { names: identities.names, faults: [...identities.faults] }
  const after = afterImport(index, file, { identities, reading, options })
  if (reading.faults.length > 0) return refuseFaults(reading.faults)
  const pointerOf = pointersIn(file, identities)
  const refusal =
    deepRefusal(after, pointerOf) ??
    exemptRefusal(index, after, options) ??
    locked(index, after) ??
    used(index, after, identities)
  if (refusal) return refusal
  return { ok: true, edits: editsTo(index.model, after), pointerOf }
}

interface Importing {
  readonly identities: Identities
  readonly reading: Reading
  readonly options: ImportOptions
}

function afterImport(
  index: SystemIndex,
  file: ImportFile,
  { identities, reading, options }: Importing,
): GovernedSystem {
  const { ids, span, mode } = options
  const { model } = index
  const keeps = mode === 'merge'
  const given = { index, file, identities, reading, keeps, ids, span }
  const themes = themesOf(given)
  const stand = new Set(themes.map(({ id }) => id))
  const goneThemes = new Set(model.themes.flatMap(({ id }) => (stand.has(id) ? [] : [id])))
  const items = { ...given, themes, goneThemes }
  const put = tokensOf(given)
  const filled = filledThemes(merged(model, put, keeps), themes, { ...given, put })
  const distinctSets = distinctSetsOf(items)
  const remainder = remainderAfter(model.remainder, file, { keeps, names: reading.names })
  return {
    settings: file.settings ?? model.settings,
    ...rulesOf(items),
    themes,
    tokens: filled.map((token) => tokenWithoutThemes(token, goneThemes)),
    pairs: pairsOf(items),
    ...(distinctSets.length > 0 ? { distinctSets } : {}),
    ...(remainder === undefined ? {} : { remainder }),
  }
}

/** In the order of the ledger, new ones last. */
function merged(
  { tokens }: GovernedSystem,
  put: readonly GovernedToken[],
  keeps: boolean,
): GovernedToken[] {
  const byId = new Map(put.map((token) => [token.id, token]))
  const kept = tokens.flatMap((token) => {
    const next = byId.get(token.id)
    byId.delete(token.id)
    return next ?? (keeps ? token : [])
  })
  return [...kept, ...byId.values()]
}

/** Names of a file are ids from here on, so that a rename moves nothing. */
function remainderAfter(
  standing: string | undefined,
  { remainder }: ImportFile,
  { keeps, names }: { readonly keeps: boolean; readonly names: Reading['names'] },
): string | undefined {
  const byId = Object.entries(remainder.tokens).map(([name, rest]) => [
    names.tokenId(name) ?? name,
    rest,
  ])
  const own = { ...remainder, tokens: Object.fromEntries(byId) }
  const next = joinedRemainder(readRemainder(keeps ? standing : undefined), own)
  const isNew = canonicalJson(readRemainder(next)) !== canonicalJson(readRemainder(standing))
  return isNew ? next : standing
}

/** A theme resolves every token, and so counts its aliases; before there is one nothing does. */
function deepRefusal({ themes, tokens }: GovernedSystem, pointerOf: PointerOf) {
  if (themes.length > 0) return undefined
  const faults = aliasesTooDeep(tokens).map((fault): Fault => {
    const pointer = pointerOf(fault)
    return { ...(pointer === undefined ? {} : { pointer }), detail: fault.detail, code: fault.code }
  })
  return refuseEach('system-unresolvable', faults)
}

function exemptRefusal(index: SystemIndex, after: GovernedSystem, { exempts }: ImportOptions) {
  if (exempts) return undefined
  const isMoved = after.pairs.some(({ id, exempt }) => {
    const before = index.pairsById.get(id)?.exempt
    return exempt !== undefined && canonicalJson(before ?? {}) !== canonicalJson(exempt)
  })
  return isMoved
    ? refuse('role-missing', 'Only an accessibility-lead may exempt a pair')
    : undefined
}

/** A lock holds everything that a colour follows from, and the token itself. */
function locked({ model }: SystemIndex, after: GovernedSystem) {
  const next = new Map(after.tokens.map((token) => [token.id, token]))
  const part = ({ value, states, values, rules = {} }: GovernedToken) =>
    canonicalJson({ value, states, values, rules })
  const held = model.tokens.filter((token) => {
    if (!token.locked) return false
    const moved = next.get(token.id)
    if (moved === undefined) return true
    return moved.locked && moved !== token && part(moved) !== part(token)
  })
  return refuseEach(
    'token-locked',
    held.map(({ name }) => ({ detail: `${name} is locked` })),
  )
}

function used({ tokensById }: SystemIndex, after: GovernedSystem, identities: Identities) {
  const stand = new Set(after.tokens.map(({ id }) => id))
  const removed = new Set([...identities.unnamedTokens].filter((id) => !stand.has(id)))
  if (removed.size === 0) return undefined
  const faults = [...usesLeft(after, removed)].map(([id, by]) => ({
    detail: `${tokensById.get(id)?.name ?? id} is not in the file and is used by ${few([...by])}`,
  }))
  return refuseEach('token-in-use', faults)
}

const MOST_NAMED = 5
const few = (names: readonly string[]): string =>
  names.length <= MOST_NAMED
    ? names.join(', ')
    : `${names.slice(0, MOST_NAMED).join(', ')} and ${names.length - MOST_NAMED} more`

const refuseEach = (code: ProblemCode, faults: readonly Fault[]) =>
  faults.length === 0 ? undefined : refuse(code, few(faults.map(({ detail }) => detail)), faults)

/** The edits that lead there: what does not differ is no part of them. */
function editsTo(model: GovernedSystem, after: GovernedSystem): GovernedEdits {
  const { themes, states, prefixes, settings, remainder } = after
  return {
    tokens: itemEdits(model.tokens, after.tokens),
    pairs: itemEdits(model.pairs, after.pairs),
    distinctSets: itemEdits(model.distinctSets ?? [], after.distinctSets ?? []),
    ...(isSame(model.themes, themes) ? {} : { themes }),
    ...(isSame(model.states, states) ? {} : { states }),
    ...(isSame(model.prefixes, prefixes) ? {} : { prefixes }),
    ...(isSame(model.settings, settings) ? {} : { settings }),
    ...(model.remainder === remainder ? {} : { remainder: remainder ?? null }),
  }
}

function itemEdits<Item extends { readonly id: string }>(
  before: readonly Item[],
  after: readonly Item[],
) {
  const standing = new Map(before.map((item) => [item.id, item]))
  const put = after.filter((item) => {
    const old = standing.get(item.id)
    standing.delete(item.id)
    return old === undefined || !isSame(old, item)
  })
  return { put, remove: [...standing.keys()] }
}

const isSame = (a: unknown, b: unknown): boolean => a === b || canonicalJson(a) === canonicalJson(b)

type PointerOf = (fault: ModelFault) => string | undefined

function pointersIn(file: ImportFile, { tokens, themes }: Identities): PointerOf {
  const ofTokens = new Map([...tokens].map(([{ pointer }, id]) => [id, pointer]))
  const ofThemes = new Map([...themes].map(([{ pointer }, id]) => [id, pointer]))
  return ({ token, theme }) =>
    ofTokens.get(token ?? '') ?? ofThemes.get(theme ?? '') ?? (file.themes ? '' : undefined)
}

/** The system as the edits leave it. */
export const importedModel = (model: GovernedSystem, edits: GovernedEdits): GovernedSystem =>
  applyEdits(model, edits) as GovernedSystem
