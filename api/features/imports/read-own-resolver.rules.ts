import type { ImportNoteWire } from '#shared/contracts/import-outcome.ts'
import { type State, STATES } from '#shared/checks/model.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { readDtcgColor } from '#shared/formats/dtcg-color.ts'
import { isToken } from '#shared/formats/dtcg-document.ts'
import { type JsonObject, objectOf, pointerTo } from '#shared/formats/dtcg-fault.ts'
import { mergedDocument } from '#shared/formats/dtcg-merge.ts'
import { literalDigest } from '#shared/formats/literal-digest.ts'
import {
  CORE,
  EXTENSION,
  type ResolverBesides,
  STATE,
  stateGroup,
  THEME,
} from '#shared/formats/system-resolver.ts'
import type { RootSaid } from './import-extension.rules.ts'
import type { FileToken, FileValue, FileValues } from './import-file.ts'
import { originsOf } from './import-origins.rules.ts'
import { remainderOf } from './import-remainder.rules.ts'
import type { ImportReading } from './read-import.rules.ts'
import { readTokens } from './read-tokens.rules.ts'

interface OwnFile {
  readonly said: RootSaid
  readonly stands: (name: string) => boolean
  readonly besides: ResolverBesides
}

/**
 * Reads a resolver file that this service wrote: sources and what is set stand in its set and its extensions;
 * every other colour was derived, and is again, unless somebody changed it in the file.
 */
export function readOwnResolver(
  file: JsonObject,
  { said, stands, besides }: OwnFile,
): ImportReading {
  const core = mergedDocument(documentsAt(file, ['sets', CORE, 'sources']))
  const groups = new Set(STATES.map(stateGroup))
  const sources = Object.fromEntries(Object.entries(core).filter(([name]) => !groups.has(name)))
  const read = readTokens(sources, { stands, originIn: originsOf(file) })
  const literals = [
    ...stateLiterals(core, {
      theme: said.themes?.[0]?.key ?? '',
      pointer: `/sets/${CORE}/sources/0`,
    }),
    ...(said.themes ?? []).slice(1).flatMap(({ key }) => themeLiterals(file, key)),
  ]
  const names = new Set(read.tokens.map(({ name }) => name))
  // Where a source cannot be read, which tokens there are is not known.
  const changed = changedLiterals(literals, (name) => read.faults.length > 0 || names.has(name))
  const faults = [...read.faults, ...changed.faults]
  if (faults.length > 0) return { ok: false, faults }
  return {
    ok: true,
    file: {
      ...said,
      tokens: withOverrides(inLedgerOrder(read.tokens, said.ledger), changed.overrides),
      remainder: { ...remainderOf(sources, (name) => names.has(name)), resolver: besides },
      notes: [...read.notes, ...changed.notes, ...otherStates(file)],
      derivedAgain: read.derivedAgain + changed.derivedAgain,
    },
  }
}

/** The documents of a list of sources; a file of ours has no other sets that it could name. */
function documentsAt(file: JsonObject, path: readonly string[]): JsonObject[] {
  let place: unknown = file
  for (const name of path) place = objectOf(place)?.[name]
  const sources: readonly unknown[] = Array.isArray(place) ? place : []
  return sources.map(objectOf).filter((source) => source !== undefined)
}

/** A colour of one token in one theme and state. */
interface Literal {
  readonly name: string
  readonly theme: string
  readonly state: State
  readonly token: JsonObject
  readonly pointer: string
}

interface Under {
  readonly theme: string
  readonly pointer: string
}

const themeLiterals = (file: JsonObject, theme: string): Literal[] =>
  documentsAt(file, ['modifiers', THEME, 'contexts', theme]).flatMap((document, at) => {
    const pointer = `${pointerTo(`/modifiers/${THEME}/contexts`, theme)}/${at}`
    const groups = STATES.map(stateGroup)
    const rest = Object.fromEntries(
      Object.entries(document).filter(([name]) => !groups.includes(name)),
    )
    return [
      ...tokensUnder(rest, pointer).map((found) => ({ ...found, theme, state: 'rest' as const })),
      ...stateLiterals(document, { theme, pointer }),
    ]
  })

const stateLiterals = (document: JsonObject, { theme, pointer }: Under): Literal[] =>
  STATES.flatMap((state) => {
    const group = objectOf(document[stateGroup(state)])
    const at = pointerTo(pointer, stateGroup(state))
    return group ? tokensUnder(group, at).map((found) => ({ ...found, theme, state })) : []
  })

