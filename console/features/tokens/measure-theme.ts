import { checkSystem } from '#shared/checks/check-system.ts'
import type { Finding, SystemModel } from '#shared/checks/model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { modelFromWire, type WholeSystem } from '#shared/contracts/system-model.ts'
import type { LedgerTokenWire, StandingWire } from '#shared/contracts/tokens.contract.ts'
import { groupPasses } from '#console/lib/lowest-finding.ts'
import { standingsInTheme } from './standings-in-theme.ts'

/** How the tokens of a ledger do where the service's own standings do not say it. */
export interface MeasuredTokens {
  /** By name; none where the service's own hold. */
  readonly standings?: ReadonlyMap<string, StandingWire>
  /** Ids of tokens that stand in a finding which passes by its group alone. */
  readonly byGroup: ReadonlySet<string>
}

/** Measures a system as it stands and answers how its tokens do in one theme. */
export function measureTheme(
  whole: WholeSystem,
  tokens: readonly LedgerTokenWire[],
  theme: string,
): MeasuredTokens {
  const { model, findings } = measure(whole)
  const id = model.themes.find(({ key }) => key === theme)?.id
  return {
    standings: standingsInTheme(tokens, findings, model, theme),
    byGroup: groupPasses(findings.filter((finding) => finding.theme === id)),
  }
}

/** The same over all themes, for what the service's standings leave out. */
export function measureGroups(whole: WholeSystem): MeasuredTokens {
  return { byGroup: groupPasses(measure(whole).findings) }
}

function measure(whole: WholeSystem): { model: SystemModel; findings: readonly Finding[] } {
  const model = modelFromWire(whole)
  const checked = checkSystem(model)
  if (!checked.ok) throw new TypeError('the head of a system resolves')
  return { model, findings: verdictOf(checked.evaluation).findings }
}
