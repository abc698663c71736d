import { ENGINE_STAMP } from '#shared/checks/engine.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { GovernedToken } from '#shared/checks/governed-model.ts'
import { type SourceValue, type State, STATES } from '#shared/checks/model.ts'
import { describeProvenance } from '#shared/checks/provenance.ts'
import { colorOf, statesOf } from '#shared/checks/resolved.ts'
import type { SystemIndex } from '#shared/contracts/governed-system.ts'
import {
  presentPair,
  presentSettings,
  presentTheme,
  presentToken,
} from '#shared/contracts/present-items.ts'
import { writeRuleScope, writeStateRules } from '#shared/contracts/wire-values.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'
import { readDtcgColor } from '#shared/formats/dtcg-color.ts'
import type { JsonObject } from '#shared/formats/dtcg-fault.ts'
import {
  type ResolverColor,
  type ResolverToken,
  systemResolver,
} from '#shared/formats/system-resolver.ts'
import { type Remainder, readRemainder } from './import-remainder.rules.ts'

interface MeasuredSystem {
  readonly index: SystemIndex
  readonly evaluation: Evaluation
}

/** The whole system as one resolver file, so that it can be read back as it is. */
export function presentResolverFile(system: MeasuredSystem): string {
  const { model } = system.index
  const remainder = readRemainder(model.remainder)
  const tokens = model.tokens.map((token) => resolverToken(token, system, remainder))
  const states = STATES.filter(
    (state) => state !== 'rest' && tokens.some(({ colors }) => colors[0]?.[state]),
  )
  const document = systemResolver({
    themes: model.themes.map(({ key }) => key),
    states,
    tokens,
    extension: rootExtension(system.index),
    remainder: remainder.document,
    ...(remainder.resolver === undefined ? {} : { besides: remainder.resolver }),
  })
  return `${JSON.stringify(document, undefined, 2)}\n`
}

function rootExtension({ model, names }: SystemIndex): JsonObject {
  const { distinctSets = [] } = model
  return {
    engine: ENGINE_STAMP,
    ledger: model.tokens.map(({ name }) => name),
    settings: presentSettings(model.settings),
    rules: {
      states: writeStateRules(model.states, names),
      prefixes: model.prefixes.map(({ prefix, ...scope }) => ({
        prefix,
        ...writeRuleScope(scope, names),
      })),
    },
    themes: model.themes.map((theme) => presentTheme(theme, { model, names })),
    pairs: model.pairs.map((pair) => presentPair(pair, names)),
    distinctSets: distinctSets.map(({ id, name, tokens }) => ({
      id,
      name,
      tokens: tokens.map((token) => names.tokenName(token)),
    })),
  }
}

function resolverToken(
  token: GovernedToken,
  system: MeasuredSystem,
  remainder: Remainder,
): ResolverToken {
  const { index, evaluation } = system
  const { model } = index
  const { name, description, deprecated, value } = token
  const reason = deprecated && (deprecated.reason ?? true)
  const states = statesShown(token, system)
  const colors = model.themes.map(({ id: theme }) =>
    Object.fromEntries(
      states.map((state) => [state, colorIn({ token: token.id, theme, state }, system)]),
    ),
  )
  const besides = remainder.tokens[token.id]
  return {
    name,
    ...(description === undefined ? {} : { description }),
    ...(reason === undefined ? {} : { deprecated: reason }),
    ...aliasOf(value, system),
    colors: colors.length > 0 ? colors : [unthemed(value)],
    follows: model.themes.map((theme) => follows(token, theme.id, evaluation)),
    extension: tokenExtension(token, index),
    ...(besides === undefined ? {} : { besides: speltAsNow(besides, value) }),
  }
}

/** Before there is a theme nothing is resolved: a source stands for itself, and any other token for its target. */
const unthemed = (value: SourceValue): Record<string, ResolverColor> =>
  value.kind === 'color' ? { rest: { color: value.color } } : {}

function aliasOf(value: SourceValue, { index: { model, names } }: MeasuredSystem) {
  const isWritten = value.kind === 'alias' || (value.kind === 'derived' && !model.themes[0])
  return isWritten ? { alias: names.tokenName(value.token) } : {}
}

/** An alias shows its target's states too: another resolver would let them through. */
function statesShown({ id, value }: GovernedToken, { evaluation }: MeasuredSystem): State[] {
  if (evaluation.resolved.model.themes.length === 0) return []
  const own = statesOf(evaluation.resolved, id)
  const target = value.kind === 'alias' ? statesOf(evaluation.resolved, value.token) : []
  return STATES.filter((state) => own.includes(state) || target.includes(state))
}

interface Place {
  readonly token: string
  readonly theme: string
  readonly state: State
}

function colorIn(place: Place, { index, evaluation }: MeasuredSystem): ResolverColor {
  const { oklch, provenance } = colorOf(evaluation.resolved, place)
  const isSet = provenance.from === 'source' || provenance.from === 'override'
  return {
    color: oklch,
    ...(isSet ? {} : { rule: describeProvenance(provenance, index.names.tokenName) }),
  }
}

/** Whether the alias gives a theme's rest as the engine does. */
function follows({ id, value }: GovernedToken, theme: string, { resolved }: Evaluation): boolean {
  if (value.kind !== 'alias') return false
  const at = { theme, state: 'rest' as const }
  const own = colorOf(resolved, { ...at, token: id })
  const target = colorOf(resolved, { ...at, token: value.token })
  return canonicalJson(own.oklch) === canonicalJson(target.oklch)
}

/** What of a token the format has no words for. */
function tokenExtension(token: GovernedToken, { names }: SystemIndex): JsonObject {
  const { id, value, states, values, rules, locked, deprecated } = presentToken(token, names)
  const isMore = deprecated?.replacement !== undefined || deprecated?.sunset !== undefined
  return {
    id,
    ...(states.length > 0 ? { states } : {}),
    ...(Object.keys(values).length > 0 ? { values } : {}),
    ...(rules === undefined ? {} : { rules }),
    ...(locked ? { locked } : {}),
    ...(isMore ? { deprecated } : {}),
    ...(token.value.kind === 'derived' ? { value } : {}),
  }
}

/** A spelling is given back as long as it says the colour that the token has. */
function speltAsNow(besides: JsonObject, value: SourceValue): JsonObject {
  const { $value, ...members } = besides
  if ($value === undefined || value.kind !== 'color') return members
  const read = readDtcgColor($value)
  const isNow = read.ok && canonicalJson(read.color) === canonicalJson(value.color)
  return isNow ? besides : members
}
