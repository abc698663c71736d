import type * as z from 'zod'
import type { ModelFault, TokenModel } from '#shared/checks/model.ts'
import type { GovernedTheme, GovernedToken } from '#shared/checks/governed-model.ts'
import {
  type Decision,
  memberOf,
  refuse,
  refuseFaults,
  type SystemIndex,
} from '#shared/contracts/governed-system.ts'
import { presentTheme } from '#shared/contracts/present-items.ts'
import type { patchThemeBody, putThemeBody } from '#shared/contracts/themes.contract.ts'
import {
  pointerSegment,
  type Reading,
  readStateValues,
  readThemeKey,
  readThemeRule,
  readTokenName,
} from '#shared/contracts/wire-values.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'

export type PutThemeBody = z.output<typeof putThemeBody>
export type PatchThemeBody = z.output<typeof patchThemeBody>

const MOST_THEMES = 8

/** Which theme is written, and whether the caller may edit more than level and gating. */
export interface ThemeEdit {
  readonly id: string
  readonly key: string
  readonly before: GovernedTheme | undefined
  readonly editsAll: boolean
}

/** A theme made or replaced whole: what it does not set, it no longer sets. */
export function decidePut(index: SystemIndex, body: PutThemeBody, edit: ThemeEdit): Decision {
  if (edit.before === undefined && index.model.themes.length >= MOST_THEMES) {
    return refuseFaults([{ pointer: '', detail: `A system has at most ${MOST_THEMES} themes` }])
  }
  const { message: _, values, ...members } = body
  const unnamed = index.model.tokens.flatMap(({ name, values: own }) =>
    own[edit.id] && !Object.hasOwn(values, name) ? [[name, null] as const] : [],
  )
  return decideTheme(index, edit, {
    members,
    values: { ...values, ...Object.fromEntries(unnamed) },
  })
}

/** An edit of a theme; what the body does not name stays. */
export function decidePatch(
  index: SystemIndex,
  body: PatchThemeBody,
  edit: ThemeEdit & { readonly before: GovernedTheme },
): Decision {
  const { id: _, key: __, position: ___, ...present } = presentTheme(edit.before, index)
  const { message: ____, values = {}, level, ...given } = body
  const { level: standing, ...kept } = present
  const nextLevel = level === undefined ? standing : (level ?? undefined)
  const members = { ...kept, ...given, ...(nextLevel ? { level: nextLevel } : {}) }
  return decideTheme(index, edit, { members: members as ThemeMembers, values })
}

/** The removal of a theme that nothing else stands on, with the values it set. */
export function decideDelete(
  { model }: SystemIndex,
  theme: GovernedTheme,
  editsAll: boolean,
): Decision {
  if (!editsAll) return leadRefusal
  const isBase = model.themes[0]?.id === theme.id
  const children = model.themes.filter(({ id, from }) =>
    isBase ? id !== theme.id : from === theme.id,
  )
  if (children.length > 0) {
    const keys = children.map(({ key }) => key).join(', ')
    return refuse('theme-in-use', `${keys} ${children.length > 1 ? 'derive' : 'derives'} from it`)
  }
  const only = model.pairs.filter(({ themes }) => themes?.length === 1 && themes[0] === theme.id)
  if (only.length > 0) {
    const ids = only.map(({ id }) => id).join(', ')
    return refuse('theme-in-use', `Pairs that occur in ${theme.key} alone: ${ids}`)
  }
  const tokens = model.tokens.flatMap((token) => withoutTheme(token, theme.id))
  const refusal = lockedAmong(tokens)
  if (refusal) return refusal
  return {
    ok: true,
    edits: {
      themes: model.themes.filter(({ id }) => id !== theme.id),
      tokens: { put: tokens },
      pairs: {
        put: model.pairs.flatMap((pair) =>
          pair.themes?.includes(theme.id)
            ? [{ ...pair, themes: pair.themes.filter((id) => id !== theme.id) }]
            : [],
        ),
      },
      prefixes: model.prefixes.map((scope) => withoutThemeRule(scope, theme.id)),
    },
  }
}

const leadRefusal = refuse(
  'role-missing',
  'A maintainer edits themes; an accessibility-lead level and gating only',
)

/** A lock holds what themes set for the token, whichever way it would change. */
function lockedAmong(moved: readonly GovernedToken[]) {
  const names = moved.filter(({ locked }) => locked).map(({ name }) => name)
  return names.length > 0 ? refuse('token-locked', `Locked: ${names.join(', ')}`) : undefined
}

type ThemeMembers = Omit<PutThemeBody, 'message' | 'values'>
interface ThemeInput {
  readonly members: ThemeMembers
  /** `null` takes away what the theme set for that token. */
  readonly values: NonNullable<PatchThemeBody['values']>
}

