import type { Oklch } from '#shared/color/oklch.ts'

/** The states a token can take part in, in the order in which ties are broken; `rest` is implied. */
export const DERIVED_STATES = ['hover', 'active', 'focus', 'disabled'] as const
/** Every state, CSS’s own words; `rest` first. */
export const STATES = ['rest', ...DERIVED_STATES] as const
/** A state that follows from rest. */
export type DerivedState = (typeof DERIVED_STATES)[number]
/** A state of a token. */
export type State = (typeof STATES)[number]

/** Levels of conformance, from lax to strict. @see https://www.w3.org/TR/WCAG22/#cc1 */
export const LEVELS = ['AA', 'AAA'] as const
/** One of the levels. */
export type Level = (typeof LEVELS)[number]

/** What a foreground is on its background; what each asks for stands in `uses.ts`. */
export const USES = [
  'text',
  'large-text',
  'non-text',
  'focus-adjacent',
  'focus-change',
  'link-in-text',
] as const
/** One of the uses. */
export type Use = (typeof USES)[number]

/** `inside`: a foreground within a container, each with its own state; `together`: one component, one state. */
export const RELATIONS = ['inside', 'together'] as const
/** One of the relations. */
export type Relation = (typeof RELATIONS)[number]

/** What WCAG exempts and only a declaration can tell. @see https://www.w3.org/TR/WCAG22/#contrast-minimum */
export const EXEMPTIONS = ['logotype', 'decorative', 'inactive'] as const
/** One of the exemptions. */
export type ExemptionKind = (typeof EXEMPTIONS)[number]

/** What a token is set to. Other tokens are referred to by id, so that a rename moves nothing. */
export type SourceValue =
  | { readonly kind: 'color'; readonly color: Oklch }
  | { readonly kind: 'alias'; readonly token: string }
  | ({ readonly kind: 'derived'; readonly token: string } & Adjustment)

/** Lightness and hue are added, chroma and alpha multiplied. */
export interface Adjustment {
  readonly lightness?: number
  readonly chroma?: number
  readonly hue?: number
  readonly alpha?: number
}

/** A token in a rule: a role of the theme (`ground`, `ink`), or one token by its id. */
export type Reference = 'ground' | 'ink' | { readonly token: string }

/** How a state follows from rest. `direction` and `reference` are one field: they are merged together. */
export interface StateRule extends Adjustment {
  /** Default: away from the ground. */
  readonly towards?: { readonly direction: 'away' | 'towards'; readonly reference: Reference }
}

/** The ways in which a theme’s value can follow from its parent’s. */
export const THEME_RULE_KINDS = ['mirror', 'relative', 'match-contrast', 'keep', 'shift'] as const

/** How a theme's value follows from its parent's; merged field by field from wide to narrow. */
export interface ThemeRule {
  readonly kind?: (typeof THEME_RULE_KINDS)[number]
  /** Factor of `relative`, default 1. */
  readonly k?: number
  /** What `match-contrast` measures against, default the ground. */
  readonly against?: Reference
  /** Chroma factor in all but `keep`, default 1. */
  readonly chroma?: number
  /** Added by `shift`, default 0. */
  readonly lightness?: number
  /** Degrees added by `shift`, default 0. */
  readonly hue?: number
}

/** State rules by state; one that is left out leaves the wider scope’s. */
export type StateRules = { readonly [state in DerivedState]?: StateRule }

/** Rules of one scope: the system, a name prefix, or a token. Theme rules are keyed by theme id. */
export interface RuleScope {
  readonly states?: StateRules
  readonly themes?: { readonly [themeId: string]: ThemeRule }
}

/** Rules of all tokens whose names begin with the same segments. */
export interface PrefixRules extends RuleScope {
  /** Whole name segments: `action` covers `action` and `action.board`, not `actions`. */
  readonly prefix: string
}

/** A token as it is declared. */
export interface TokenModel {
  readonly id: string
  readonly name: string
  /** The base theme's rest value. */
  readonly value: SourceValue
  /** The states it lists, without `rest`. */
  readonly states: readonly DerivedState[]
  /** Overrides by theme id and state. The base theme takes no `rest` here. */
  readonly values: { readonly [themeId: string]: { readonly [state in State]?: SourceValue } }
  readonly rules?: RuleScope
}

/** A theme as it is declared; tokens by id. */
export interface ThemeModel {
  readonly id: string
  readonly key: string
  /** Parent theme id; absent: the base (the first theme of the system, which has none). */
  readonly from?: string
  readonly ground: string
  readonly ink: string
  /** The theme rule at system scope; a theme with none keeps. */
  readonly rule?: ThemeRule
  readonly level?: Level
  /** `false`: its breaches are reported and fail nothing. */
  readonly gating: boolean
}

/** A pair as it is declared; tokens and themes by id. */
export interface PairModel {
  readonly id: string
  readonly foreground: string
  readonly background: string
  readonly use: Use
  readonly relation: Relation
  /** Token ids bottom first, the theme's ground always under them; or not known. */
  readonly backdrop: readonly string[] | 'unknown'
  /** Limits both sides; absent: all. `rest` is always in. */
  readonly states?: readonly State[]
  /** Theme ids; absent: all. */
  readonly themes?: readonly string[]
  readonly level?: Level
  /** A ratio at or above the required one. */
  readonly minimum?: number
  /** Name of a group of which one member is enough. */
  readonly anyOf?: string
  readonly product?: string
  readonly exempt?: { readonly kind: ExemptionKind; readonly reason: string }
}

