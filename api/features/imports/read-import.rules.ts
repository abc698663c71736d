import type { ImportNoteWire } from '#shared/contracts/import-outcome.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'
import { type JsonObject, pointerTo } from '#shared/formats/dtcg-fault.ts'
import { type DtcgResolver, readDtcgResolver } from '#shared/formats/dtcg-resolver.ts'
import { readRootExtension } from './import-extension.rules.ts'
import { hasTooMany, isResolver } from './import-effort.rules.ts'
import { MOST_THEMES, tooManyThemes } from './import-themes.rules.ts'
import type { FileTheme, FileToken, FileValues, ImportFile } from './import-file.ts'
import { originsOf } from './import-origins.rules.ts'
import {
  joinedRemainder,
  readRemainder,
  type Remainder,
  remainderOf,
} from './import-remainder.rules.ts'
import { withColorObjects } from './legacy-hex.rules.ts'
import { readOwnResolver } from './read-own-resolver.rules.ts'
import { readStyleSheet } from './read-style-sheet.rules.ts'
import { foreignBesides, ownBesides } from './resolver-besides.rules.ts'
import { readTokens, TOO_MANY, type TokensRead } from './read-tokens.rules.ts'

export type ImportReading =
  | { readonly ok: true; readonly file: ImportFile }
  | { readonly ok: false; readonly faults: readonly Fault[] }

export interface ReadOptions {
  /** Whether a name that the file lacks may be referred to. */
  readonly stands: (name: string) => boolean
  /** Colours of older files, text of hexadecimal digits, are read too. */
  readonly legacyHex: boolean
  /** Hyphens of custom properties part groups. */
  readonly hyphensAsDots?: boolean
}

/** Reads a token file, a resolver file or a style sheet, or tells every fault of it with its place. */
export function readImport(given: JsonObject | string, options: ReadOptions): ImportReading {
  if (hasTooMany(given)) return { ok: false, faults: [TOO_MANY] }
  if (typeof given !== 'string') return readDocument(given, options)
  const { stands, hyphensAsDots = false } = options
  const sheet = readStyleSheet(given, { stands, hyphensAsDots })
  if (!sheet.ok) return sheet
  const read = readDocument(sheet.document, options)
  return read.ok ? withNotes(read.file, sheet.notes) : read
}

const withNotes = (file: ImportFile, notes: readonly ImportNoteWire[]): ImportReading => ({
  ok: true,
  file: notes.length === 0 ? file : { ...file, notes: [...notes, ...file.notes] },
})

function readDocument(given: JsonObject, options: ReadOptions): ImportReading {
  const { document, notes } = options.legacyHex
    ? withColorObjects(given)
    : { document: given, notes: [] }
  const read = isResolver(document)
    ? readResolver(document, options)
    : readTokenFile(document, options)
  return read.ok ? withNotes(read.file, notes) : read
}

function readTokenFile(document: JsonObject, { stands }: ReadOptions): ImportReading {
  const root = readRootExtension(document)
  const read = readTokens(document, { stands, originIn: () => (pointer) => pointer })
  const faults = [...(root.ok ? [] : root.faults), ...read.faults]
  if (!root.ok || faults.length > 0) return { ok: false, faults }
  const names = new Set(read.tokens.map(({ name }) => name))
  return {
    ok: true,
    file: {
      ...root.said,
      ...tokensIn(read),
      remainder: remainderOf(document, (name) => names.has(name)),
    },
  }
}

const tokensIn = ({ tokens, notes, derivedAgain }: TokensRead) => ({ tokens, notes, derivedAgain })

function readResolver(document: JsonObject, options: ReadOptions): ImportReading {
  const root = readRootExtension(document)
  const read = readDtcgResolver(document)
  const faults = [...(root.ok ? [] : root.faults), ...(read.ok ? [] : read.faults)]
  if (!root.ok || !read.ok) return { ok: false, faults }
  return root.said.isWhole
    ? readOwnResolver(document, {
        said: root.said,
        stands: options.stands,
        besides: ownBesides(document, read.resolver),
      })
    : readForeignResolver(document, read.resolver, options)
}

/** The modifier whose contexts become themes: the one called theme, else the first. */
const themeModifier = ({ modifiers }: DtcgResolver) =>
  modifiers.find(({ name }) => name === 'theme') ?? modifiers[0]

