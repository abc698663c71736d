import { deltaE2000, labOfBytes } from '#shared/color/difference.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import { sameOklch } from './color-arithmetic.ts'
import { createPixel, paintLayer } from './layers.ts'
import { stateAt } from './model-graph.ts'
import type { Advisory, State } from './model.ts'
import type { Provenance } from './provenance.ts'
import {
  type ResolvedCell,
  type ResolvedSystem,
  type ResolvedToken,
  STATE_COUNT,
} from './resolved.ts'

/** Closer than this in CIEDE2000, two colours are taken for one. */
const VISIBLE_DIFFERENCE = 2

/** A value at the end of its aliases. */
interface AliasEnd {
  readonly token: ResolvedToken
  readonly offset: number
  readonly cell: ResolvedCell
}

function endOfAliases(resolved: ResolvedSystem, start: ResolvedToken, offset: number): AliasEnd {
  const theme = Math.floor(offset / STATE_COUNT)
  let end: AliasEnd = { token: start, offset, cell: start.cells[offset]! }
  while (end.cell.provenance.from === 'alias') {
    const { token: id, state } = end.cell.provenance
    const token = resolved.tokens.get(id)!
    const at = theme * STATE_COUNT + stateAt(state)
    end = { token, offset: at, cell: token.cells[at]! }
  }
  return end
}

/** Whether a theme's own rule gave a value that differs from its parent's. */
function isMovedByRule(resolved: ResolvedSystem, end: AliasEnd): boolean {
  if (end.cell.provenance.from !== 'theme-rule') return false
  const { themes } = resolved.model
  const from = themes[Math.floor(end.offset / STATE_COUNT)]!.from
  const parent = from === undefined ? 0 : resolved.themes.get(from)!
  const before = end.token.cells[parent * STATE_COUNT + (end.offset % STATE_COUNT)]!
  return !sameOklch(before.color.oklch, end.cell.color.oklch)
}

function doubleFlips(resolved: ResolvedSystem, token: ResolvedToken): Advisory[] {
  const advisories: Advisory[] = []
  for (const [theme, { id }] of resolved.model.themes.entries()) {
    if (theme === 0) continue
    for (const state of token.states) {
      if (token.token.values[id]?.[state]?.kind !== 'alias') continue
      const end = endOfAliases(resolved, token, theme * STATE_COUNT + stateAt(state))
      if (!isMovedByRule(resolved, end)) continue
      advisories.push({ code: 'double-flip', token: token.token.id, theme: id, state })
    }
  }
  return advisories
}

/** Whether a state follows a rule that changes nothing, and so is meant to look like rest. */
function isAsRest(provenance: Provenance): boolean {
  if (provenance.from !== 'state-rule') return false
  const { lightness, chroma, hue, alpha } = provenance.adjustment
  return lightness === 0 && chroma === 1 && hue === 0 && alpha === 1
}

const pixel = createPixel()

function labOn(ground: RenderedColor, color: RenderedColor) {
  paintLayer(pixel, ground, 'srgb')
  paintLayer(pixel, color, 'srgb')
  return labOfBytes(pixel.r, pixel.g, pixel.b)
}

function invisibleStates(
  resolved: ResolvedSystem,
  token: ResolvedToken,
  theme: number,
): readonly State[] {
  const { ground } = resolved.model.themes[theme]!
  const under = resolved.tokens.get(ground)!.cells[theme * STATE_COUNT]!.color.rendered
  const cellOf = (state: State) => token.cells[theme * STATE_COUNT + stateAt(state)]!
  const states = token.states.filter((state) => {
    if (state === 'rest') return false
    const end = endOfAliases(resolved, token, theme * STATE_COUNT + stateAt(state))
    return !isAsRest(end.cell.provenance)
  })
  if (states.length === 0) return []
  const rest = labOn(under, cellOf('rest').color.rendered)
  return states.filter((state) => {
    const lab = labOn(under, cellOf(state).color.rendered)
    return deltaE2000(rest, lab) < VISIBLE_DIFFERENCE
  })
}

/**
 * What a reader should look at, though it breaches nothing: overrides that alias a token which the theme's own
 * rule moves, and states that cannot be told from rest.
 * @see https://doi.org/10.1002/col.20070 CIEDE2000
 */
export function advisoriesOf(resolved: ResolvedSystem, token: ResolvedToken): readonly Advisory[] {
  const { id } = token.token
  const invisible =
    token.states.length === 1
      ? []
      : resolved.model.themes.flatMap((theme, position) =>
          invisibleStates(resolved, token, position).map(
            (state): Advisory => ({ code: 'state-invisible', token: id, theme: theme.id, state }),
          ),
        )
  return [...doubleFlips(resolved, token), ...invisible]
}
