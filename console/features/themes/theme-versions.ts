import { STATES } from '#shared/checks/model.ts'
import type { ThemeRuleWire } from '#shared/contracts/rules.contract.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import { valueText } from '#console/lib/value-words.ts'
import { draftedTheme, type StateValues, type ThemeDraft } from './theme-draft.ts'

/** Members in which a theme as it is now and as it is drafted here differ, in words. */
export function themeVersions(
  now: ThemeWire,
  draft: ThemeDraft,
  ruleInWords: (rule: ThemeRuleWire) => string,
): { member: string; now: string; yours: string }[] {
  const yours = draftedTheme(now, draft)
  const level = (theme: { level?: string | undefined }) => theme.level ?? 'the system’s'
  const rows = [
    ['name', 'Name', now.name, yours.name],
    ['from', 'Parent', now.from ?? 'none', yours.from ?? 'none'],
    ['ground', 'Ground', now.ground, yours.ground],
    ['ink', 'Ink', now.ink, yours.ink],
    ['rule', 'Rule', ruleInWords(now.rule), ruleInWords(yours.rule)],
    ['level', 'Level', level(now), level(yours)],
    ['gating', 'Gating', gatingInWords(now), gatingInWords(yours)],
  ] as const
  const members = rows.flatMap(([member, label, is, would]) =>
    draft[member] === undefined ? [] : [{ member: label, now: is, yours: would }],
  )
  const values = Object.entries(draft.values ?? {}).map(([token, byState]) => ({
    member: token,
    now: valuesInWords(now.values[token]),
    yours: valuesInWords(byState ?? undefined),
  }))
  return [...members, ...values]
}

export const gatingInWords = ({ gating }: { gating: boolean }): string =>
  gating ? 'gates' : 'reported only'

function valuesInWords(values: StateValues | undefined): string {
  const words = STATES.flatMap((state) => {
    const value = values?.[state]
    return value === undefined ? [] : [`${state} ${valueText(value)}`]
  })
  return words.length === 0 ? 'not set' : words.join('\n')
}
