import { mappedChroma } from '#shared/color/gamut-map.ts'
import { adjusted, changed, clamp01, lightnessOf, scaled, turnedHue } from './color-arithmetic.ts'
import { DERIVED_STATES, type DerivedState } from './model.ts'
import type { Provenance, StepSide } from './provenance.ts'
import type { ResolvedColor } from './resolved.ts'
import type { MergedStateRule } from './rule-scopes.ts'

/** Nearer to the reference than this, a colour lies on neither side of it. */
const SIDE_LIGHTNESS = 0.02

/** Below this, rest has too little chroma to lose half of it visibly. */
const TESTED_CHROMA = 0.02

/** What a translucent rest gains in alpha instead of a lightness step. */
const ALPHA_STEPS: Readonly<Partial<Record<DerivedState, number>>> = { hover: 0.05, active: 0.1 }

/** The largest lightness step among a token's states; ties go to the first of hover, active, focus, disabled. */
export interface LargestStep {
  readonly lightness: number
  readonly towards: MergedStateRule['towards']
}

/** The direction that all states of a token take in one theme. */
export interface StepDirection {
  /** 1 for lighter, -1 for darker. */
  readonly sign: 1 | -1
  readonly side: StepSide
  readonly towards: MergedStateRule['towards']
}

/** Finds the step that decides the direction for all states, overridden or not. */
export function largestStep(
  states: readonly DerivedState[],
  ruleOf: (state: DerivedState) => MergedStateRule,
): LargestStep | undefined {
  let largest: LargestStep | undefined
  for (const state of DERIVED_STATES) {
    if (!states.includes(state)) continue
    const { lightness, towards } = ruleOf(state)
    if (largest === undefined || lightness > largest.lightness) largest = { lightness, towards }
  }
  return largest
}

/** The side a rule asks for; a colour next to its reference goes towards ink, ink itself lighter. */
function preferredSign(
  rest: ResolvedColor,
  aim: {
    direction: 'away' | 'towards'
    reference: ResolvedColor
    ink: ResolvedColor
  },
): 1 | -1 {
  const l = lightnessOf(rest)
  const distance = l - lightnessOf(aim.reference)
  if (Math.abs(distance) < SIDE_LIGHTNESS) {
    return lightnessOf(aim.ink) >= l ? 1 : -1 // Ink itself is level with ink.
  }
  const away = distance > 0 ? 1 : -1
  return aim.direction === 'away' ? away : away === 1 ? -1 : 1
}

/** Whether a step stays within 0 to 1 and keeps at least half of rest's chroma once mapped into sRGB. */
function hasRoom(rest: ResolvedColor, lightness: number): boolean {
  if (lightness < 0 || lightness > 1) return false
  const c = rest.oklch.c ?? 0
  const h = rest.oklch.h ?? 0
  const own = mappedChroma(lightnessOf(rest), c, h)
  return own < TESTED_CHROMA || mappedChroma(lightness, c, h) >= own / 2
}

/** Decides the one direction of a token's states in a theme. */
export function stepDirection(
  rest: ResolvedColor,
  aim: {
    readonly step: LargestStep
    readonly reference: ResolvedColor
    readonly ink: ResolvedColor
  },
): StepDirection {
  const { step } = aim
  const preferred = preferredSign(rest, { ...aim, direction: step.towards.direction })
  const opposite = preferred === 1 ? -1 : 1
  const l = lightnessOf(rest)
  const { towards } = step
  if (hasRoom(rest, l + preferred * step.lightness)) {
    return { sign: preferred, side: 'preferred', towards }
  }
  if (hasRoom(rest, l + opposite * step.lightness)) {
    return { sign: opposite, side: 'opposite', towards }
  }
  const roomOn = (sign: number) => (sign === 1 ? 1 - l : l)
  const sign = roomOn(opposite) > roomOn(preferred) ? opposite : preferred
  return { sign, side: 'roomier', towards }
}

type StateProvenance = Extract<Provenance, { from: 'state-rule' }>

/** Derives a state from rest; arithmetic is on the stored, unmapped colour. */
export function applyStateRule(
  rest: ResolvedColor,
  derivation: {
    readonly state: DerivedState
    readonly rule: MergedStateRule
    /** Needed where the rule has a lightness step and rest is opaque. */
    readonly direction: StepDirection | undefined
  },
): { readonly color: ResolvedColor; readonly provenance: StateProvenance } {
  const { state, rule, direction } = derivation
  const { lightness, chroma, hue, alpha } = rule
  const base = { from: 'state-rule', state, adjustment: { lightness, chroma, hue, alpha } } as const
  if (lightness === 0) return { color: adjusted(rest, { chroma, hue, alpha }), provenance: base }
  const { oklch } = rest
  if (isTranslucent(rest)) {
    const alphaStep = ALPHA_STEPS[state] ?? 0
    const color = changed(rest, {
      c: scaled(oklch.c, chroma),
      h: turnedHue(oklch.h, hue),
      alpha: clamp01((oklch.alpha ?? 0) * alpha + alphaStep),
    })
    return { color, provenance: { ...base, alphaStep } }
  }
  if (direction === undefined) throw new TypeError(`The ${state} step needs a direction`)
  const wanted = lightnessOf(rest) + direction.sign * lightness
  const step = {
    moved: direction.sign === 1 ? 'lighter' : 'darker',
    ...direction.towards,
    side: direction.side,
    ...(wanted < 0 || wanted > 1 ? { clamped: true as const } : {}),
  } as const
  const color = adjusted(rest, { lightness: direction.sign * lightness, chroma, hue, alpha })
  return { color, provenance: { ...base, step } }
}

/** Whether the stored alpha is below 1, a missing one included. */
export function isTranslucent(color: ResolvedColor): boolean {
  return (color.oklch.alpha ?? 0) < 1
}
