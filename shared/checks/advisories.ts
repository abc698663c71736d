import { areApartInLightness, deltaE2000, labOfBytes } from '#shared/color/difference.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import { sameOklch } from './color-arithmetic.ts'
import { createPixel, luminanceOf, type Pixel, paintLayer } from './layers.ts'
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

/** Whether one colour cannot be told from another, both laid on a ground. */
function isAlike(ground: RenderedColor, first: RenderedColor, second: RenderedColor): boolean {
  if (first === second) return true
  paintOn(ground, first, upper)
  paintOn(ground, second, lower)
  const [y1, y2] = [luminanceOf(upper, 'srgb'), luminanceOf(lower, 'srgb')]
  if (areApartInLightness(y1, y2, VISIBLE_DIFFERENCE)) return false
  const lab = labOfBytes(upper.r, upper.g, upper.b)
  return deltaE2000(lab, labOfBytes(lower.r, lower.g, lower.b)) < VISIBLE_DIFFERENCE
}

const upper = createPixel()
const lower = createPixel()

function paintOn(ground: RenderedColor, color: RenderedColor, pixel: Pixel): void {
  paintLayer(pixel, ground, 'srgb')
  paintLayer(pixel, color, 'srgb')
}

function invisibleStates(
  resolved: ResolvedSystem,
  token: ResolvedToken,
  theme: number,
): readonly State[] {
  const { ground } = resolved.model.themes[theme]!
  const first = theme * STATE_COUNT
  const under = resolved.tokens.get(ground)!.cells[first]!.color.rendered
  const rest = token.cells[first]!.color.rendered
  return token.states.filter((state) => {
    if (state === 'rest') return false
    const offset = first + stateAt(state)
    if (!isAlike(under, rest, token.cells[offset]!.color.rendered)) return false
    return !isAsRest(endOfAliases(resolved, token, offset).cell.provenance)
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
