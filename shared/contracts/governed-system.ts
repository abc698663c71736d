import type {
  GovernedEdits,
  GovernedSystem,
  GovernedTheme,
  GovernedToken,
} from '#shared/checks/governed-model.ts'
import type { ModelFault, PairModel } from '#shared/checks/model.ts'
import type { Weakening } from '#shared/checks/weakening-kinds.ts'
import type { Fault, ProblemCode } from './problems.ts'
import type { ModelNames, WireNames } from './wire-values.ts'

/** A governed system that can be looked up in. */
export interface SystemIndex {
  readonly model: GovernedSystem
  readonly tokensById: ReadonlyMap<string, GovernedToken>
  readonly tokensByName: ReadonlyMap<string, GovernedToken>
  readonly themesById: ReadonlyMap<string, GovernedTheme>
  readonly themesByKey: ReadonlyMap<string, GovernedTheme>
  readonly pairsById: ReadonlyMap<string, PairModel>
  /** Names to ids and back; an id that is not there any more answers with itself. */
  readonly names: WireNames & ModelNames
}

/** Makes the look-ups of a system, in time linear in its items. */
export function indexSystem(model: GovernedSystem): SystemIndex {
  const tokensById = new Map(model.tokens.map((token) => [token.id, token]))
  const tokensByName = new Map(model.tokens.map((token) => [token.name, token]))
  const themesById = new Map(model.themes.map((theme) => [theme.id, theme]))
  const themesByKey = new Map(model.themes.map((theme) => [theme.key, theme]))
  return {
    model,
    tokensById,
    tokensByName,
    themesById,
    themesByKey,
    pairsById: new Map(model.pairs.map((pair) => [pair.id, pair])),
    names: {
      tokenId: (name) => tokensByName.get(name)?.id,
      themeId: (key) => themesByKey.get(key)?.id,
      tokenName: (id) => tokensById.get(id)?.name ?? id,
      themeKey: (id) => themesById.get(id)?.key ?? id,
    },
  }
}

/** Why a write is refused. */
export interface Refusal {
  readonly code: ProblemCode
  readonly detail?: string
  readonly faults?: readonly Fault[]
}

/** What a write comes to on a system as it stands: edits, or a refusal. */
export type Decision =
  | {
      readonly ok: true
      readonly edits: GovernedEdits
      /** Where in the body a fault of resolution lies, where that can be told. */
      readonly pointerOf?: (fault: ModelFault) => string | undefined
      /** Where in the body something is weakened, where that can be told. */
      readonly weakenedAt?: (weakening: Weakening) => string | undefined
    }
  | { readonly ok: false; readonly refusal: Refusal }

/** A refusal as the outcome of a decision. */
export function refuse(
  code: ProblemCode,
  detail?: string,
  faults?: readonly Fault[],
): { readonly ok: false; readonly refusal: Refusal } {
  return {
    ok: false,
    refusal: { code, ...(detail === undefined ? {} : { detail }), ...(faults ? { faults } : {}) },
  }
}

/** The refusal of a body that was read and has faults. */
export const refuseFaults = (faults: readonly Fault[]) =>
  refuse('request-invalid', undefined, faults)

/** Points at the member of the body that weakens the item it is about. */
export const memberOf =
  (item: Weakening['item']): NonNullable<Extract<Decision, { ok: true }>['weakenedAt']> =>
  (weakening) => {
    const isIt = isSameItem(weakening.item, item)
    return isIt && weakening.member !== undefined ? `/${weakening.member}` : undefined
  }

const isSameItem = (one: Weakening['item'], other: Weakening['item']): boolean =>
  one.kind === 'system' || other.kind === 'system'
    ? one.kind === other.kind
    : one.kind === other.kind && one.id === other.id
