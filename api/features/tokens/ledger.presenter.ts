import type { Finding } from '#shared/checks/model.ts'
import { colorOf } from '#shared/checks/resolved.ts'
import { stripThemes } from '#shared/checks/strip-themes.ts'
import { type TokenStanding, standingOf } from '#shared/checks/token-standing.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import type { StandingWire, StripTokenWire } from '#shared/contracts/tokens.contract.ts'
import { hexOf, type MeasuredSystem } from './tokens.presenter.ts'

export type Mark = StandingWire['mark']

/** How every token of a system stands among its pairs. */
export interface Ledger {
  readonly standing: (tokenId: string) => StandingWire
  readonly strip: (tokenId: string) => StripTokenWire
}

/** Findings that decide a token's mark. */
interface Marking {
  readonly breaches: Set<string>
  readonly breachesOnIt: Set<string>
  readonly waived: Map<string, string>
  readonly exempt: Set<string>
  /** Theme ids in which it breaches. */
  readonly themes: Map<string, Set<string>>
}

/** Reads the whole ledger of a system in one pass over its findings. */
export function presentLedger(system: MeasuredSystem): Ledger {
  const { index, evaluation } = system
  const { resolved } = evaluation
  const standings = standingOf(evaluation)
  const marking = markingOf(verdictOf(evaluation, { include: 'not-pass' }).findings)
  const themes = stripThemes(resolved)
  return {
    standing: (id) => presentStanding(system, { id, standing: standings.get(id), marking }),
    strip: (id) => {
      const hexes = themes.map(({ id: theme, key }) => [
        key,
        hexOf(colorOf(resolved, { token: id, theme, state: 'rest' }).rendered),
      ])
      return {
        name: index.names.tokenName(id),
        hexes: Object.fromEntries(hexes),
        mark: markOf(id, marking),
        themes: [...(marking.themes.get(id) ?? [])].map((theme) => index.names.themeKey(theme)),
      }
    },
  }
}

function markingOf(findings: readonly Finding[]): Marking {
  const marking: Marking = {
    breaches: new Set(),
    breachesOnIt: new Set(),
    waived: new Map(),
    exempt: new Set(),
    themes: new Map(),
  }
  for (const { foreground, background, outcome, theme, waiver } of findings) {
    if (outcome === 'exempt') marking.exempt.add(foreground)
    if (outcome === 'waived') {
      for (const token of [foreground, background]) {
        const until = marking.waived.get(token)
        const endsAt = waiver?.endsAt ?? ''
        if (until === undefined || endsAt < until) marking.waived.set(token, endsAt)
      }
    }
    if (outcome !== 'breach') continue
    marking.breaches.add(foreground)
    marking.breachesOnIt.add(background)
    for (const token of [foreground, background]) {
      marking.themes.set(token, (marking.themes.get(token) ?? new Set()).add(theme))
    }
  }
  return marking
}

function markOf(id: string, { breaches, breachesOnIt, waived, exempt }: Marking): Mark {
  if (breaches.has(id)) return 'breach'
  if (breachesOnIt.has(id)) return 'breach-on-it'
  if (waived.has(id)) return 'waived'
  return exempt.has(id) ? 'exempt' : null
}

function presentStanding(
  { index: { names } }: MeasuredSystem,
  found: { id: string; standing: TokenStanding | undefined; marking: Marking },
): StandingWire {
  const { id, standing, marking } = found
  const lowest = standing?.lowest
  const waivedUntil = marking.waived.get(id)
  return {
    pairs: standing?.pairs ?? 0,
    pairsThroughAliases: standing?.aliased ?? 0,
    breaches: standing?.breaches ?? 0,
    mark: markOf(id, marking),
    ...(waivedUntil ? { waivedUntil } : {}),
    lowest: lowest
      ? {
          ratio: lowest.ratio,
          required: lowest.required,
          theme: names.themeKey(lowest.theme),
          state: `${lowest.foregroundState}/${lowest.backgroundState}`,
          outcome: lowest.outcome,
          foreground: names.tokenName(lowest.foreground),
          background: names.tokenName(lowest.background),
        }
      : null,
  }
}
