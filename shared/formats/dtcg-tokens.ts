import type { Oklch } from '#shared/color/oklch.ts'
import { readDtcgColor } from './dtcg-color.ts'
import { type DtcgType, surveyDocument } from './dtcg-document.ts'
import { type DtcgEntry, type DtcgGroup, namedEntries } from './dtcg-entries.ts'
import { type DtcgFault, fault, type JsonObject, objectOf, pointerTo } from './dtcg-fault.ts'
import { layerDocument } from './dtcg-layers.ts'
import { type DtcgLink, linkEntries } from './dtcg-links.ts'
import { createReferences, type DtcgReferences, referenceOf } from './dtcg-references.ts'

/** A colour token's value: its own colour, or the token it takes one from. */
export type DtcgTokenValue =
  | {
      readonly kind: 'color'
      readonly color: Oklch
      /** `$value` as written (a `$ref` object where the token has that instead), references in it unfollowed. */
      readonly authored: unknown
    }
  | { readonly kind: 'alias'; readonly name: string }

interface Described {
  /** Dot pointer; the token of a group itself ends in `.$root`. */
  readonly name: string
  /** Where the token is written; where an inherited one comes from. */
  readonly pointer: string
  readonly description?: string
  /** Its own, or its nearest group's; left out where it is not deprecated. */
  readonly deprecated?: true | string
  readonly extensions?: JsonObject
  /** Members that the format does not define, verbatim. */
  readonly unknown?: JsonObject
}

export interface DtcgToken extends Described {
  readonly type: 'color'
  readonly value: DtcgTokenValue
}

/** A token of another type: kept, not read. */
export interface DtcgOtherToken extends Described {
  readonly type: Exclude<DtcgType, 'color'>
  /** The value as written. */
  readonly authored: unknown
  /** The value itself where the whole of it is a reference. */
  readonly value: unknown
}

export interface DtcgDocument {
  /** Colour tokens in document order. */
  readonly tokens: readonly DtcgToken[]
  /** Tokens of other types in document order. */
  readonly others: readonly DtcgOtherToken[]
  readonly groups: readonly DtcgGroup[]
  /** Every fault; with one, the rest is not to be relied on. */
  readonly faults: readonly DtcgFault[]
}

/**
 * Reads a design token document: names, types, inheritance (`$extends`, `$root`), aliases, references and colours.
 * Linear in the document once extended, and without recursion over its depth.
 * @param document Anything JSON can hold.
 * @returns Its tokens; every fault at once, each with a pointer from the document.
 * @see https://www.designtokens.org/tr/2025.10/format/
 */
export function readDtcgTokens(document: unknown): DtcgDocument {
  const root = objectOf(document)
  if (!root) {
    const faults = [fault('document-shape', '', 'A design token document is a JSON object.')]
    return { tokens: [], others: [], groups: [], faults }
  }
  const survey = surveyDocument(root)
  const layers = layerDocument(root, survey)
  const named = namedEntries(layers, (group) => survey.pointerOf.get(group)!)
  const entries = new Map(named.entries.map((entry) => [entry.name, entry]))
  const references = createReferences(layers, entries)
  const linked = linkEntries(entries, survey, references)
  const faults = [...survey.faults, ...layers.faults, ...named.faults, ...linked.faults]
  const tokens: DtcgToken[] = []
  const others: DtcgOtherToken[] = []
  for (const link of linked.links) {
    const described = describe(link.entry, survey.pointerOf.get(link.entry.token)!)
    if (link.type === 'color') {
      const reading = readValue(link, references)
      if (reading.value) tokens.push({ ...described, type: link.type, value: reading.value })
      faults.push(...reading.faults)
    } else if (link.type) {
      others.push({ ...described, type: link.type, ...otherValue(link, references) })
    }
  }
  return { tokens, others, groups: named.groups, faults: distinct(faults) }
}

function describe({ name, token, deprecated }: DtcgEntry, pointer: string): Described {
  const { $description, $extensions } = token
  const extensions = objectOf($extensions)
  const unknown = Object.entries(token).filter(([member]) => !member.startsWith('$'))
  return {
    name,
    pointer,
    ...(typeof $description === 'string' ? { description: $description } : {}),
    ...(deprecated === undefined || deprecated === false ? {} : { deprecated }),
    ...(extensions ? { extensions } : {}),
    ...(unknown.length > 0 ? { unknown: Object.fromEntries(unknown) } : {}),
  }
}

function authoredOf({ token }: DtcgEntry): unknown {
  return Object.hasOwn(token, '$value') ? token.$value : { $ref: token.$ref }
}

function otherValue(link: DtcgLink, references: DtcgReferences) {
  const authored = authoredOf(link.entry)
  const settled = references.settled(link.target === undefined ? link.value : `{${link.target}}`)
  return { authored, value: settled.kind === 'value' ? settled.value : authored }
}

interface ValueReading {
  readonly value?: DtcgTokenValue
  readonly faults: readonly DtcgFault[]
}

function readValue(
  { entry, pointer, target, value }: DtcgLink,
  references: DtcgReferences,
): ValueReading {
  if (target !== undefined) return { value: { kind: 'alias', name: target }, faults: [] }
  // Neither a target nor a value: what is wrong with the reference has been reported.
  if (value === undefined) return { faults: [] }
  const { whole, faults } = withPartsSettled(value, references)
  if (faults.length > 0) return { faults: faults.map((inner) => under(pointer, inner)) }
  const reading = readDtcgColor(whole)
  if (!reading.ok) return { faults: reading.faults.map((inner) => under(pointer, inner)) }
  return { value: { kind: 'color', color: reading.color, authored: authoredOf(entry) }, faults: [] }
}

/** A colour value with each member and component in place of the reference to it. */
function withPartsSettled(value: unknown, references: DtcgReferences) {
  const faults: DtcgFault[] = []
  const settle = (part: unknown, at: string) => {
    if (!referenceOf(part)) return part
    const settled = references.settled(part)
    if (settled.kind === 'value') return settled.value
    if (settled.kind === 'fault') faults.push(fault(settled.code, at, settled.detail))
    return undefined
  }
  const members = objectOf(value)
  if (!members) return { whole: value, faults }
  const whole = Object.fromEntries(
    Object.entries(members).map(([name, member]) => {
      const settled = settle(member, pointerTo('', name))
      if (name !== 'components' || !Array.isArray(settled)) return [name, settled]
      return [name, settled.slice(0, 4).map((part, i) => settle(part, `/components/${i}`))]
    }),
  )
  return { whole, faults }
}

function under(pointer: string, inner: DtcgFault): DtcgFault {
  return { ...inner, pointer: pointer + inner.pointer }
}

/** A token inherited by several groups is written once, so its faults are told once. */
function distinct(faults: readonly DtcgFault[]): DtcgFault[] {
  const byText = new Map(faults.map((each) => [`${each.pointer} ${each.detail}`, each]))
  return [...byText.values()]
}
