import { readNumber, numberText } from '#console/lib/read-number.ts'
import type { StateRuleWire } from '#shared/contracts/rules.contract.ts'
import { braced, type RuleReading, unbraced } from './theme-rule-text.ts'

type NumberField = 'lightness' | 'chroma' | 'hue' | 'alpha'

/** A state rule as it stands in fields; an empty one leaves the wider rule's. */
export interface StateRuleText extends Readonly<Record<NumberField, string>> {
  readonly direction: 'inherited' | 'away' | 'towards'
  /** `ground`, `ink` or a token's name. */
  readonly reference: string
}

export const STATE_FIELDS = [
  { field: 'lightness', label: 'Step', least: 0, most: 1 },
  { field: 'chroma', label: 'Chroma ×', least: 0, most: 10 },
  { field: 'hue', label: 'Hue +', least: -360, most: 360 },
  { field: 'alpha', label: 'Alpha ×', least: 0, most: 1 },
] as const satisfies readonly { field: NumberField; label: string; least: number; most: number }[]

export function stateRuleText(rule: StateRuleWire): StateRuleText {
  const direction =
    rule.away !== undefined ? 'away' : rule.towards !== undefined ? 'towards' : 'inherited'
  return {
    lightness: numberText(rule.lightness),
    chroma: numberText(rule.chroma),
    hue: numberText(rule.hue),
    alpha: numberText(rule.alpha),
    direction,
    reference: unbraced(rule.away ?? rule.towards) || 'ground',
  }
}

export function readStateRuleText(
  text: StateRuleText,
): RuleReading<StateRuleWire, NumberField | 'reference'> {
  const faults: { [field in NumberField | 'reference']?: string } = {}
  const rule: StateRuleWire = {}
  for (const { field, least, most } of STATE_FIELDS) {
    const { value, fault } = readNumber(text[field], least, most)
    if (fault !== undefined) faults[field] = fault
    if (value !== undefined) rule[field] = value
  }
  if (text.direction !== 'inherited') {
    if (text.reference.trim() === '') faults.reference = 'Name ground, ink or a token.'
    rule[text.direction] = braced(text.reference)
  }
  return Object.keys(faults).length > 0 ? { ok: false, faults } : { ok: true, rule }
}
