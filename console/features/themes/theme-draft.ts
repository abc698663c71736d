import { valueText } from '#console/lib/value-words.ts'
import type { SystemEdits } from '#shared/checks/edits.ts'
import { STATES, type State, type SystemModel } from '#shared/checks/model.ts'
import type { Level } from '#shared/checks/model.ts'
import type { ValueInput } from '#shared/contracts/fields.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import type { ThemeRuleWire } from '#shared/contracts/rules.contract.ts'
import { themeFromWire } from '#shared/contracts/system-model.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import { type Reading, readStateValues } from '#shared/contracts/wire-values.ts'

export type StateValues = { readonly [state in State]?: ValueInput | undefined }

/** What is edited of a theme; absent members stay as they are. */
export interface ThemeDraft {
  readonly name?: string
  readonly from?: string
  readonly ground?: string
  readonly ink?: string
  readonly rule?: ThemeRuleWire
  /** `null`: the system's. */
  readonly level?: Level | null
  readonly gating?: boolean
  /** By token: what the theme sets for it, whole; `null` takes that away. */
  readonly values?: { readonly [token: string]: StateValues | null }
}

/** A theme as it would be, its own values apart. */
export type DraftedTheme = Omit<ThemeWire, 'values' | 'etag'>

export function draftedTheme(theme: DraftedTheme, draft: ThemeDraft): DraftedTheme {
  const { values: _, level, ...members } = draft
  const { level: standing, ...kept } = theme
  const next = level === undefined ? standing : (level ?? undefined)
  return { ...kept, ...members, ...(next === undefined ? {} : { level: next }) }
}

/** What a draft comes to for the engine, or what it names that is not there. */
export type ReadDraft =
  | { readonly ok: true; readonly edits: SystemEdits }
  | { readonly ok: false; readonly faults: readonly Fault[] }

/** The draft as edits of the head; a theme that is new there comes last. */
export function themeEdits(
  model: SystemModel,
  theme: DraftedTheme,
  values: ThemeDraft['values'] = {},
): ReadDraft {
  const faults: Fault[] = []
  const reading: Reading = { names: namesIn(model, theme), faults }
  const written = themeFromWire(theme, reading)
  const isThere = model.themes.some(({ id }) => id === theme.id)
  const themes = isThere
    ? model.themes.map((one) => (one.id === theme.id ? written : one))
    : [...model.themes, written]
  const put = Object.entries(values).flatMap(([name, byState]) => {
    const token = model.tokens.find((each) => each.name === name)
    if (token === undefined) {
      faults.push({ pointer: '/values', detail: `There is no token named ${name}` })
      return []
    }
    const { [theme.id]: _, ...others } = token.values
    const set = byState === null ? {} : readStateValues(byState, '/values', reading)
    return [{ ...token, values: byState === null ? others : { ...others, [theme.id]: set } }]
  })
  return faults.length > 0
    ? { ok: false, faults }
    : { ok: true, edits: { themes, tokens: { put } } }
}

/** The head without a theme, and without what was said for it alone. */
export function removalEdits(model: SystemModel, id: string): SystemEdits {
  return {
    themes: model.themes.filter((theme) => theme.id !== id),
    tokens: {
      put: model.tokens.flatMap((token) => {
        const { [id]: values, ...others } = token.values
        return values === undefined ? [] : [{ ...token, values: others }]
      }),
    },
    pairs: {
      put: model.pairs.flatMap((pair) =>
        pair.themes?.includes(id)
          ? [{ ...pair, themes: pair.themes.filter((theme) => theme !== id) }]
          : [],
      ),
    },
  }
}

function namesIn(model: SystemModel, theme: DraftedTheme): Reading['names'] {
  const tokens = new Map(model.tokens.map(({ name, id }) => [name, id]))
  const themes = new Map(model.themes.map(({ key, id }) => [key, id]))
  themes.set(theme.key, theme.id)
  return { tokenId: (name) => tokens.get(name), themeId: (key) => themes.get(key) }
}

/** One value that a theme sets itself: as it is, and as it is drafted. */
export interface OwnValue {
  readonly token: string
  readonly state: State
  readonly now: string | undefined
  /** None where the draft takes it away. */
  readonly drafted: string | undefined
}

/** Every value of a theme, now and drafted, tokens in the order of the ledger. */
export function ownValues(
  now: ThemeWire['values'],
  drafted: ThemeDraft['values'],
  order: readonly string[],
): OwnValue[] {
  const places = new Map(order.map((name, place) => [name, place]))
  const names = [...new Set([...Object.keys(now), ...Object.keys(drafted ?? {})])].sort(
    (a, b) => (places.get(a) ?? 0) - (places.get(b) ?? 0),
  )
  return names.flatMap((token) => {
    const edit = drafted?.[token]
    const next = edit === undefined ? now[token] : (edit ?? {})
    return STATES.flatMap((state): OwnValue[] => {
      const [before, after] = [now[token]?.[state], next?.[state]]
      if (before === undefined && after === undefined) return []
      return [
        {
          token,
          state,
          now: before === undefined ? undefined : valueText(before),
          drafted: after === undefined ? undefined : valueText(after),
        },
      ]
    })
  })
}

/** The draft with one value set, put back or taken away. */
export function withValue(
  now: ThemeWire['values'],
  draft: ThemeDraft,
  { token, state, value }: { token: string; state: State; value: ValueInput | undefined },
): ThemeDraft {
  const edited = draft.values?.[token]
  const present: StateValues = edited === undefined ? (now[token] ?? {}) : (edited ?? {})
  const { [state]: _, ...others } = present
  const next = value === undefined ? others : { ...others, [state]: value }
  const { [token]: __, ...rest } = draft.values ?? {}
  const isAsNow = sameText(next, now[token] ?? {})
  const values = isAsNow ? rest : { ...rest, [token]: Object.keys(next).length > 0 ? next : null }
  const { values: ___, ...members } = draft
  return Object.keys(values).length > 0 ? { ...members, values } : members
}

function sameText(first: StateValues, second: StateValues): boolean {
  const text = (value: ValueInput | undefined) => (value === undefined ? '' : valueText(value))
  return STATES.every((state) => text(first[state]) === text(second[state]))
}
