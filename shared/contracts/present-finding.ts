import type { Advisory, Finding } from '#shared/checks/model.ts'
import type { ResolvedSystem } from '#shared/checks/resolved.ts'
import type { ClosestCouple, MeasuredDistinctSet } from '#shared/checks/distinct-measure.ts'
import type { AdvisoryWire, DistinctMeasureWire, FindingWire } from './findings.ts'
import type { ModelNames } from './wire-values.ts'

/**
 * A finding as every answer gives it: tokens and theme by name, the ratio as measured. The identity, which
 * holds ids alone, serves as the fingerprint, so that it outlives renames and thresholds.
 */
export function presentFinding(finding: Finding, names: ModelNames): FindingWire {
  const { foregroundState, backgroundState, reason, tight, waiver } = finding
  return {
    foreground: names.tokenName(finding.foreground),
    background: names.tokenName(finding.background),
    theme: names.themeKey(finding.theme),
    state: `${foregroundState}/${backgroundState}`,
    use: finding.use,
    ratio: finding.ratio,
    ...(finding.basis === 'p3' ? { srgbRatio: finding.ratios.srgb } : {}),
    required: finding.required,
    basis: finding.basis,
    outcome: finding.outcome,
    ...(reason === undefined ? {} : { reason }),
    ...(tight === undefined ? {} : { tight }),
    gating: finding.gating,
    rendered: finding.rendered,
    ...(waiver === undefined ? {} : { waiver: { id: waiver.id, endsAt: waiver.endsAt } }),
    fingerprint: finding.identity,
  }
}

/** An advisory with token and theme by name. */
export function presentAdvisory(advisory: Advisory, names: ModelNames): AdvisoryWire {
  const { code, token, theme, state } = advisory
  return {
    code,
    token: names.tokenName(token),
    ...(theme === undefined ? {} : { theme: names.themeKey(theme) }),
    ...(state === undefined ? {} : { state }),
  }
}

/** A distinct set measured in one theme, with tokens and theme by name. */
export function presentDistinctMeasure(
  { set, theme, couples }: MeasuredDistinctSet,
  names: ModelNames,
): DistinctMeasureWire {
  const named = ({ first, second, deltaE2000 }: ClosestCouple) => ({
    first: names.tokenName(first),
    second: names.tokenName(second),
    deltaE2000,
  })
  return {
    id: set.id,
    name: set.name,
    theme: names.themeKey(theme),
    plain: named(couples.plain),
    protan: named(couples.protan),
    deutan: named(couples.deutan),
    tritan: named(couples.tritan),
  }
}

/**
 * What tokens and themes are called in the first of some resolved systems that has them: in the one after
 * an edit, say, and else in the one before.
 * @returns names by id; an id that none of them has answers with itself
 */
export function namesIn(...systems: readonly ResolvedSystem[]): ModelNames {
  const first = (nameIn: (system: ResolvedSystem) => string | undefined, id: string) => {
    for (const system of systems) {
      const name = nameIn(system)
      if (name !== undefined) return name
    }
    return id
  }
  return {
    tokenName: (id) => first(({ tokens }) => tokens.get(id)?.token.name, id),
    themeKey: (id) =>
      first(({ model, themes }) => model.themes[themes.get(id) ?? themes.size]?.key, id),
  }
}
