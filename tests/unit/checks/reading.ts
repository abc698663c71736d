import { checkSystem } from '#shared/checks/check-system.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Finding, ModelFault, State, SystemModel } from '#shared/checks/model.ts'
import { resolveSystem } from '#shared/checks/resolve-system.ts'
import { colorOf, type ResolvedSystem, type ResolvedValue } from '#shared/checks/resolved.ts'
import { type VerdictOptions, verdictOf } from '#shared/checks/verdict.ts'
import { formatHex } from '#shared/color/format-color.ts'

/** The resolved model; a fault fails the test with its text. */
export function resolve(model: SystemModel): ResolvedSystem {
  const resolution = resolveSystem(model)
  if (!resolution.ok) throw new Error(resolution.faults.map(({ detail }) => detail).join('\n'))
  return resolution.resolved
}

export function faultsOf(model: SystemModel): readonly ModelFault[] {
  const resolution = resolveSystem(model)
  return resolution.ok ? [] : resolution.faults
}

/** One value read as `token`, `token hover`, `token dark` or `token dark hover`. */
export function read(model: SystemModel, place: string): ResolvedValue {
  const [token, ...rest] = place.split(' ')
  const theme = rest.find((word) => model.themes.some(({ id }) => id === word))
  const state = rest.find((word) => word !== theme)
  return colorOf(resolve(model), {
    token: token!,
    theme: theme ?? model.themes[0]!.id,
    state: (state ?? 'rest') as State,
  })
}

export function hexAt(model: SystemModel, place: string): string {
  const { r, g, b, a } = read(model, place).rendered
  return formatHex(r, g, b, a)
}

export function lightnessAt(model: SystemModel, place: string): number {
  return read(model, place).oklch.l!
}

export function evaluate(model: SystemModel): Evaluation {
  const checked = checkSystem(model)
  if (!checked.ok) throw new Error(checked.faults.map(({ detail }) => detail).join('\n'))
  return checked.evaluation
}

export function findings(model: SystemModel, options: VerdictOptions = {}): readonly Finding[] {
  return verdictOf(evaluate(model), options).findings
}

/** Cut to decimals, never rounded. */
export function truncated(ratio: number, decimals = 2): number {
  return Math.floor(ratio * 10 ** decimals) / 10 ** decimals
}
