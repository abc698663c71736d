import type { Advisory, Outcome, Use } from '#shared/checks/model.ts'
import { requiredRatio } from '#shared/checks/uses.ts'
import type { SarifRule } from './sarif-log.ts'

/** What a reader of a log must not make of it. */
export const CAUTION =
  'Contrast is one criterion; neither this result nor its absence is a statement of conformity.'

const WCAG = 'https://www.w3.org/TR/WCAG22/'

type Said = Pick<SarifRule, 'id' | 'name'> & { readonly short: string; readonly anchor?: string }

const ruleFrom = ({ id, name, short, anchor }: Said, level: 'error' | 'none'): SarifRule => ({
  id,
  name,
  shortDescription: { text: short },
  help: { text: CAUTION },
  ...(anchor === undefined ? {} : { helpUri: `${WCAG}#${anchor}` }),
  defaultConfiguration: { level },
})

const CRITERIA: readonly Said[] = [
  {
    id: 'WCAG-1.4.1',
    name: 'UseOfColor',
    short: 'A link is told from the text around it by colour alone, and by less than 3:1 (G183).',
    anchor: 'use-of-color',
  },
  {
    id: 'WCAG-1.4.3',
    name: 'ContrastMinimum',
    short: 'Text has less contrast than 4.5:1, large text less than 3:1.',
    anchor: 'contrast-minimum',
  },
  {
    id: 'WCAG-1.4.6',
    name: 'ContrastEnhanced',
    short: 'Text has less contrast than 7:1, large text less than 4.5:1.',
    anchor: 'contrast-enhanced',
  },
  {
    id: 'WCAG-1.4.11',
    name: 'NonTextContrast',
    short: 'What identifies a component, its state or a graphic has less contrast than 3:1.',
    anchor: 'non-text-contrast',
  },
  {
    id: 'WCAG-2.4.13',
    name: 'FocusAppearance',
    short: 'A focus indicator differs by less than 3:1 from the same pixels unfocused.',
    anchor: 'focus-appearance',
  },
]

const OWN: readonly Said[] = [
  {
    id: 'pair-minimum',
    name: 'PairMinimum',
    short: 'A pair meets what WCAG asks of it, and not the higher ratio that is set for it.',
  },
  {
    id: 'display-p3',
    name: 'DisplayP3',
    short:
      "A pair falls short by WCAG's ratio on P3 luminance, outside its definition, and meets it on sRGB.",
  },
  {
    id: 'disabled-floor',
    name: 'DisabledFloor',
    short: "A disabled component, which WCAG exempts, is under the design system's own floor.",
  },
]

const ADVISORIES: readonly (Said & { readonly id: Advisory['code'] })[] = [
  {
    id: 'double-flip',
    name: 'DoubleFlip',
    short: 'A theme overrides a token with an alias of one that the theme already moves.',
  },
  {
    id: 'state-invisible',
    name: 'StateInvisible',
    short: 'A state can hardly be told from rest.',
  },
]

/** Every rule a result may name: success criteria of WCAG 2.2, a system's own, advisories. */
export const SARIF_RULES: readonly SarifRule[] = [
  ...[...CRITERIA, ...OWN].map((said) => ruleFrom(said, 'error')),
  ...ADVISORIES.map((said) => ruleFrom(said, 'none')),
]

interface Criterion {
  readonly id: string
  /** What the criterion itself asks for. */
  readonly ratio: number
}

const CRITERION: Readonly<Record<Use, readonly [aa: string, aaa: string]>> = {
  text: ['WCAG-1.4.3', 'WCAG-1.4.6'],
  'large-text': ['WCAG-1.4.3', 'WCAG-1.4.6'],
  'non-text': ['WCAG-1.4.11', 'WCAG-1.4.11'],
  'focus-adjacent': ['WCAG-1.4.11', 'WCAG-1.4.11'],
  'focus-change': ['WCAG-2.4.13', 'WCAG-2.4.13'],
  'link-in-text': ['WCAG-1.4.1', 'WCAG-1.4.1'],
}

const criterionOf = (use: Use, required: number): Criterion => {
  const [aa, aaa] = CRITERION[use]
  const enhanced = requiredRatio(use, 'AAA')
  if (required >= enhanced) return { id: aaa, ratio: enhanced }
  return { id: aa, ratio: requiredRatio(use, 'AA') || enhanced }
}

/** What decides which rule a finding belongs to. */
export interface Ruled {
  readonly use: Use
  /** The one that decides. */
  readonly ratio: number
  /** WCAG's own measure, where the ratio on P3 luminance decides. */
  readonly srgbRatio?: number | undefined
  readonly required: number
  readonly outcome: Outcome
  readonly reason?: string | undefined
}

const FALLS_SHORT: readonly Outcome[] = ['breach', 'waived', 'known']

/**
 * The rule that a finding belongs to: the criterion that asks for its ratio, or the system's own wish where
 * the criterion is met by WCAG's own measure, or exempts.
 * @see https://www.w3.org/TR/WCAG22/
 */
export function ruleIdOf({ use, ratio, srgbRatio, required, outcome, reason }: Ruled): string {
  if (reason === 'disabled-floor') return 'disabled-floor'
  const criterion = criterionOf(use, required)
  if (!FALLS_SHORT.includes(outcome)) return criterion.id
  if (srgbRatio !== undefined && srgbRatio >= required) return 'display-p3'
  const isMet = (srgbRatio ?? ratio) >= criterion.ratio || required < criterion.ratio
  return isMet ? 'pair-minimum' : criterion.id
}
