import { useMemo, useState } from 'react'
import { useTriedEffect } from '#console/features/checks/tried-effect.ts'
import {
  readThemeRuleText,
  type ThemeRuleText,
  themeRuleText,
} from '#console/features/rules/theme-rule-text.ts'
import {
  type DraftedTheme,
  draftedTheme,
  type ThemeDraft,
  themeEdits,
} from '#console/features/themes/theme-draft.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'

/** A theme being edited: what is written, what that comes to, and what it would move. */
export function useThemeEdit(
  theme: DraftedTheme,
  evaluation: Evaluation | undefined,
  start: ThemeDraft = {},
) {
  const [fields, setFields] = useState<ThemeDraft>(start)
  const [ruleText, setRuleText] = useState<ThemeRuleText>()
  const text = ruleText ?? themeRuleText({ kind: 'keep', ...theme.rule })
  const isRuleEdited = ruleText !== undefined && !isSame(ruleText, standingText(theme))
  const reading = readThemeRuleText(text)
  const draft = useMemo<ThemeDraft>(() => {
    const read = ruleText && readThemeRuleText(ruleText)
    const isEdited = ruleText !== undefined && !isSame(ruleText, standingText(theme))
    return isEdited && read?.ok ? { ...fields, rule: read.rule } : fields
  }, [fields, ruleText, theme])
  const isEdited = isRuleEdited || Object.keys(draft).length > 0
  const read = useMemo(
    () =>
      evaluation && Object.keys(draft).length > 0
        ? themeEdits(evaluation.resolved.model, draftedTheme(theme, draft), draft.values)
        : undefined,
    [evaluation, theme, draft],
  )
  const tried = useTriedEffect(evaluation, read?.ok === true ? read.edits : undefined)
  return {
    draft,
    drafted: draftedTheme(theme, draft),
    isEdited,
    ruleText: text,
    isRuleRead: reading.ok,
    /** What the draft names that is not there. */
    faults: read?.ok === false ? read.faults : [],
    tried,
    put: (part: ThemeDraft) => setFields((before) => leftOf(theme, { ...before, ...part })),
    setDraft: setFields,
    setRuleText,
    putBack: () => {
      setFields(start)
      setRuleText(undefined)
    },
  }
}

const standingText = (theme: DraftedTheme) => themeRuleText({ kind: 'keep', ...theme.rule })

function isSame(first: ThemeRuleText, second: ThemeRuleText): boolean {
  return JSON.stringify(first) === JSON.stringify(second)
}

/** The draft without members that say what the theme says anyway. */
function leftOf(theme: DraftedTheme, draft: ThemeDraft): ThemeDraft {
  const standing: Record<string, unknown> = { ...theme, level: theme.level ?? null }
  return Object.fromEntries(
    Object.entries(draft).filter(([member, value]) => standing[member] !== value),
  )
}
