import type { Oklch } from '#shared/color/oklch.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import { STATES, type State, type SystemModel, type TokenModel } from './model.ts'
import type { Provenance } from './provenance.ts'
import type { TokenLight } from './token-light.ts'
import type { TokenRows } from './token-rows.ts'

/** Number of states a token can have, rest included. */
export const STATE_COUNT = STATES.length

/** One colour, rendered once. Values that are the same colour by reference share one object. */
export interface ResolvedColor {
  readonly oklch: Oklch
  readonly rendered: RenderedColor
}

/** One token in one theme and state. */
export interface ResolvedCell {
  readonly color: ResolvedColor
  readonly provenance: Provenance
  /** Number of aliases followed to get here, one after another. */
  readonly aliasDepth: number
}

/** A token in all themes and states. */
export interface ResolvedToken {
  readonly token: TokenModel
  /** `rest` first, then what the token lists, or its target where an alias lists none. */
  readonly states: readonly State[]
  /** By theme position × STATE_COUNT + state position; states that are not listed hold rest's cell. */
  readonly cells: readonly ResolvedCell[]
  readonly light: TokenLight
}

/** A model with every value computed. */
export interface ResolvedSystem {
  readonly model: SystemModel
  /** Position of each theme id in `model.themes`. */
  readonly themes: ReadonlyMap<string, number>
  /** Position of each token id in `model.tokens`. */
  readonly positions: ReadonlyMap<string, number>
  /** By token id, in ledger order. */
  readonly tokens: TokenRows
}

/** A value as it is read out. */
export interface ResolvedValue extends ResolvedColor {
  readonly provenance: Provenance
}

/**
 * The value of a token in a theme and state; a state that it does not list answers with rest.
 * @throws TypeError when the system has no such token or theme
 */
export function colorOf(
  resolved: ResolvedSystem,
  where: { readonly token: string; readonly theme: string; readonly state: State },
): ResolvedValue {
  const token = resolved.tokens.get(where.token)
  const theme = resolved.themes.get(where.theme)
  if (token === undefined) throw new TypeError(`No token ${where.token}`)
  if (theme === undefined) throw new TypeError(`No theme ${where.theme}`)
  const cell = token.cells[theme * STATE_COUNT + STATES.indexOf(where.state)]!
  return { ...cell.color, provenance: cell.provenance }
}

/**
 * The states of a token, `rest` first; an alias that lists none has its target's.
 * @throws TypeError when the system has no such token
 */
export function statesOf(resolved: ResolvedSystem, token: string): readonly State[] {
  const found = resolved.tokens.get(token)
  if (found === undefined) throw new TypeError(`No token ${token}`)
  return found.states
}
