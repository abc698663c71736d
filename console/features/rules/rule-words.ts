import { signed } from '#console/lib/value-words.ts'
import type { StateRuleWire, ThemeRuleWire } from '#shared/contracts/rules.contract.ts'
import { unbraced } from './theme-rule-text.ts'

/** What each kind of theme rule does, as the end of a sentence on a theme's colours. */
export const KIND_WORDS = {
  mirror: 'mirror their lightness between ground and ink',
  relative: 'keep their distance from the ground',
  'match-contrast': 'match the contrast they have in the parent',
  shift: 'shift from the parent’s',
  keep: 'keep the parent’s',
} as const satisfies { [kind in NonNullable<ThemeRuleWire['kind']>]: string }

/** `mirror their lightness between ground and ink, chroma × 0.92` */
export function themeRuleInWords(rule: ThemeRuleWire): string {
  const { kind, against, k, chroma, lightness, hue } = rule
  const parts = [
    kind === undefined ? undefined : KIND_WORDS[kind],
    kind === 'match-contrast' || against !== undefined
      ? `against ${unbraced(against) || 'ground'}`
      : undefined,
    k === undefined ? undefined : `times ${k}`,
    lightness === undefined ? undefined : `lightness ${signed(lightness)}`,
    chroma === undefined ? undefined : `chroma × ${chroma}`,
    hue === undefined ? undefined : `hue ${signed(hue)}°`,
  ].filter((part) => part !== undefined)
  return parts.length === 0 ? 'follow the wider rule' : parts.join(', ')
}

/** `0.05 away from ground, chroma × 0.9`; nothing where the rule says nothing. */
export function stateRuleInWords(rule: StateRuleWire | undefined): string {
  if (rule === undefined) return ''
  const { lightness, chroma, hue, alpha, away, towards } = rule
  const side =
    away !== undefined
      ? `away from ${unbraced(away)}`
      : towards !== undefined
        ? `towards ${unbraced(towards)}`
        : undefined
  const step = lightness === undefined ? side : [String(lightness), side].filter(Boolean).join(' ')
  return [
    step,
    chroma === undefined ? undefined : `chroma × ${chroma}`,
    hue === undefined ? undefined : `hue ${signed(hue)}°`,
    alpha === undefined ? undefined : `alpha × ${alpha}`,
  ]
    .filter((part) => part !== undefined)
    .join(', ')
}
