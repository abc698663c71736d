import type { Consequence } from '#shared/checks/consequences.ts'
import type { Finding } from '#shared/checks/model.ts'

/** Findings of one pair in one theme that move alike, as one line; tokens and theme by id. */
export interface EffectLine {
  readonly key: string
  readonly foreground: string
  readonly background: string
  readonly theme: string
  readonly states: readonly string[]
  readonly before: number | undefined
  /** As it would be measured; what is no longer measured keeps its last figures. */
  readonly ratio: number
  readonly required: number
  readonly requiredBefore: number | undefined
  readonly outcome: Finding['outcome']
  readonly gating: boolean
}

export const EFFECT_PARTS = [
  'breaching',
  'passing',
  'stillBreaching',
  'stillPassing',
  'gone',
] as const
export type EffectPart = (typeof EFFECT_PARTS)[number]

/** What an edit would do to the verdicts of a system. */
export interface Effect {
  readonly parts: {
    readonly [part in EffectPart]: {
      readonly count: number
      /** Nearest to its line, or furthest short, first. */
      readonly lines: readonly EffectLine[]
    }
  }
  readonly exempt: number
  /** Findings that breach now and would not be measured any more. */
  readonly goneBreaches: number
}

/** Parts what an edit moves as a person wants to know it. */
export function effectOf(consequences: readonly Consequence[]): Effect {
  const gathered: Record<EffectPart | 'exempt', Consequence[]> = {
    breaching: [],
    passing: [],
    stillBreaching: [],
    stillPassing: [],
    gone: [],
    exempt: [],
  }
  for (const consequence of consequences) gathered[partOf(consequence)].push(consequence)
  const part = (name: EffectPart) => ({
    count: gathered[name].length,
    lines: joinedLines(gathered[name]),
  })
  return {
    parts: {
      breaching: part('breaching'),
      passing: part('passing'),
      stillBreaching: part('stillBreaching'),
      stillPassing: part('stillPassing'),
      gone: part('gone'),
    },
    exempt: gathered.exempt.length,
    goneBreaches: gathered.gone.filter(({ before }) => before?.outcome === 'breach').length,
  }
}

function partOf({ newly, before, after }: Consequence): EffectPart | 'exempt' {
  if (newly !== null) return newly
  if (after === undefined) return before?.outcome === 'exempt' ? 'exempt' : 'gone'
  if (after.outcome === 'exempt') return 'exempt'
  return after.outcome === 'breach' ? 'stillBreaching' : 'stillPassing'
}

function joinedLines(consequences: readonly Consequence[]): EffectLine[] {
  const lines = new Map<string, EffectLine>()
  for (const { before, after } of consequences) {
    const finding = after ?? before
    if (finding === undefined) continue
    const { foreground, background, theme, ratio, required, outcome, gating } = finding
    const key = [
      foreground,
      background,
      theme,
      required,
      ratio,
      before?.required,
      before?.ratio,
    ].join('/')
    const state = `${finding.foregroundState}/${finding.backgroundState}`
    lines.set(key, {
      key,
      foreground,
      background,
      theme,
      states: [...(lines.get(key)?.states ?? []), state],
      before: before?.ratio,
      ratio,
      required,
      requiredBefore: before?.required,
      outcome,
      gating,
    })
  }
  return [...lines.values()].sort((a, b) => margin(a) - margin(b))
}

/** Under its own line, but another member of its group meets the one it has. */
export function passesByGroup({ outcome, ratio, required }: EffectLine): boolean {
  return outcome === 'pass' && ratio < required
}

function margin(line: EffectLine): number {
  return line.required === 0 || passesByGroup(line) ? Infinity : line.ratio / line.required
}