function readForeignResolver(
  document: JsonObject,
  resolver: DtcgResolver,
  { stands }: ReadOptions,
): ImportReading {
  const originIn = originsOf(document)
  const modifier = themeModifier(resolver)
  const others = resolver.modifiers.filter((other) => other !== modifier)
  const open = others.filter((other) => other.default === undefined)
  if (open.length > 0) {
    const faults = open.map(({ name }) => ({
      pointer: pointerTo('/modifiers', name),
      detail: `The contexts of ${modifier?.name} become themes; of ${name} the default does, and it has none`,
    }))
    return { ok: false, faults }
  }
  const contexts = modifier === undefined ? [undefined] : contextsOf(modifier)
  // Each is a whole document: what is refused anyway is not read many times over.
  if (modifier !== undefined && contexts.length > MOST_THEMES) {
    return { ok: false, faults: [tooManyThemes(pointerTo('/modifiers', modifier.name))] }
  }
  const readings = contexts.map((context) => {
    const choice = resolver.documentFor(
      modifier === undefined || context === undefined ? {} : { [modifier.name]: context },
    )
    const merged = choice.ok ? choice.document : {}
    return { context, document: merged, ...readTokens(merged, { stands, originIn }) }
  })
  const themes = modifier === undefined ? undefined : themesOf(modifier.name, contexts)
  const faults = distinct([
    ...readings.flatMap((reading) => reading.faults),
    ...themeFaults(themes ?? []),
  ])
  const [base] = readings
  if (faults.length > 0 || base === undefined) return { ok: false, faults }
  const lacking = lackingInBase(readings)
  const said = foreignBesides(document, resolver, modifier?.name)
  return {
    ok: true,
    file: {
      isWhole: false,
      tokens: withThemeValues([...base.tokens, ...lacking.tokens], {
        readings,
        themes: themes ?? [],
      }),
      ...(themes ? { themes } : {}),
      remainder: { ...remainderIn(base), resolver: said.besides },
      notes: [
        ...base.notes,
        ...lacking.notes,
        ...others.map(leftOut),
        ...said.notes,
        ...besideBase(readings, themes ?? []),
      ],
      derivedAgain: base.derivedAgain,
    },
  }
}

const contextsOf = ({ contexts, ...modifier }: DtcgResolver['modifiers'][number]) => {
  const base = modifier.default ?? contexts[0]
  return [base, ...contexts.filter((context) => context !== base)]
}

const themesOf = (modifier: string, contexts: readonly (string | undefined)[]): FileTheme[] =>
  contexts.map((context = '') => ({
    pointer: pointerTo(`${pointerTo('/modifiers', modifier)}/contexts`, context),
    key: slugOf(context),
    name: context,
  }))

const slugOf = (text: string): string =>
  text
    .normalize('NFKD')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-|-$/g, '')
    .slice(0, 63)

function themeFaults(themes: readonly FileTheme[]): Fault[] {
  const met = new Set<string>()
  return themes.flatMap(({ key, name, pointer }) => {
    if (key === '') return { pointer, detail: `No theme key can be made of the name ${name}` }
    if (met.has(key)) return { pointer, detail: `Two contexts come to the theme key ${key}` }
    met.add(key)
    return []
  })
}

interface ContextReading extends TokensRead {
  readonly context: string | undefined
  readonly document: JsonObject
}

function remainderIn({ tokens, document }: ContextReading): Remainder {
  const names = new Set(tokens.map(({ name }) => name))
  return remainderOf(document, (name) => names.has(name))
}

/** Themes hold colours alone: of what is none, a system keeps what the base says. */
function besideBase(
  [base, ...others]: readonly ContextReading[],
  [, ...themes]: readonly FileTheme[],
): ImportNoteWire[] {
  if (base === undefined || others.length === 0) return []
  const kept = remainderIn(base)
  const text = canonicalJson(kept)
  return others.flatMap((other, at): ImportNoteWire[] => {
    const both = readRemainder(joinedRemainder(kept, remainderIn(other)))
    if (canonicalJson(both) === text) return []
    const detail = `What is no colour is kept as in ${base.context}: what ${other.context} says otherwise is not`
    return [{ kind: 'left-out', pointer: themes[at]?.pointer ?? '', detail }]
  })
}

/** A token has a value in every theme: where the base has none, it is as in the first context that has one. */
function lackingInBase([base, ...others]: readonly ContextReading[]) {
  const names = new Set(base?.tokens.map(({ name }) => name))
  const tokens: FileToken[] = []
  const notes: ImportNoteWire[] = []
  for (const { context, tokens: there } of others) {
    for (const token of there) {
      const { name, pointer } = token
      if (names.has(name)) continue
      names.add(name)
      tokens.push(token)
      const detail = `${name} has no value in ${base?.context}, the base: there it is as in ${context}`
      notes.push({ kind: 'converted', pointer, detail, token: name })
    }
  }
  return { tokens, notes }
}

/** A theme sets what differs from the base. */
function withThemeValues(
  tokens: readonly FileToken[],
  given: { readonly readings: readonly ContextReading[]; readonly themes: readonly FileTheme[] },
): FileToken[] {
  const [, ...others] = given.readings
  const [, ...themes] = given.themes
  const byTheme = others.map(
    (context) => new Map(context.tokens.map((token) => [token.name, token.value])),
  )
  return tokens.map((token) => {
    const values: Record<string, FileValues> = {}
    themes.forEach(({ key }, at) => {
      const value = byTheme[at]?.get(token.name)
      if (value === undefined || canonicalJson(value) === canonicalJson(token.value)) return
      values[key] = { ...token.values?.[key], rest: value }
    })
    if (Object.keys(values).length === 0) return token
    return { ...token, values: { ...token.values, ...values } }
  })
}

const leftOut = ({ name, ...other }: DtcgResolver['modifiers'][number]): ImportNoteWire => ({
  kind: 'left-out',
  pointer: pointerTo('/modifiers', name),
  detail: `Of the modifier ${name} only its default, ${other.default}, was read`,
})

/** What stands in every choice is told once. */
function distinct(faults: readonly Fault[]): Fault[] {
  return [...new Map(faults.map((each) => [`${each.pointer} ${each.detail}`, each])).values()]
}
