import type {
  Reference,
  RuleScope,
  SourceValue,
  State,
  StateRule,
  StateRules,
  ThemeRule,
} from '#shared/checks/model.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { readDtcgColor, writeDtcgColor } from '#shared/formats/dtcg-color.ts'
import type { ValueInput, ValueWire } from './fields.ts'
import type { Fault } from './problems.ts'
import type { RuleScopeWire, StateRuleWire, ThemeRuleWire } from './rules.contract.ts'

/** Names on the wire ↔ ids in the model, and where faults are gathered while reading. */
export interface WireNames {
  readonly tokenId: (name: string) => string | undefined
  readonly themeId: (key: string) => string | undefined
}

export interface ModelNames {
  readonly tokenName: (id: string) => string
  readonly themeKey: (id: string) => string
}

/** What is being read, with every fault met so far; pointers are RFC 6901. */
export interface Reading {
  readonly names: WireNames
  readonly faults: Fault[]
}

/** One segment of a JSON pointer. @see https://www.rfc-editor.org/rfc/rfc6901#section-3 */
export const pointerSegment = (text: string): string =>
  text.replaceAll('~', '~0').replaceAll('/', '~1')

const NOWHERE = ''

/** The id of a token that the wire names; a fault and an empty id where there is none. */
export function readTokenName(name: string, pointer: string, { names, faults }: Reading): string {
  const id = names.tokenId(name)
  if (id === undefined) faults.push({ pointer, detail: `There is no token named ${name}` })
  return id ?? NOWHERE
}

/** The id of a theme that the wire names; a fault and an empty id where there is none. */
export function readThemeKey(key: string, pointer: string, { names, faults }: Reading): string {
  const id = names.themeId(key)
  if (id === undefined) faults.push({ pointer, detail: `There is no theme ${key}` })
  return id ?? NOWHERE
}

const BLACK: SourceValue = { kind: 'color', color: { l: 0, c: 0, h: null, alpha: 1 } }
const unbraced = (alias: string) => alias.slice(1, -1)

const readText = (text: string, pointer: string, reading: Reading): SourceValue => {
  if (text.startsWith('{') && text.endsWith('}')) {
    return { kind: 'alias', token: readTokenName(unbraced(text), pointer, reading) }
  }
  const parsed = parseColor(text)
  if (parsed.ok) return { kind: 'color', color: parsed.color }
  reading.faults.push({ pointer, detail: parsed.reason })
  return BLACK
}

/**
 * Reads a value as a write gives it: a CSS colour, a colour object, `{name}` or a derivation.
 * @returns the model's value; where faults were added it must not be used
 */
export function readValue(input: ValueInput, pointer: string, reading: Reading): SourceValue {
  if (typeof input === 'string') return readText(input, pointer, reading)
  if ('derive' in input) {
    const { derive, ...adjustment } = input
    const token = readTokenName(unbraced(derive), `${pointer}/derive`, reading)
    return { kind: 'derived', token, ...adjustment }
  }
  const read = readDtcgColor(input)
  if (read.ok) return { kind: 'color', color: read.color }
  for (const fault of read.faults) {
    reading.faults.push({ pointer: `${pointer}${fault.pointer}`, detail: fault.detail })
  }
  return BLACK
}

/** A value as an answer gives it. */
export function writeValue(value: SourceValue, names: ModelNames): ValueWire {
  if (value.kind === 'color') return writeDtcgColor(value.color)
  if (value.kind === 'alias') return `{${names.tokenName(value.token)}}`
  const { kind: _, token, ...adjustment } = value
  return { derive: `{${names.tokenName(token)}}`, ...adjustment }
}

type ByState<V> = { readonly [state in State]?: V | undefined }

/** Reads overrides of one theme by state. */
export function readStateValues(
  input: ByState<ValueInput>,
  pointer: string,
  reading: Reading,
): { [state in State]?: SourceValue } {
  const values: { [state in State]?: SourceValue } = {}
  for (const [state, value] of Object.entries(input) as [State, ValueInput | undefined][]) {
    if (value !== undefined) values[state] = readValue(value, `${pointer}/${state}`, reading)
  }
  return values
}

