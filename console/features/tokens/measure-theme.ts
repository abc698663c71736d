import { checkSystem } from '#shared/checks/check-system.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { modelFromWire, type WholeSystem } from '#shared/contracts/system-model.ts'
import type { LedgerTokenWire, StandingWire } from '#shared/contracts/tokens.contract.ts'
import { standingsInTheme } from './standings-in-theme.ts'

/** Measures a system as it stands and answers how its tokens do in one theme. */
export function measureTheme(
  whole: WholeSystem,
  tokens: readonly LedgerTokenWire[],
  theme: string,
): Map<string, StandingWire> {
  const model = modelFromWire(whole)
  const checked = checkSystem(model)
  if (!checked.ok) throw new TypeError('the head of a system resolves')
  return standingsInTheme(tokens, verdictOf(checked.evaluation).findings, model, theme)
}
