import * as z from 'zod'
import type { Oklch } from '#shared/color/oklch.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { faultsOf } from '#shared/contracts/faults.ts'
import {
  derivedStateSchema,
  idSchema,
  themeValuesInputSchema,
  tokenNameSchema,
  type ValueInput,
  valueInputSchema,
} from '#shared/contracts/fields.ts'
import type { ImportNoteWire } from '#shared/contracts/import-outcome.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { ruleScopeSchema } from '#shared/contracts/rules.contract.ts'
import { deprecationSchema } from '#shared/contracts/tokens.contract.ts'
import { readDtcgColor } from '#shared/formats/dtcg-color.ts'
import type { JsonObject } from '#shared/formats/dtcg-fault.ts'
import { EXTENSION } from '#shared/formats/system-resolver.ts'
import { literalDigest } from '#shared/formats/literal-digest.ts'
import { withStandingTokens } from '#shared/formats/dtcg-standing.ts'
import { type DtcgToken, readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'
import { MOST_TOKENS } from './import-effort.rules.ts'
import type { FileToken, FileValue, FileValues } from './import-file.ts'
import type { OriginOf } from './import-origins.rules.ts'

/** What a file may say of a token beyond the format. */
const extensionSchema = z.looseObject({
  id: idSchema.optional(),
  value: valueInputSchema.optional(),
  states: z.array(derivedStateSchema).max(4).optional(),
  values: themeValuesInputSchema.optional(),
  rules: ruleScopeSchema.optional(),
  deprecated: deprecationSchema.optional(),
  locked: z.boolean().optional(),
  digest: z.string().optional(),
})

export const TOO_MANY: Fault = {
  pointer: '',
  detail: `A file has ${MOST_TOKENS} tokens at most`,
  code: 'too-many-tokens',
}

export interface TokensRead {
  readonly tokens: readonly FileToken[]
  readonly faults: readonly Fault[]
  readonly notes: readonly ImportNoteWire[]
  /** Derived colours that stand as they were written. */
  readonly derivedAgain: number
}

interface Place {
  /** Whether a name that the document lacks may be referred to. */
  readonly stands: (name: string) => boolean
  readonly originIn: (document: JsonObject) => OriginOf
}

/** Reads the colour tokens of one document, with what our own extension says of each; every fault at once. */
export function readTokens(given: JsonObject, { stands, originIn }: Place): TokensRead {
  const { document, standIns } = withStandingTokens(given, stands)
  const read = readDtcgTokens(document)
  const originOf = originIn(document)
  const faults: Fault[] = read.faults.map(({ pointer, detail, code }) => ({
    pointer: originOf(pointer),
    detail,
    code,
  }))
  if (read.tokens.length + read.others.length - standIns.size > MOST_TOKENS) {
    faults.push(TOO_MANY)
  }
  if (faults.length > 0) return { tokens: [], faults, notes: [], derivedAgain: 0 }
  const gathering: Gathering = { faults, notes: [], derivedAgain: 0 }
  const tokens = read.tokens
    .filter(({ name }) => !standIns.has(name))
    .map((token) => fileToken(token, originOf(token.pointer), gathering))
  return { ...gathering, tokens }
}

interface Gathering {
  readonly faults: Fault[]
  readonly notes: ImportNoteWire[]
  derivedAgain: number
}

function fileToken(token: DtcgToken, pointer: string, gathering: Gathering): FileToken {
  const { name, description, deprecated } = token
  const { faults } = gathering
  for (const { message } of tokenNameSchema.safeParse(name).error?.issues ?? []) {
    faults.push({ pointer, detail: message })
  }
  const at = `${pointer}/$extensions/${EXTENSION}`
  const own = token.extensions?.[EXTENSION] ?? {}
  const extension = extensionSchema.safeParse(own)
  for (const fault of extension.error ? faultsOf(extension.error, own) : []) {
    faults.push({ ...fault, pointer: `${at}${fault.pointer}` })
  }
  const { values, ...said } = extension.data ?? {}
  const ending = said.deprecated ?? (deprecated === undefined ? undefined : reasonOf(deprecated))
  return {
    pointer,
    name,
    value: sourceIn(token, { source: said.value, digest: said.digest, pointer }, gathering),
    ...(said.id === undefined ? {} : { id: said.id }),
    ...(said.states === undefined ? {} : { states: said.states }),
    ...(values === undefined ? {} : { values: fileValues(values) }),
    ...(said.rules === undefined ? {} : { rules: said.rules }),
    ...(said.locked === undefined ? {} : { locked: said.locked }),
    ...(description === undefined ? {} : { description }),
    ...(ending === undefined ? {} : { deprecated: ending }),
  }
}

interface Source {
  readonly source: ValueInput | undefined
  /** Of the value that was written beside it. */
  readonly digest: string | undefined
  readonly pointer: string
}

/** A colour that followed from a source still does, unless somebody changed it in the file. */
function sourceIn(
  { name, value }: DtcgToken,
  { source, digest, pointer }: Source,
  gathering: Gathering,
): FileValue {
  if (source === undefined) return value
  const written = value.kind === 'color' ? value.authored : `{${value.name}}`
  if (digest === literalDigest(written)) {
    gathering.derivedAgain += 1
    return fileValue(source)
  }
  const detail = `${name} was changed by hand, so it follows from no other token any more`
  gathering.notes.push({ kind: 'overridden', pointer, detail, token: name })
  return value
}

const MOST_REASON = 500
const reasonOf = (deprecated: true | string) =>
  deprecated === true || deprecated.trim() === ''
    ? {}
    : { reason: deprecated.trim().slice(0, MOST_REASON) }

const fileValues = (values: z.output<typeof themeValuesInputSchema>): Record<string, FileValues> =>
  Object.fromEntries(
    Object.entries(values).map(([theme, byState]) => [
      theme,
      Object.fromEntries(
        Object.entries(byState).flatMap(([state, value]) =>
          value === undefined ? [] : [[state, fileValue(value)]],
        ),
      ),
    ]),
  )

/** A value that a contract has taken, names unbraced. */
export function fileValue(value: ValueInput): FileValue {
  if (typeof value === 'string') {
    if (value.startsWith('{')) return { kind: 'alias', name: value.slice(1, -1) }
    const parsed = parseColor(value)
    return colorValue(parsed.ok ? parsed.color : undefined)
  }
  if ('derive' in value) {
    const { derive, ...adjustment } = value
    return { kind: 'derived', name: derive.slice(1, -1), ...adjustment }
  }
  const read = readDtcgColor(value)
  return colorValue(read.ok ? read.color : undefined)
}

function colorValue(color: Oklch | undefined): FileValue {
  if (color === undefined) throw new TypeError('A contract takes no value that is no colour')
  return { kind: 'color', color }
}