function decideTheme(index: SystemIndex, edit: ThemeEdit, input: ThemeInput): Decision {
  const { model } = index
  const reading: Reading = { names: index.names, faults: [] }
  const theme = readTheme(index, edit, { members: input.members, reading })
  const tokens = readTokens(index, edit, { values: input.values, reading })
  if (reading.faults.length > 0) return refuseFaults(reading.faults)
  if (!edit.editsAll && (tokens.length > 0 || reaches(edit.before, theme))) {
    return leadRefusal
  }
  const refusal = lockedAmong(tokens)
  if (refusal) return refusal
  const themes =
    edit.before === undefined
      ? [...model.themes, theme]
      : model.themes.map((one) => (one.id === theme.id ? theme : one))
  return {
    ok: true,
    edits: { themes, tokens: { put: tokens } },
    pointerOf: pointersOf(index, theme),
    weakenedAt: memberOf({ kind: 'theme', id: theme.id }),
  }
}

function readTheme(
  { model }: SystemIndex,
  edit: ThemeEdit,
  { members, reading }: { readonly members: ThemeMembers; readonly reading: Reading },
): GovernedTheme {
  const { from, rule, level, ground, ink, name, gating } = members
  const isBase = (model.themes[0]?.id ?? edit.id) === edit.id
  if (isBase && from !== undefined) {
    reading.faults.push({ pointer: '/from', detail: 'The base theme derives from none' })
  }
  const base = model.themes[0]?.key
  return {
    id: edit.id,
    key: edit.key,
    name,
    ...(isBase || base === undefined ? {} : { from: readThemeKey(from ?? base, '/from', reading) }),
    ground: readTokenName(ground, '/ground', reading),
    ink: readTokenName(ink, '/ink', reading),
    rule: readThemeRule(rule, '/rule', reading),
    ...(level === undefined ? {} : { level }),
    gating,
  }
}

/** The tokens whose values in the theme are others afterwards. */
function readTokens(
  index: SystemIndex,
  edit: ThemeEdit,
  { values, reading }: { readonly values: ThemeInput['values']; readonly reading: Reading },
): GovernedToken[] {
  const isBase = (index.model.themes[0]?.id ?? edit.id) === edit.id
  return Object.entries(values).flatMap(([name, byState]) => {
    const at = `/values/${pointerSegment(name)}`
    const token = index.tokensById.get(readTokenName(name, at, reading))
    if (isBase && byState?.rest !== undefined) {
      const detail = "The base theme's rest colour is the token's own value"
      reading.faults.push({ pointer: `${at}/rest`, detail })
    }
    const set = byState === null ? {} : readStateValues(byState, at, reading)
    if (token === undefined) return []
    const { [edit.id]: before, ...others } = token.values
    if (canonicalJson(before ?? {}) === canonicalJson(set)) return []
    const isSet = Object.keys(set).length > 0
    return [{ ...token, values: isSet ? { ...others, [edit.id]: set } : others }]
  })
}

/** Whether more than level and gating differs. */
function reaches(before: GovernedTheme | undefined, after: GovernedTheme): boolean {
  if (before === undefined) return true
  const part = ({ level: _, gating: __, ...rest }: GovernedTheme) => canonicalJson(rest)
  return part(before) !== part(after)
}

function withoutThemeRule<Scope extends Pick<GovernedToken, 'rules'>['rules'] & object>(
  scope: Scope,
  themeId: string,
): Scope {
  if (scope.themes?.[themeId] === undefined) return scope
  const { [themeId]: _, ...themes } = scope.themes
  return { ...scope, themes }
}

function withoutTheme(token: GovernedToken, themeId: string): GovernedToken[] {
  const { [themeId]: values, ...others } = token.values as TokenModel['values']
  const rules = token.rules && withoutThemeRule(token.rules, themeId)
  if (values === undefined && rules === token.rules) return []
  return [{ ...token, values: others, ...(rules ? { rules } : {}) }]
}

const POINTERS: { readonly [code in ModelFault['code']]?: string } = {
  'theme-cycle': '/from',
  'theme-span': '/ground',
  'theme-unset': '/values',
  'level-lower': '/level',
}

function pointersOf({ names }: SystemIndex, theme: GovernedTheme) {
  return (fault: ModelFault): string | undefined => {
    if (fault.theme !== theme.id) return undefined
    if (fault.token === undefined) return POINTERS[fault.code]
    const named = `/values/${pointerSegment(names.tokenName(fault.token))}`
    return POINTERS[fault.code] ?? named
  }
}
