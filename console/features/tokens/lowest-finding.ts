import type { Finding, State } from '#shared/checks/model.ts'

/** The finding furthest short of its line; what is exempt or asks for nothing only where there is no other. */
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

function counts({ outcome, required }: Finding): boolean {
  return outcome !== 'exempt' && required > 0
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
