import { useMemo } from 'react'
import { DERIVED_STATES, type SystemModel } from '#shared/checks/model.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { widerStateRule } from './rule-edits.ts'
import type { Scope } from './rule-scopes.ts'
import type { ScopeText } from './scope-text.ts'
import { StateRuleFields } from './state-rule-fields.tsx'
import { ThemeRuleFields } from './theme-rule-fields.tsx'

/** All rules of a scope as fields; what is left empty follows the wider rule, written in faintly. */
export function ScopeFields({
  scope,
  text,
  model,
  faults,
  onChange,
}: {
  scope: Scope
  text: ScopeText
  model: SystemModel
  /** What the rules name that is not there; pointers into the scope. */
  faults: readonly Fault[]
  onChange: (text: ScopeText) => void
}) {
  const names = useMemo(() => model.tokens.map(({ name }) => name), [model])
  const faultIn = (start: string) =>
    faults.find(({ pointer }) => pointer?.startsWith(`${start}/`))?.detail
  return (
    <>
      {DERIVED_STATES.map((state) => (
        <StateRuleFields
          key={state}
          state={state}
          text={text.states[state]}
          wider={widerStateRule(model, scope, state)}
          tokens={names}
          referenceFault={faultIn(`/states/${state}`)}
          onChange={(next) => onChange({ ...text, states: { ...text.states, [state]: next } })}
        />
      ))}
      {Object.entries(text.themes).map(([key, rule]) => (
        <div key={key} className="border-b border-feint py-12">
          <ThemeRuleFields
            subject={`In ${key} colours`}
            text={rule}
            tokens={names}
            canInherit
            referenceFault={faultIn(`/themes/${key}`)}
            onChange={(next) => onChange({ ...text, themes: { ...text.themes, [key]: next } })}
          />
        </div>
      ))}
    </>
  )
}
