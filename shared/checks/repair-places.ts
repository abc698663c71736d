import type { ColorPlace } from './color-place.ts'
import type { Evaluation } from './evaluation.ts'
import { stateAt } from './model-graph.ts'
import type { Finding, State, TokenModel } from './model.ts'
import { type ResolvedToken, STATE_COUNT } from './resolved.ts'

/** One side of a finding: the token, theme and state that it shows. */
interface ShownValue {
  readonly token: string
  readonly theme: string
  readonly state: State
}

/** A place by text, to tell two of them apart. */
export function placeKey({ token, theme, state = 'rest' }: ColorPlace): string {
  return JSON.stringify([token, theme, state])
}

/** Every place in which a token's own value is set: its source, then its overrides in the order of themes. */
export function setPlaces(evaluation: Evaluation, token: TokenModel): ColorPlace[] {
  const { themes } = evaluation.resolved.model
  const overrides = themes.flatMap(({ id }) =>
    (Object.keys(token.values[id] ?? {}) as State[])
      .filter((state) => token.values[id]?.[state] !== undefined)
      .map((state): ColorPlace => ({ token: token.id, theme: id, state })),
  )
  return [{ token: token.id, theme: themes[0]!.id }, ...overrides]
}

function cellAt(evaluation: Evaluation, token: ResolvedToken, shown: Omit<ShownValue, 'token'>) {
  const theme = evaluation.resolved.themes.get(shown.theme)!
  return token.cells[theme * STATE_COUNT + stateAt(shown.state)]!
}

/** The place that a shown value comes from: along its aliases and rules to where a colour is set. */
function originOf(evaluation: Evaluation, shown: ShownValue): ColorPlace {
  const { model, tokens, themes } = evaluation.resolved
  let at = shown
  for (;;) {
    const { provenance } = cellAt(evaluation, tokens.get(at.token)!, at)
    switch (provenance.from) {
      case 'source':
      case 'override':
        return at
      case 'alias':
      case 'derived':
        at = { ...at, token: provenance.token, state: provenance.state }
        break
      case 'state-rule':
        at = { ...at, state: 'rest' }
        break
      case 'theme-rule': {
        const from = model.themes[themes.get(at.theme)!]!.from ?? model.themes[0]!.id
        at = { ...at, theme: from }
      }
    }
  }
}

/** The places where a side of a finding can be mended, cheapest first: an override in its theme, then the source. */
export function placesOf(evaluation: Evaluation, shown: ShownValue): ColorPlace[] {
  const { model, tokens } = evaluation.resolved
  const base = model.themes[0]!.id
  const { token, theme, state } = shown
  const own = tokens.get(token)!.token
  const isStateSet = state !== 'rest' && own.values[theme]?.[state] !== undefined
  const override: ColorPlace = { token, theme, state: isStateSet ? state : 'rest' }
  const places = [override, { token, theme: base, state: 'rest' as const }]
  const all = [...places, originOf(evaluation, shown)]
  const seen = new Set<string>()
  return all.filter((place) => {
    const key = placeKey(place)
    const isNew = !seen.has(key)
    seen.add(key)
    return isNew
  })
}

/** Both sides of a finding. */
export function sidesOf(finding: Finding): readonly [ShownValue, ShownValue] {
  const { foreground, background, theme, foregroundState, backgroundState } = finding
  return [
    { token: foreground, theme, state: foregroundState },
    { token: background, theme, state: backgroundState },
  ]
}
