import type { Advisory, ContrastKind, ModelFault, PairModel } from './model.ts'
import type { ResolvedSystem } from './resolved.ts'

/** What a row says before groups, waivers and comparison: its requirement is met, or there is none. */
export const ROW_MET = 0
/** Under what is required. */
export const ROW_SHORT = 1
/** Nothing is asked of it, by WCAG or by declaration. */
export const ROW_EXEMPT = 2
/** Exempt, and under the system’s own floor for disabled. */
export const ROW_UNDER_FLOOR = 3

/**
 * One pair measured: a row for each of its themes and, within it, each fg/bg state, in columns.
 * Row = position in `themes` × `combinations.length` + position in `combinations`.
 */
export interface PairMeasure {
  readonly pair: PairModel
  readonly kind: ContrastKind
  /** Positions in the system's themes. */
  readonly themes: readonly number[]
  /** Foreground state position × STATE_COUNT + background state position. */
  readonly combinations: readonly number[]
  /** By position in `themes`: what the use, the levels and the pair's minimum ask for. */
  readonly required: readonly number[]
  readonly srgb: Float64Array
  /** NaN where no visible layer asks for P3; empty where the system does not ship it. */
  readonly p3: Float64Array
  /** The ratio that decides: the lower of the two where P3 gates. */
  readonly ratio: Float64Array
  /** ROW_… */
  readonly status: Uint8Array
  /** 1 where one level a translucent layer would flip the verdict. */
  readonly tight: Uint8Array
}

/** Pairs whose findings can share an identity. */
export interface Subject {
  readonly foreground: string
  readonly background: string
  readonly kind: ContrastKind
  /** Positions in `measures`. */
  readonly members: readonly number[]
}

/**
 * Everything measured of a system, before waivers and comparison. Immutable: it can be kept, and shares what did not
 * change with the evaluation that it was re-checked from.
 */
export interface Evaluation {
  readonly resolved: ResolvedSystem
  /** In the order of `model.pairs`. */
  readonly measures: readonly PairMeasure[]
  readonly subjects: readonly Subject[]
  /** By position in `measures`: the position of its subject. */
  readonly subjectOf: readonly number[]
  /**
   * By name of an `anyOf` group, 1 where a member meets its own requirement:
   * (theme position × STATE_COUNT + foreground state) × STATE_COUNT + background state.
   */
  readonly anyOf: ReadonlyMap<string, Uint8Array>
  /** By token position. */
  readonly advisories: readonly (readonly Advisory[])[]
  /** By token id: tokens whose values or rules name it; what all hangs on, ground and ink, is left out. */
  readonly dependents: ReadonlyMap<string, readonly string[]>
  /** By token id: positions in `measures` of the pairs with it as foreground, background or backdrop. */
  readonly pairsOf: ReadonlyMap<string, readonly number[]>
}

/** A model evaluated, or every reason why it cannot be. */
export type Checked =
  | { readonly ok: true; readonly evaluation: Evaluation }
  | { readonly ok: false; readonly faults: readonly ModelFault[] }
