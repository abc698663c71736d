import type { Oklch } from '#shared/color/oklch.ts'
import { stateAt } from './model-graph.ts'
import type { SourceValue, State, TokenModel } from './model.ts'
import { type ResolvedSystem, STATE_COUNT } from './resolved.ts'

/** Where a colour is set: in the base at rest it is the token's source, anywhere else an override. */
export interface ColorPlace {
  /** Token id. */
  readonly token: string
  /** Theme id. */
  readonly theme: string
  /** Default `rest`. */
  readonly state?: State
}

/**
 * The token with a value set in one place; what it is set to elsewhere stays.
 * @param base id of the base theme
 */
export function placeValue<Token extends TokenModel>(
  token: Token,
  place: ColorPlace & { readonly base: string },
  value: SourceValue,
): Token {
  const { theme, state = 'rest', base } = place
  if (theme === base && state === 'rest') return { ...token, value }
  return {
    ...token,
    values: { ...token.values, [theme]: { ...token.values[theme], [state]: value } },
  }
}

/**
 * The colour that a place shows now, set there or not.
 * @throws TypeError when the system has no such token or theme
 */
export function presentColor(resolved: ResolvedSystem, place: ColorPlace): Oklch {
  const token = resolved.tokens.get(place.token)
  const theme = resolved.themes.get(place.theme)
  if (token === undefined) throw new TypeError(`No token ${place.token}`)
  if (theme === undefined) throw new TypeError(`No theme ${place.theme}`)
  return token.cells[theme * STATE_COUNT + stateAt(place.state ?? 'rest')]!.color.oklch
}
