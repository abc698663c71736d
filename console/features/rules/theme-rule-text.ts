import { readNumber, numberText } from '#console/lib/read-number.ts'
import type { ThemeRuleWire } from '#shared/contracts/rules.contract.ts'

export type ThemeRuleKind = NonNullable<ThemeRuleWire['kind']>
type NumberField = 'k' | 'chroma' | 'lightness' | 'hue'

/** A theme rule as it stands in fields; an empty one leaves the wider rule's. */
export interface ThemeRuleText extends Readonly<Record<NumberField, string>> {
  readonly kind: ThemeRuleKind | 'inherited'
  /** `ground`, `ink` or a token's name; empty: not said. */
  readonly against: string
}

interface NumberRange {
  readonly field: NumberField
  readonly label: string
  readonly least: number
  readonly most: number
}

const K = { field: 'k', label: 'Factor of the distance', least: 0, most: 10 } as const
const CHROMA = { field: 'chroma', label: 'Chroma ×', least: 0, most: 10 } as const
const LIGHTNESS = { field: 'lightness', label: 'Lightness +', least: -1, most: 1 } as const
const HUE = { field: 'hue', label: 'Hue +, degrees', least: -360, most: 360 } as const
const ALL: readonly NumberRange[] = [K, CHROMA, LIGHTNESS, HUE]

/** The fields that a kind of rule reads; a rule that inherits its kind may set any. */
export const FIELDS_OF_KIND: { readonly [kind in ThemeRuleText['kind']]: readonly NumberRange[] } =
  {
    inherited: ALL,
    mirror: [CHROMA],
    relative: [K, CHROMA],
    'match-contrast': [CHROMA],
    shift: [LIGHTNESS, CHROMA, HUE],
    keep: [],
  }

export const readsAgainst = (kind: ThemeRuleText['kind']): boolean =>
  kind === 'match-contrast' || kind === 'inherited'

export function themeRuleText(rule: ThemeRuleWire): ThemeRuleText {
  return {
    kind: rule.kind ?? 'inherited',
    against: unbraced(rule.against),
    k: numberText(rule.k),
    chroma: numberText(rule.chroma),
    lightness: numberText(rule.lightness),
    hue: numberText(rule.hue),
  }
}

/** A rule that was written, or what is wrong with its fields. */
export type RuleReading<Rule, Field extends string> =
  | { readonly ok: true; readonly rule: Rule }
  | { readonly ok: false; readonly faults: { readonly [field in Field]?: string } }

/** Reads the fields that the kind has; what others hold is not part of the rule. */
export function readThemeRuleText(text: ThemeRuleText): RuleReading<ThemeRuleWire, NumberField> {
  const faults: { [field in NumberField]?: string } = {}
  const rule: ThemeRuleWire = text.kind === 'inherited' ? {} : { kind: text.kind }
  for (const { field, least, most } of FIELDS_OF_KIND[text.kind]) {
    const { value, fault } = readNumber(text[field], least, most)
    if (fault !== undefined) faults[field] = fault
    if (value !== undefined) rule[field] = value
  }
  if (readsAgainst(text.kind) && text.against.trim() !== '') rule.against = braced(text.against)
  return Object.keys(faults).length > 0 ? { ok: false, faults } : { ok: true, rule }
}

const isRole = (name: string): boolean => name === 'ground' || name === 'ink'

/** What a rule may refer to, as it is written: the roles, then tokens; one that is named like a role stands in braces. */
export function referenceNames(tokens: readonly string[]): string[] {
  return ['ground', 'ink', ...tokens.map((name) => (isRole(name) ? `{${name}}` : name))]
}

/** A role as it is, a token's name in braces. */
export function braced(reference: string): string {
  const name = reference.trim()
  return isRole(name) || /^\{.*\}$/.test(name) ? name : `{${name}}`
}

/** The same as it is written. */
export function unbraced(reference: string | undefined): string {
  const name = /^\{(.*)\}$/.exec(reference ?? '')?.[1]
  return name === undefined || isRole(name) ? (reference ?? '') : name
}
