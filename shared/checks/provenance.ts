import type { Adjustment, DerivedState, Reference, State, ThemeRule } from './model.ts'

/** Which side a state's lightness step went to: as asked, the other one, or the roomier of two too small. */
export type StepSide = 'preferred' | 'opposite' | 'roomier'

/** A lightness step as it was taken. */
export interface StepTaken {
  readonly moved: 'lighter' | 'darker'
  /** What the rule asked for; the side says whether it was followed. */
  readonly direction: 'away' | 'towards'
  readonly reference: Reference
  readonly side: StepSide
  /** Present and true where lightness stopped at 0 or 1. */
  readonly clamped?: true
}

/** Where one resolved value comes from. Tokens and themes by id; plain data, fit for the wire. */
export type Provenance =
  | { readonly from: 'source' }
  | { readonly from: 'override' }
  | { readonly from: 'alias'; readonly token: string; readonly state: State }
  | {
      readonly from: 'derived'
      readonly token: string
      readonly state: State
      readonly adjustment: Adjustment
    }
  | {
      readonly from: 'state-rule'
      readonly state: DerivedState
      readonly adjustment: Required<Adjustment>
      /** Absent where the rule has no lightness step, or rest is translucent. */
      readonly step?: StepTaken
      /** Added to alpha instead of the lightness step, where rest is translucent. */
      readonly alphaStep?: number
    }
  | {
      readonly from: 'theme-rule'
      readonly theme: string
      readonly rule: ThemeRule & { readonly kind: NonNullable<ThemeRule['kind']> }
      /** Where neither black nor white reaches the parent's ratio. */
      readonly short?: { readonly wanted: number; readonly got: number }
    }

/** Writes a number with at most four decimals and no trailing zeros. */
function plain(value: number): string {
  return String(Number(value.toFixed(4)))
}

function referenceText(reference: Reference, nameOf: (id: string) => string): string {
  return typeof reference === 'string' ? reference : nameOf(reference.token)
}

function adjustmentText(adjustment: Adjustment): string[] {
  const { lightness = 0, chroma = 1, hue = 0, alpha = 1 } = adjustment
  return [
    ...(lightness === 0
      ? []
      : [`lightness ${lightness > 0 ? '+' : '−'} ${plain(Math.abs(lightness))}`]),
    ...factorsText(chroma, hue, alpha),
  ]
}

function factorsText(chroma: number, hue: number, alpha: number): string[] {
  return [
    ...(chroma === 1 ? [] : [`chroma × ${plain(chroma)}`]),
    ...(hue === 0 ? [] : [`hue ${hue > 0 ? '+' : '−'} ${plain(Math.abs(hue))}°`]),
    ...(alpha === 1 ? [] : [`alpha × ${plain(alpha)}`]),
  ]
}

function stepText(lightness: number, step: StepTaken, nameOf: (id: string) => string): string {
  const aim = `${step.direction === 'away' ? 'away from' : 'towards'} ${referenceText(step.reference, nameOf)}`
  const side = {
    preferred: aim,
    opposite: `${step.moved}, no room ${aim}`,
    roomier: `${step.moved}, the roomier side`,
  }[step.side]
  return `${plain(lightness)} ${side}${step.clamped ? ', clamped' : ''}`
}

function stateRuleText(
  provenance: Extract<Provenance, { from: 'state-rule' }>,
  nameOf: (id: string) => string,
): string {
  const { state, adjustment, step, alphaStep } = provenance
  const parts = [
    ...(step ? [stepText(adjustment.lightness, step, nameOf)] : []),
    ...factorsText(adjustment.chroma, adjustment.hue, adjustment.alpha),
    ...(alphaStep ? [`alpha + ${plain(alphaStep)}`] : []),
  ]
  return `${state}: ${parts.length === 0 ? 'as rest' : parts.join(', ')}`
}

function themeRuleText(
  provenance: Extract<Provenance, { from: 'theme-rule' }>,
  nameOf: (id: string) => string,
): string {
  const { rule, short } = provenance
  const { kind, k = 1, chroma = 1, lightness = 0, hue = 0, against = 'ground' } = rule
  if (kind === 'keep') return 'keep'
  const parts: string[] = [kind]
  if (kind === 'relative' && k !== 1) parts.push(`k ${plain(k)}`)
  if (kind === 'match-contrast') parts.push(`against ${referenceText(against, nameOf)}`)
  if (kind === 'shift') parts.push(...adjustmentText({ lightness, hue }))
  if (chroma !== 1) parts.push(`chroma × ${plain(chroma)}`)
  if (short) parts.push(`short: ${truncated(short.got)} of ${truncated(short.wanted)}`)
  return parts.join(', ')
}

/** Ratios are cut, never rounded up. */
function truncated(ratio: number): string {
  return (Math.floor(ratio * 100) / 100).toFixed(2)
}

/**
 * One line for the reader that says where a value comes from, such as `hover: 0.05 away from ground`,
 * `mirror, chroma × 0.92`, `{action.fill} hover` or `source`.
 * @param nameOf the present name of a token id
 */
export function describeProvenance(provenance: Provenance, nameOf: (id: string) => string): string {
  switch (provenance.from) {
    case 'source':
      return 'source'
    case 'override':
      return 'override'
    case 'alias':
      return `{${nameOf(provenance.token)}}${provenance.state === 'rest' ? '' : ` ${provenance.state}`}`
    case 'derived':
      return [
        `from {${nameOf(provenance.token)}}${provenance.state === 'rest' ? '' : ` ${provenance.state}`}`,
        ...adjustmentText(provenance.adjustment),
      ].join(', ')
    case 'state-rule':
      return stateRuleText(provenance, nameOf)
    case 'theme-rule':
      return themeRuleText(provenance, nameOf)
  }
}
