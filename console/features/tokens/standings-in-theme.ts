import type { Finding, SystemModel } from '#shared/checks/model.ts'
import type { LedgerTokenWire, StandingWire } from '#shared/contracts/tokens.contract.ts'
import { passesByGroup } from '#console/lib/lowest-finding.ts'

/** How every token stands among its pairs in one theme alone, by token name. */
export function standingsInTheme(
  tokens: readonly LedgerTokenWire[],
  findings: readonly Finding[],
  { themes }: Pick<SystemModel, 'themes'>,
  themeKey: string,
): Map<string, StandingWire> {
  const theme = themes.find(({ key }) => key === themeKey)?.id
  const names = new Map(tokens.map(({ id, name }) => [id, name]))
  const standings = new Map(
    tokens.map(({ name, standing }): [string, StandingWire] => [
      name,
      {
        pairs: standing.pairs,
        pairsThroughAliases: standing.pairsThroughAliases,
        breaches: 0,
        mark: null,
        lowest: null,
      },
    ]),
  )
  for (const finding of findings) {
    if (finding.theme !== theme) continue
    const foreground = names.get(finding.foreground) ?? ''
    const background = names.get(finding.background) ?? ''
    for (const name of new Set([foreground, background])) {
      const before = standings.get(name)
      if (before === undefined) continue
      const measured = { ...finding, foreground, background, theme: themeKey }
      standings.set(name, withFinding(before, measured, name === foreground))
    }
  }
  return standings
}

const MARKS = ['breach', 'breach-on-it', 'waived', 'exempt'] as const

function withFinding(
  standing: StandingWire,
  finding: Finding,
  isForeground: boolean,
): StandingWire {
  const { outcome, ratio, required, theme, foreground, background } = finding
  const marked =
    outcome === 'breach' || outcome === 'known'
      ? isForeground
        ? 'breach'
        : 'breach-on-it'
      : outcome === 'pass'
        ? null
        : outcome
  const lower =
    outcome !== 'exempt' &&
    !passesByGroup(finding) &&
    (standing.lowest === null || margin(finding) < margin(standing.lowest))
  const state = `${finding.foregroundState}/${finding.backgroundState}`
  return {
    ...standing,
    breaches: standing.breaches + (outcome === 'breach' ? 1 : 0),
    mark: MARKS.find((mark) => mark === marked || mark === standing.mark) ?? null,
    lowest: lower
      ? { ratio, required, theme, state, outcome, foreground, background }
      : standing.lowest,
  }
}

function margin({ ratio, required }: { ratio: number; required: number }): number {
  return required === 0 ? Infinity : ratio / required
}
