import * as z from 'zod'
import type { TokenModel } from '#shared/checks/model.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import type { createCheck } from '#shared/contracts/checks.contract.ts'
import {
  derivedStateSchema,
  themeValuesInputSchema,
  tokenNameSchema,
} from '#shared/contracts/fields.ts'
import { faultsOf } from '#shared/contracts/faults.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import type { ParsedOf } from '#shared/contracts/route.ts'
import { ruleScopeSchema } from '#shared/contracts/rules.contract.ts'
import {
  pointerSegment,
  type Reading,
  readRuleScope,
  readStateValues,
  readThemeKey,
} from '#shared/contracts/wire-values.ts'
import { type JsonObject, objectOf } from '#shared/formats/dtcg-fault.ts'
import { type DtcgToken, readDtcgTokens } from '#shared/formats/dtcg-tokens.ts'
import { withStandingTokens } from '#shared/formats/dtcg-standing.ts'

export type CheckRequest = ParsedOf<typeof createCheck>['body']

/** A color token of a document that a caller sent. */
export interface CandidateToken {
  readonly name: string
  readonly value:
    | { readonly kind: 'color'; readonly color: Oklch }
    | { readonly kind: 'alias'; readonly name: string }
  /** Into the body. */
  readonly pointer: string
  readonly extension: Extension
}

/** What a document may say of a token beyond the format, under `$extensions` / `dev.dyewright`. */
export type Extension = z.infer<typeof extensionSchema>

const extensionSchema = z.looseObject({
  states: z.array(derivedStateSchema).max(4).optional(),
  values: themeValuesInputSchema.optional(),
  rules: ruleScopeSchema.optional(),
})

export type DocumentReading =
  | { readonly ok: true; readonly tokens: readonly CandidateToken[] }
  | { readonly ok: false; readonly faults: readonly Fault[] }

const EXTENSION = 'dev.dyewright'
const MOST_TOKENS = 20_000

/**
 * Reads the color tokens of a document; tokens of other types are none of a check's business.
 * @param stands whether a name that the document lacks may be referred to
 */
export function readTokenDocument(
  given: NonNullable<CheckRequest['tokens']>,
  stands: (name: string) => boolean,
): DocumentReading {
  const { document, standIns } = withStandingTokens(given, stands)
  const read = readDtcgTokens(document)
  const faults: Fault[] = read.faults.map(({ pointer, detail, code }) => ({
    pointer: `/tokens${pointer}`,
    detail,
    code,
  }))
  if (read.tokens.length > MOST_TOKENS) {
    faults.push({ pointer: '/tokens', detail: `A check takes ${MOST_TOKENS} tokens at most` })
  }
  if (faults.length > 0) return { ok: false, faults }
  const tokens = read.tokens
    .filter(({ name }) => !standIns.has(name))
    .map((token) => candidateToken(token, faults))
  faults.push(...namesMetTwice(tokens))
  return faults.length > 0 ? { ok: false, faults } : { ok: true, tokens }
}

/** Whether a document has anything at a name, readable or not. */
export function isWritten(given: JsonObject, name: string): boolean {
  let place: JsonObject | undefined = given
  for (const segment of name.split('.')) {
    if (place === undefined || !Object.hasOwn(place, segment)) return false
    place = objectOf(place[segment])
  }
  return true
}

function candidateToken(token: DtcgToken, faults: Fault[]): CandidateToken {
  const { name, value } = token
  const pointer = `/tokens${token.pointer}`
  for (const { message } of tokenNameSchema.safeParse(name).error?.issues ?? []) {
    faults.push({ pointer, detail: message })
  }
  const own = token.extensions?.[EXTENSION] ?? {}
  const extension = extensionSchema.safeParse(own)
  if (extension.error) {
    const at = `${pointer}/$extensions/${EXTENSION}`
    for (const fault of faultsOf(extension.error, own)) {
      faults.push({ ...fault, pointer: `${at}${fault.pointer}` })
    }
  }
  return { name, value, pointer, extension: extension.data ?? {} }
}

/** Names equal after NFC are one name to a reader. */
function namesMetTwice(tokens: readonly CandidateToken[]): Fault[] {
  const met = new Set<string>()
  return tokens.flatMap(({ name, pointer }) => {
    const composed = name.normalize('NFC')
    if (met.has(composed)) return { pointer, detail: `The name ${name} is given twice` }
    met.add(composed)
    return []
  })
}

/** The states, overrides and rules that a document gives a token, where it gives any. */
export function readExtension(
  { extension, pointer }: CandidateToken,
  reading: Reading,
): Partial<Pick<TokenModel, 'states' | 'values' | 'rules'>> {
  const at = `${pointer}/$extensions/${EXTENSION}`
  const { states, values, rules } = extension
  return {
    ...(states === undefined ? {} : { states: [...new Set(states)] }),
    ...(values === undefined ? {} : { values: readValues(values, `${at}/values`, reading) }),
    ...(rules === undefined ? {} : { rules: readRuleScope(rules, `${at}/rules`, reading) }),
  }
}

function readValues(
  given: NonNullable<Extension['values']>,
  at: string,
  reading: Reading,
): TokenModel['values'] {
  return Object.fromEntries(
    Object.entries(given).map(([theme, byState]) => {
      const pointer = `${at}/${pointerSegment(theme)}`
      return [readThemeKey(theme, pointer, reading), readStateValues(byState, pointer, reading)]
    }),
  )
}