/** What holds for a whole system. */
export interface SystemSettings {
  readonly level: Level
  /** Whether Display P3 values ship, and so are measured. */
  readonly p3: boolean
  /** Whether the P3 ratio gates where it is the lower one. */
  readonly p3Gates: boolean
  /** The system's own least ratio for disabled, exempt findings; absent: none. */
  readonly disabledFloor?: number
}

/** Tokens that must stay tellable apart, also with a colour-vision deficiency. It is measured and never gates. */
export interface DistinctSet {
  readonly id: string
  readonly name: string
  /** Token ids, at least two. */
  readonly tokens: readonly string[]
}

/** A system at one revision, as the engine reads it. `themes[0]` is the base. */
export interface SystemModel {
  readonly settings: SystemSettings
  /** State rules of the system scope (theme rules of that scope stand on each theme). */
  readonly states: StateRules
  readonly prefixes: readonly PrefixRules[]
  readonly themes: readonly ThemeModel[]
  /** In ledger order. */
  readonly tokens: readonly TokenModel[]
  readonly pairs: readonly PairModel[]
  /** Absent: none. */
  readonly distinctSets?: readonly DistinctSet[]
  /** JSON text of what files brought besides, kept verbatim; nothing is computed from it. */
  readonly remainder?: string
}

/** What a finding is about, as far as its identity goes: a change from `text` to `large-text` keeps its history. */
export const CONTRAST_KINDS = ['text', 'non-text', 'focus', 'link'] as const
/** One of the kinds. */
export type ContrastKind = (typeof CONTRAST_KINDS)[number]

/** A granted waiver that is in force now; the caller, not the engine, knows the time. Absent members cover all. */
export interface WaiverModel {
  readonly id: string
  readonly foreground: string
  readonly background: string
  readonly kind: ContrastKind
  readonly theme?: string
  readonly foregroundState?: State
  readonly backgroundState?: State
  /** The least ratio it covers. */
  readonly floorRatio: number
  /** The requirement it was granted under; a stricter one ends it. */
  readonly required: number
  /** RFC 3339, UTC. */
  readonly endsAt: string
}

/** What can come of a finding; `known` only where new breaches alone count. */
export const OUTCOMES = ['pass', 'breach', 'waived', 'exempt', 'known'] as const
/** One of the outcomes. */
export type Outcome = (typeof OUTCOMES)[number]

/** One entry of a check: what was measured of two tokens in a theme and a state, and what follows from it. */
export interface Finding {
  readonly foreground: string
  readonly background: string
  /** Theme id. */
  readonly theme: string
  readonly foregroundState: State
  readonly backgroundState: State
  readonly use: Use
  readonly kind: ContrastKind
  /** 1 to 21, never rounded. */
  readonly ratio: number
  /** 0 where nothing is required. */
  readonly required: number
  /** Which measure `ratio` is: the lower one where both gate. */
  readonly basis: 'srgb' | 'p3'
  /** Both measures; `p3` is WCAG's ratio on P3 luminance, outside its definition, where it was taken. */
  readonly ratios: { readonly srgb: number; readonly p3?: number }
  readonly outcome: Outcome
  /** For example `any-of`, `backdrop-unknown`, `disabled-floor`, `disabled`, `logotype`. */
  readonly reason?: string
  /** Present and true where one level a translucent layer would flip the verdict. */
  readonly tight?: true
  readonly gating: boolean
  /** As hex, 6 or 8 digits, of the layer itself before compositing. */
  readonly rendered: { readonly foreground: string; readonly background: string }
  readonly waiver?: { readonly id: string; readonly endsAt: string }
  /** Ids of pairs that declared it, for the reader; no part of the identity. */
  readonly pairs: readonly string[]
  /** Canonical identity: foreground, background and backdrop ids, kind, theme id, fg/bg state. */
  readonly identity: string
}

/** Something to look at that is no breach; token and theme by id. */
export interface Advisory {
  readonly code: 'double-flip' | 'state-invisible'
  readonly token: string
  readonly theme?: string
  readonly state?: State
}

/** What a verdict was made with, so that it can be made again. */
export interface EngineStamp {
  readonly version: string
  /** The pinned gamut mapping. */
  readonly gamutMap: string
  readonly ruleSet: string
}

/** A check’s answer: `fail` on any gating breach. */
export interface Verdict {
  readonly verdict: 'pass' | 'fail'
  readonly counts: { readonly [outcome in Outcome]: number }
  readonly findings: readonly Finding[]
  readonly advisories: readonly Advisory[]
  readonly engine: EngineStamp
}

/** Why a model cannot be resolved; every fault is returned, none is thrown. */
export interface ModelFault {
  readonly code:
    | 'reference-missing'
    | 'reference-cycle'
    | 'alias-depth'
    | 'theme-cycle'
    | 'theme-span'
    | 'theme-unset'
    | 'level-lower'
    | 'minimum-lower'
    | 'lightness-range'
  readonly detail: string
  /** What it is about, by id. */
  readonly token?: string
  readonly theme?: string
  readonly pair?: string
  readonly distinctSet?: string
  readonly state?: State
}