/** Overrides of one theme as an answer gives them. */
export function writeStateValues(
  values: ByState<SourceValue>,
  names: ModelNames,
): { [state in State]?: ValueWire } {
  const wire: { [state in State]?: ValueWire } = {}
  for (const [state, value] of Object.entries(values) as [State, SourceValue | undefined][]) {
    if (value !== undefined) wire[state] = writeValue(value, names)
  }
  return wire
}

const readReference = (input: string, pointer: string, reading: Reading): Reference =>
  input === 'ground' || input === 'ink'
    ? input
    : { token: readTokenName(unbraced(input), pointer, reading) }

const writeReference = (reference: Reference, names: ModelNames): string =>
  typeof reference === 'string' ? reference : `{${names.tokenName(reference.token)}}`

const readStateRule = (wire: StateRuleWire, pointer: string, reading: Reading): StateRule => {
  const { away, towards, ...adjustment } = wire
  const direction = away === undefined ? 'towards' : 'away'
  const named = away ?? towards
  if (named === undefined) return adjustment
  const reference = readReference(named, `${pointer}/${direction}`, reading)
  return { ...adjustment, towards: { direction, reference } }
}

/** Reads the state rules of any scope. */
export function readStateRules(
  wire: { readonly [state in keyof StateRules]?: StateRuleWire | undefined },
  pointer: string,
  reading: Reading,
): StateRules {
  return Object.fromEntries(
    Object.entries(wire).flatMap(([state, rule]) =>
      rule ? [[state, readStateRule(rule, `${pointer}/${state}`, reading)]] : [],
    ),
  )
}

/** State rules as an answer gives them. */
export function writeStateRules(
  rules: StateRules,
  names: ModelNames,
): Record<string, StateRuleWire> {
  return Object.fromEntries(
    Object.entries(rules).map(([state, { towards, ...adjustment }]) => [
      state,
      towards
        ? { ...adjustment, [towards.direction]: writeReference(towards.reference, names) }
        : adjustment,
    ]),
  )
}

/** Reads a theme rule of any scope. */
export function readThemeRule(wire: ThemeRuleWire, pointer: string, reading: Reading): ThemeRule {
  const { against, ...rest } = wire
  return against === undefined
    ? rest
    : { ...rest, against: readReference(against, `${pointer}/against`, reading) }
}

/** A theme rule as an answer gives it. */
export function writeThemeRule(rule: ThemeRule, names: ModelNames): ThemeRuleWire {
  const { against, ...rest } = rule
  return against === undefined ? rest : { ...rest, against: writeReference(against, names) }
}

/** Reads the rules of a token or of a prefix. */
export function readRuleScope(wire: RuleScopeWire, pointer: string, reading: Reading): RuleScope {
  const themes: Record<string, ThemeRule> = {}
  for (const [key, rule] of Object.entries(wire.themes ?? {})) {
    const at = `${pointer}/themes/${pointerSegment(key)}`
    themes[readThemeKey(key, at, reading)] = readThemeRule(rule, at, reading)
  }
  return {
    ...(wire.states ? { states: readStateRules(wire.states, `${pointer}/states`, reading) } : {}),
    ...(wire.themes ? { themes } : {}),
  }
}

/** Rules of a token or of a prefix as an answer gives them. */
export function writeRuleScope(scope: RuleScope, names: ModelNames): RuleScopeWire {
  const themes = Object.entries(scope.themes ?? {}).map(([id, rule]) => [
    names.themeKey(id),
    writeThemeRule(rule, names),
  ])
  return {
    ...(scope.states ? { states: writeStateRules(scope.states, names) } : {}),
    ...(scope.themes ? { themes: Object.fromEntries(themes) } : {}),
  }
}
