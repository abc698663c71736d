import type * as z from 'zod'
import { DERIVED_STATES, type ModelFault, type TokenModel } from '#shared/checks/model.ts'
import type { Deprecation, GovernedToken } from '#shared/checks/governed-model.ts'
import {
  type Decision,
  refuse,
  refuseFaults,
  type SystemIndex,
} from '#shared/contracts/governed-system.ts'
import type { createTokenBody, patchTokenBody } from '#shared/contracts/tokens.contract.ts'
import {
  pointerSegment,
  type Reading,
  readRuleScope,
  readStateValues,
  readThemeKey,
  readTokenName,
  readValue,
} from '#shared/contracts/wire-values.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'
import { nameRefusal } from './token-names.rules.ts'
import { describeUses, usesOf } from './token-uses.rules.ts'

export type CreateTokenBody = z.output<typeof createTokenBody>
export type PatchTokenBody = z.output<typeof patchTokenBody>

/** A token to be added at the end of the ledger. */
export function decideCreate(index: SystemIndex, body: CreateTokenBody, id: string): Decision {
  const clash = nameRefusal(index, body.name, id)
  if (clash) return clash
  const reading: Reading = { names: index.names, faults: [] }
  const token: GovernedToken = {
    id,
    name: body.name,
    value: readValue(body.value, '/value', reading),
    locked: body.locked ?? false,
    ...readStates(body.states ?? []),
    ...readValues(index, body.values ?? {}, reading),
    ...(body.rules ? { rules: readRuleScope(body.rules, '/rules', reading) } : {}),
    ...(body.description ? { description: body.description } : {}),
    ...(body.deprecated ? { deprecated: readDeprecation(body.deprecated, reading) } : {}),
  }
  if (reading.faults.length > 0) return refuseFaults(reading.faults)
  return { ok: true, edits: { tokens: { put: [token] } }, pointerOf: pointersOf(index, token) }
}

/** An edit of a token; what the body does not name stays. */
export function decidePatch(
  index: SystemIndex,
  before: GovernedToken,
  body: PatchTokenBody,
): Decision {
  if (body.name !== undefined && body.name !== before.name) {
    const clash = nameRefusal(index, body.name, before.id)
    if (clash) return clash
  }
  const reading: Reading = { names: index.names, faults: [] }
  const token = patched(index, before, body, reading)
  if (reading.faults.length > 0) return refuseFaults(reading.faults)
  if (before.locked && token.locked && coloursMoved(before, token)) {
    const detail = `${before.name} is locked: send "locked": false with this edit, or before it`
    return refuse('token-locked', detail)
  }
  return {
    ok: true,
    edits: { tokens: { put: [token] } },
    pointerOf: pointersOf(index, token),
    // A token without states of its own has its target's, so that a value may move them as well.
    weakenedAt: () => (body.states === undefined ? '/value' : '/states'),
  }
}

/** The removal of a token that nothing uses. */
export function decideDelete(index: SystemIndex, token: GovernedToken): Decision {
  if (token.locked) return refuse('token-locked', `${token.name} is locked`)
  const uses = usesOf(index.model, token.id)
  if (uses.length > 0) {
    return refuse('token-in-use', `${token.name} is used ${describeUses(uses)}`)
  }
  return { ok: true, edits: { tokens: { remove: [token.id] } } }
}

const readStates = (states: readonly string[]) => ({
  states: DERIVED_STATES.filter((state) => states.includes(state)),
})

function readValues(
  { model }: SystemIndex,
  wire: NonNullable<CreateTokenBody['values']>,
  reading: Reading,
): { values: TokenModel['values'] } {
  const values: Record<string, TokenModel['values'][string]> = {}
  for (const [key, byState] of Object.entries(wire)) {
    const at = `/values/${pointerSegment(key)}`
    if (key === model.themes[0]?.key && byState.rest !== undefined) {
      const detail = `${key} is the base theme: its rest colour is the token's value`
      reading.faults.push({ pointer: `${at}/rest`, detail })
    }
    const read = readStateValues(byState, at, reading)
    const theme = readThemeKey(key, at, reading)
    if (Object.keys(read).length > 0) values[theme] = read
  }
  return { values }
}

function readDeprecation(
  { reason, replacement, sunset }: NonNullable<CreateTokenBody['deprecated']>,
  reading: Reading,
): Deprecation {
  return {
    ...(reason === undefined ? {} : { reason }),
    ...(replacement === undefined
      ? {}
      : { replacement: readTokenName(replacement, '/deprecated/replacement', reading) }),
    ...(sunset === undefined ? {} : { sunset }),
  }
}

function patched(
  index: SystemIndex,
  before: GovernedToken,
  body: PatchTokenBody,
  reading: Reading,
): GovernedToken {
  const { rules, description, deprecated, ...kept } = before
  const described = body.description === undefined ? description : body.description
  const scope =
    body.rules === undefined ? rules : body.rules && readRuleScope(body.rules, '/rules', reading)
  const ending =
    body.deprecated === undefined
      ? deprecated
      : body.deprecated && readDeprecation(body.deprecated, reading)
  return {
    ...kept,
    ...(body.name === undefined ? {} : { name: body.name }),
    ...(body.value === undefined ? {} : { value: readValue(body.value, '/value', reading) }),
    ...(body.states === undefined ? {} : readStates(body.states)),
    ...(body.values === undefined ? {} : readValues(index, body.values, reading)),
    ...(body.locked === undefined ? {} : { locked: body.locked }),
    ...(scope ? { rules: scope } : {}),
    ...(described ? { description: described } : {}),
    ...(ending ? { deprecated: ending } : {}),
  }
}

/** What a lock holds: everything that a colour of the token follows from. */
function coloursMoved(before: GovernedToken, after: GovernedToken): boolean {
  const part = ({ value, states, values, rules }: GovernedToken) =>
    canonicalJson({ value, states, values, rules })
  return part(before) !== part(after)
}

function pointersOf({ model, names, themesById }: SystemIndex, token: GovernedToken) {
  return ({ code, theme, state, ...fault }: ModelFault): string | undefined => {
    const { ground, ink } = themesById.get(theme ?? '') ?? {}
    const isItsTheme = ground === token.id || ink === token.id
    if (fault.token !== token.id && !(fault.token === undefined && isItsTheme)) return undefined
    const own = theme === undefined ? undefined : token.values[theme]
    const isBase = theme === undefined || theme === model.themes[0]?.id
    if (own === undefined) return isBase || code !== 'theme-unset' ? '/value' : '/values'
    if (theme === undefined) return '/value'
    const at = `/values/${pointerSegment(names.themeKey(theme))}`
    return state !== undefined && own[state] ? `${at}/${state}` : at
  }
}
