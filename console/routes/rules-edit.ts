import { useMemo, useState } from 'react'
import { useTriedEffect } from '#console/features/checks/tried-effect.ts'
import { ruleEdits } from '#console/features/rules/rule-edits.ts'
import type { Scope } from '#console/features/rules/rule-scopes.ts'
import {
  isSameRules,
  readScopeFields,
  type ScopeText,
  scopeFields,
} from '#console/features/rules/scope-text.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { RuleScopeWire } from '#shared/contracts/rules.contract.ts'

/** The rules of a scope being edited: the fields, what they say, and what that would move. */
export function useRulesEdit(
  { scope, standing, themes }: { scope: Scope; standing: RuleScopeWire; themes: readonly string[] },
  evaluation: Evaluation | undefined,
) {
  const [written, setWritten] = useState<ScopeText>()
  const text = written ?? scopeFields(standing, themes)
  const rules = useMemo(() => written && readScopeFields(written), [written])
  const isEdited = written !== undefined && (rules === undefined || !isSameRules(rules, standing))
  const read = useMemo(
    () =>
      isEdited && rules !== undefined && evaluation !== undefined
        ? ruleEdits(evaluation.resolved.model, scope, rules)
        : undefined,
    [isEdited, rules, evaluation, scope],
  )
  const tried = useTriedEffect(evaluation, read?.ok === true ? read.edits : undefined)
  return {
    text,
    /** None where a field cannot be read. */
    rules: written === undefined ? standing : rules,
    isEdited,
    faults: read?.ok === false ? read.faults : [],
    tried,
    setText: setWritten,
    putBack: () => setWritten(undefined),
  }
}
