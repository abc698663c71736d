import { numberText, readNumber } from '#console/lib/read-number.ts'
import type { SystemEdits } from '#shared/checks/edits.ts'
import {
  EXEMPTIONS,
  type ExemptionKind,
  type Level,
  type Relation,
  STATES,
  type State,
  type SystemModel,
  type Use,
} from '#shared/checks/model.ts'
import type { PairInput, PairWire } from '#shared/contracts/pairs.contract.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { pairFromWire } from '#shared/contracts/system-model.ts'

/** A pair as its fields hold it: text where a person writes. */
export interface PairFields {
  readonly foreground: string
  readonly background: string
  readonly use: Use
  readonly relation: Relation
  /** Bottom first, on the ground; or not known. */
  readonly backdrop: readonly string[] | 'unknown'
  /** Absent: all. */
  readonly states: readonly State[] | undefined
  readonly themes: readonly string[] | undefined
  readonly level: Level | 'system'
  readonly minimum: string
  readonly anyOf: string
  readonly product: string
  readonly exempt: ExemptionKind | 'none'
  readonly reason: string
}

/** What is edited of a pair; absent members stay as they are. */
export type PairDraft = { readonly [member in keyof PairFields]?: PairFields[member] }

export const EMPTY_PAIR: PairFields = {
  foreground: '',
  background: '',
  use: 'text',
  relation: 'inside',
  backdrop: [],
  states: undefined,
  themes: undefined,
  level: 'system',
  minimum: '',
  anyOf: '',
  product: '',
  exempt: 'none',
  reason: '',
}

export function fieldsOf(pair: PairWire): PairFields {
  return {
    foreground: pair.foreground,
    background: pair.background,
    use: pair.use,
    relation: pair.relation,
    backdrop: pair.backdrop === 'unknown' ? 'unknown' : [...(pair.backdrop ?? [])],
    states: pair.states,
    themes: pair.themes,
    level: pair.level ?? 'system',
    minimum: numberText(pair.minimum),
    anyOf: pair.anyOf ?? '',
    product: pair.product ?? '',
    exempt: pair.exempt?.kind ?? 'none',
    reason: pair.exempt?.reason ?? '',
  }
}

/** A draft without the members that say what the fields say anyway. */
export function leftOf(fields: PairFields, draft: PairDraft): PairDraft {
  const isLeft = ([member, value]: [string, unknown]) =>
    JSON.stringify(value) !== JSON.stringify(fields[member as keyof PairFields])
  return Object.fromEntries(Object.entries(draft).filter(isLeft))
}

/** The fields as a write gives them, or what is wrong with them by their pointers. */
export type ReadPair =
  | { readonly ok: true; readonly input: PairInput }
  | { readonly ok: false; readonly faults: readonly Fault[] }

/** Reads the fields as a write; names are looked up when it is measured. */
export function readPair(fields: PairFields): ReadPair {
  const faults: Fault[] = []
  const minimum = readNumber(fields.minimum, 1, 21)
  if (minimum.fault !== undefined) faults.push({ pointer: '/minimum', detail: minimum.fault })
  for (const side of ['foreground', 'background'] as const) {
    if (fields[side] === '') faults.push({ pointer: `/${side}`, detail: `It has no ${side} yet.` })
  }
  if (fields.themes?.length === 0) {
    faults.push({ pointer: '/themes', detail: 'It is in no theme.' })
  }
  const reason = fields.reason.trim()
  if (fields.exempt !== 'none' && reason === '') {
    faults.push({ pointer: '/exempt/reason', detail: 'An exemption has a reason.' })
  }
  return faults.length > 0
    ? { ok: false, faults }
    : { ok: true, input: inputOf(fields, minimum.value) }
}

function inputOf(fields: PairFields, minimum: number | undefined): PairInput {
  const { foreground, background, use, relation, backdrop, states, themes, level } = fields
  const [anyOf, product] = [fields.anyOf.trim(), fields.product.trim()]
  const kind = EXEMPTIONS.find((exemption) => exemption === fields.exempt)
  return {
    foreground,
    background,
    use,
    relation,
    ...(backdrop === 'unknown' ? { backdrop } : {}),
    ...(backdrop !== 'unknown' && backdrop.length > 0 ? { backdrop: [...backdrop] } : {}),
    ...(states === undefined ? {} : { states: STATES.filter((state) => states.includes(state)) }),
    ...(themes === undefined ? {} : { themes: [...themes] }),
    ...(level === 'system' ? {} : { level }),
    ...(minimum === undefined ? {} : { minimum }),
    ...(anyOf === '' ? {} : { anyOf }),
    ...(product === '' ? {} : { product }),
    ...(kind === undefined ? {} : { exempt: { kind, reason: fields.reason.trim() } }),
  }
}

const OPTIONAL = [
  'backdrop',
  'states',
  'themes',
  'level',
  'minimum',
  'anyOf',
  'product',
  'exempt',
] as const

/** Where a field stands in the body. */
const BODY_MEMBER: { readonly [field in keyof PairFields]?: keyof PairInput } = { reason: 'exempt' }

/** What a draft changes, as the body of an edit: `null` removes. */
export function patchOf(draft: PairDraft, input: PairInput): Record<string, unknown> {
  const members = (Object.keys(draft) as (keyof PairFields)[]).map(
    (field) => BODY_MEMBER[field] ?? (field as keyof PairInput),
  )
  return Object.fromEntries(
    [...new Set(members)].map((member) => [
      member,
      input[member] ?? (OPTIONAL.some((each) => each === member) ? null : undefined),
    ]),
  )
}

/** What a pair comes to for the engine, or what it names that is not there. */
export type PairEdits =
  | { readonly ok: true; readonly edits: SystemEdits }
  | { readonly ok: false; readonly faults: readonly Fault[] }

/** The pair put into the head: in the place of the one with its id, or last. */
export function pairEdits(model: SystemModel, id: string, input: PairInput): PairEdits {
  const faults: Fault[] = []
  const tokens = new Map(model.tokens.map((token) => [token.name, token.id]))
  const themes = new Map(model.themes.map((theme) => [theme.key, theme.id]))
  const names = {
    tokenId: (name: string) => tokens.get(name),
    themeId: (key: string) => themes.get(key),
  }
  const pair = pairFromWire({ ...input, id }, '', { names, faults })
  return faults.length > 0 ? { ok: false, faults } : { ok: true, edits: { pairs: { put: [pair] } } }
}
