import {
  DERIVED_STATES,
  type SourceValue,
  type State,
  type TokenModel,
} from '#shared/checks/model.ts'
import type { Deprecation, GovernedToken } from '#shared/checks/governed-model.ts'
import type { SystemIndex } from '#shared/contracts/governed-system.ts'
import {
  pointerSegment,
  type Reading,
  readRuleScope,
  readThemeKey,
  readTokenName,
} from '#shared/contracts/wire-values.ts'
import type { FileToken, FileValue, FileValues, ImportFile } from './import-file.ts'
import type { Identities } from './import-names.rules.ts'

/** Where our own words of a token stand in a file. */
const EXTENSION = '/$extensions/dev.dyewright'

interface TokensOf {
  readonly index: SystemIndex
  readonly file: ImportFile
  readonly identities: Identities
  readonly reading: Reading
}

/** The tokens of a file as they will be; what it does not say of a token that stands, stays. */
export function tokensOf({ index, file, identities, reading }: TokensOf): GovernedToken[] {
  return file.tokens.map((given) => {
    const id = identities.tokens.get(given) ?? ''
    const standing = index.tokensById.get(id)
    const kept = file.isWhole ? undefined : standing
    const { description = kept?.description, rules } = given
    const value = sourceOf(given.value, `${given.pointer}/$value`, reading)
    const scope = rules
      ? readRuleScope(rules, `${given.pointer}${EXTENSION}/rules`, reading)
      : kept?.rules
    const deprecated = given.deprecated
      ? deprecationOf(given, reading, kept?.deprecated)
      : kept?.deprecated
    return {
      id,
      name: given.name,
      value,
      states: given.states
        ? DERIVED_STATES.filter((state) => given.states?.includes(state))
        : (kept?.states ?? []),
      values: { ...kept?.values, ...valuesOf(given, reading) },
      ...(scope ? { rules: scope } : {}),
      ...(description ? { description } : {}),
      ...(deprecated ? { deprecated } : {}),
      locked: given.locked ?? kept?.locked ?? false,
    }
  })
}

export function sourceOf(value: FileValue, pointer: string, reading: Reading): SourceValue {
  if (value.kind === 'color') return { kind: 'color', color: value.color }
  const { name, ...rest } = value
  return { ...rest, token: readTokenName(name, pointer, reading) }
}

function valuesOf({ values = {}, pointer }: FileToken, reading: Reading): TokenModel['values'] {
  const read = Object.entries(values).flatMap(([key, byState]) => {
    const at = `${pointer}${EXTENSION}/values/${pointerSegment(key)}`
    const states = statesOf(byState, at, reading)
    return Object.keys(states).length === 0 ? [] : [[readThemeKey(key, at, reading), states]]
  })
  return Object.fromEntries(read)
}

const statesOf = (byState: FileValues, at: string, reading: Reading) =>
  Object.fromEntries(
    (Object.entries(byState) as [State, FileValue][]).map(([state, value]) => [
      state,
      sourceOf(value, `${at}/${state}`, reading),
    ]),
  )

/** The format knows a reason at most: what else stands of the same reason stays. */
function deprecationOf(
  { deprecated = {}, pointer }: FileToken,
  reading: Reading,
  kept: Deprecation | undefined,
): Deprecation {
  const { reason, replacement, sunset } = deprecated
  const says = replacement !== undefined || sunset !== undefined
  if (!says && kept && (reason === undefined || kept.reason === reason)) return kept
  const at = `${pointer}${EXTENSION}/deprecated/replacement`
  return {
    ...(reason === undefined ? {} : { reason }),
    ...(replacement === undefined ? {} : { replacement: readTokenName(replacement, at, reading) }),
    ...(sunset === undefined ? {} : { sunset }),
  }
}
