import {
  changed,
  clamp01,
  lightnessOf,
  scaled,
  toResolvedColor,
  turnedHue,
} from './color-arithmetic.ts'
import { ratioOn } from './layers.ts'
import type { Provenance } from './provenance.ts'
import type { ResolvedColor } from './resolved.ts'
import type { MergedThemeRule } from './rule-scopes.ts'

/** A theme's own colours that a rule measures with, at rest. */
export interface ThemeSide {
  readonly ground: ResolvedColor
  readonly ink: ResolvedColor
  /** What `match-contrast` measures against. */
  readonly reference: ResolvedColor
}

/** Both ends of a theme rule. */
export interface ThemeSpan {
  readonly parent: ThemeSide
  readonly own: ThemeSide
}

const HALVINGS = 14

/** Where a value came from that a theme rule made. */
export type ThemeProvenance = Extract<Provenance, { from: 'theme-rule' }>
type Short = NonNullable<ThemeProvenance['short']>

/** Where a lightness between ground and ink comes to lie between another ground and ink. */
function mirrored(l: number, span: ThemeSpan): number {
  const ground = lightnessOf(span.parent.ground)
  const ink = lightnessOf(span.parent.ink)
  const ownGround = lightnessOf(span.own.ground)
  const ownInk = lightnessOf(span.own.ink)
  if (ink === ground) return l // A span of nothing is a fault of the theme and reported as such.
  return clamp01(ownGround + ((l - ground) * (ownInk - ownGround)) / (ink - ground))
}

/** Which way ink lies from the reference; where it lies level with it, the way from ground to ink. */
function inkSign(side: ThemeSide): number {
  const reference = lightnessOf(side.reference)
  const ink = lightnessOf(side.ink)
  return Math.sign(ink - reference) || Math.sign(ink - lightnessOf(side.ground))
}

function contrastOn(color: ResolvedColor, side: ThemeSide): number {
  return ratioOn(color.rendered, {
    reference: side.reference.rendered,
    ground: side.ground.rendered,
  })
}

/** The lightness nearest the reference, on one side of it, that still has the parent's ratio. */
function matchContrast(
  color: ResolvedColor,
  chroma: number,
  span: ThemeSpan,
): { readonly color: ResolvedColor; readonly short?: Short } {
  const wanted = contrastOn(color, span.parent)
  const isOnInkSide =
    (lightnessOf(color) - lightnessOf(span.parent.reference)) * inkSign(span.parent) >= 0
  const sign = isOnInkSide ? inkSign(span.own) : -inkSign(span.own)
  const at = (l: number) => toResolvedColor({ ...color.oklch, l, c: scaled(color.oklch.c, chroma) })
  const extremes = (sign > 0 ? [1, 0] : [0, 1]).map((l) => {
    const extreme = at(l)
    return { l, color: extreme, ratio: contrastOn(extreme, span.own) }
  })
  for (const extreme of extremes) {
    if (extreme.ratio < wanted) continue
    let far = extreme.l
    let near = lightnessOf(span.own.reference)
    let answer = extreme.color
    for (let halving = 0; halving < HALVINGS; halving++) {
      const middle = (near + far) / 2
      const candidate = at(middle)
      if (contrastOn(candidate, span.own) >= wanted) {
        far = middle
        answer = candidate
      } else {
        near = middle
      }
    }
    return { color: answer }
  }
  const [first, second] = extremes
  const best = second!.ratio > first!.ratio ? second! : first!
  return { color: best.color, short: { wanted, got: best.ratio } }
}

/**
 * A theme's value from its parent's.
 * @param span absent for the rules that look at neither theme (`keep`, `shift`)
 */
export function applyThemeRule(
  color: ResolvedColor,
  rule: MergedThemeRule,
  span: ThemeSpan | undefined,
): { readonly color: ResolvedColor; readonly short?: Short } {
  const { kind, chroma = 1, k = 1, lightness = 0, hue = 0 } = rule
  if (kind === 'keep') return { color }
  const c = scaled(color.oklch.c, chroma)
  if (kind === 'shift') {
    const l = lightness === 0 ? color.oklch.l : clamp01(lightnessOf(color) + lightness)
    return { color: changed(color, { l, c, h: turnedHue(color.oklch.h, hue) }) }
  }
  if (span === undefined) throw new TypeError(`The theme rule ${kind} needs both themes`)
  if (kind === 'match-contrast') return matchContrast(color, chroma, span)
  const l = lightnessOf(color)
  if (kind === 'mirror') return { color: changed(color, { l: mirrored(l, span), c }) }
  const relative = lightnessOf(span.own.ground) + k * (l - lightnessOf(span.parent.ground))
  return { color: changed(color, { l: clamp01(relative), c }) }
}
