import type { Finding, State } from '#shared/checks/model.ts'

/** The finding furthest short; what is exempt, asks for nothing or passes by its group only where there is no other. */
export function lowestFinding(findings: readonly Finding[]): Finding | undefined {
  return findings.reduce<Finding | undefined>(
    (lowest, finding) => (lowest === undefined || isLower(finding, lowest) ? finding : lowest),
    undefined,
  )
}

function isLower(finding: Finding, than: Finding): boolean {
  const [first, second] = [counts(finding), counts(than)]
  if (first !== second) return first
  return first
    ? finding.ratio / finding.required < than.ratio / than.required
    : finding.ratio < than.ratio
}

function counts(finding: Finding): boolean {
  return finding.outcome !== 'exempt' && finding.required > 0 && !passesByGroup(finding)
}

/** Under its own line, but another member of its `anyOf` group meets the one it has. */
export function passesByGroup(finding: Pick<Finding, 'outcome' | 'ratio' | 'required'>): boolean {
  return finding.outcome === 'pass' && finding.ratio < finding.required
}

/** Tokens that stand in a finding which passes by its group alone, by id. */
export function groupPasses(findings: readonly Finding[]): Set<string> {
  return new Set(
    findings
      .filter(passesByGroup)
      .flatMap(({ foreground, background }) => [foreground, background]),
  )
}

/** Findings in which the token itself stands in that theme and state. */
export function findingsIn(
  findings: readonly Finding[],
  token: string,
  theme: string,
  state: State,
): Finding[] {
  return findings.filter(
    (finding) =>
      finding.theme === theme &&
      ((finding.foreground === token && finding.foregroundState === state) ||
        (finding.background === token && finding.backgroundState === state)),
  )
}