function tokensUnder(root: JsonObject, from: string) {
  const found: { name: string; token: JsonObject; pointer: string }[] = []
  const waiting = [{ node: root, name: '', pointer: from }]
  for (let place = waiting.pop(); place; place = waiting.pop()) {
    for (const [member, value] of Object.entries(place.node).reverse()) {
      const node = objectOf(value)
      if (node === undefined || (member.startsWith('$') && member !== '$root')) continue
      const name = place.name === '' ? member : `${place.name}.${member}`
      const pointer = pointerTo(place.pointer, member)
      if (isToken(node)) found.push({ name, token: node, pointer })
      else waiting.push({ node, name, pointer })
    }
  }
  return found
}

interface Changed {
  readonly overrides: Map<string, Record<string, FileValues>>
  readonly notes: ImportNoteWire[]
  readonly faults: Fault[]
  derivedAgain: number
}

function changedLiterals(
  literals: readonly Literal[],
  hasSource: (name: string) => boolean,
): Changed {
  const changed: Changed = { overrides: new Map(), notes: [], faults: [], derivedAgain: 0 }
  for (const literal of literals) {
    const { name, theme, state, token, pointer } = literal
    const said = objectOf(objectOf(token.$extensions)?.[EXTENSION]) ?? {}
    if (said.digest === literalDigest(token.$value)) {
      changed.derivedAgain += said.rule === undefined ? 0 : 1
      continue
    }
    if (!hasSource(name)) {
      changed.faults.push({ pointer, detail: `${name} has no source in the set ${CORE}` })
      continue
    }
    const value = fileValueOf(token.$value, `${pointer}/$value`, changed.faults)
    if (value === undefined) continue
    const own = changed.overrides.get(name) ?? {}
    changed.overrides.set(name, { ...own, [theme]: { ...own[theme], [state]: value } })
    const detail = `${name} is set by hand in ${theme}, ${state}`
    changed.notes.push({ kind: 'overridden', pointer, detail, token: name, theme, state })
  }
  return changed
}

function fileValueOf(given: unknown, pointer: string, faults: Fault[]): FileValue | undefined {
  const alias = typeof given === 'string' ? /^\{([^{}]+)\}$/.exec(given)?.[1] : undefined
  if (alias !== undefined) return { kind: 'alias', name: alias }
  const read = readDtcgColor(given)
  if (read.ok) return { kind: 'color', color: read.color }
  for (const { detail, code, ...fault } of read.faults) {
    faults.push({ pointer: `${pointer}${fault.pointer}`, detail, code })
  }
  return undefined
}

/** What the ledger does not name comes last, as what is new does. */
function inLedgerOrder(
  tokens: readonly FileToken[],
  ledger: readonly string[] = [],
): readonly FileToken[] {
  const places = new Map(ledger.map((name, at) => [name, at]))
  const placeOf = ({ name }: FileToken) => places.get(name) ?? ledger.length
  return tokens.toSorted((a, b) => placeOf(a) - placeOf(b))
}

function withOverrides(
  tokens: readonly FileToken[],
  overrides: Changed['overrides'],
): readonly FileToken[] {
  if (overrides.size === 0) return tokens
  return tokens.map((token) => {
    const own = overrides.get(token.name)
    if (own === undefined) return token
    const themes = Object.entries(own).map(([theme, states]) => [
      theme,
      { ...token.values?.[theme], ...states },
    ])
    return { ...token, values: { ...token.values, ...Object.fromEntries(themes) } }
  })
}

/** The contexts of states hold references alone: what else somebody wrote there has no theme to belong to. */
function otherStates(file: JsonObject): ImportNoteWire[] {
  return STATES.flatMap((state) =>
    documentsAt(file, ['modifiers', STATE, 'contexts', state]).flatMap((document, at) => {
      const pointer = `/modifiers/${STATE}/contexts/${state}/${at}`
      return tokensUnder(document, pointer)
        .filter(({ name, token }) => token.$value !== `{${stateGroup(state)}.${name}}`)
        .map(({ name, pointer: where }) => ({
          kind: 'left-out' as const,
          pointer: where,
          detail: `${name} in ${state} is read from the group ${stateGroup(state)}`,
          token: name,
        }))
    }),
  )
}
