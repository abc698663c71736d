import { DERIVED_STATES } from '#shared/checks/model.ts'
import type { RuleScopeWire } from '#shared/contracts/rules.contract.ts'
import { stateRuleInWords, themeRuleInWords } from './rule-words.ts'

const NOTHING = 'nothing said'

/** Rules of a scope as they are now beside the ones written here, in words. */
export function ruleVersions(
  now: RuleScopeWire,
  yours: RuleScopeWire,
): { member: string; now: string; yours: string }[] {
  const states = DERIVED_STATES.map((state) => ({
    member: state,
    now: stateRuleInWords(now.states?.[state]) || NOTHING,
    yours: stateRuleInWords(yours.states?.[state]) || NOTHING,
  }))
  const keys = [...new Set([now, yours].flatMap(({ themes = {} }) => Object.keys(themes)))]
  const words = (rules: RuleScopeWire, key: string) => {
    const rule = rules.themes?.[key]
    return rule === undefined ? NOTHING : themeRuleInWords(rule)
  }
  const themes = keys.map((key) => ({
    member: `in ${key}`,
    now: words(now, key),
    yours: words(yours, key),
  }))
  return [...states, ...themes].filter((row) => row.now !== NOTHING || row.yours !== NOTHING)
}
