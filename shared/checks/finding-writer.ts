import { formatHex } from '#shared/color/format-color.ts'
import type { Evaluation, PairMeasure } from './evaluation.ts'
import { identityInTheme } from './identity.ts'
import type { Judgement } from './judgement.ts'
import { requiredOfRow } from './measured-row.ts'
import { type Finding, STATES, type ThemeModel } from './model.ts'
import { type ResolvedCell, STATE_COUNT } from './resolved.ts'

/** Writes a row out as a finding; `declared`: every measure that declares it, where there is more than its own. */
export type FindingWriter = (
  measure: PairMeasure,
  row: number,
  judgement: Judgement,
  declared?: readonly PairMeasure[],
) => Finding

type Mutable<Type> = { -readonly [key in keyof Type]: Type[key] }

/** The ending of an identity, by fg/bg state. */
const ENDINGS = STATES.flatMap((foreground) =>
  STATES.map((background) => `/${foreground}/${background}`),
)

/** What the findings of one pair in one theme have in common. */
interface Common {
  readonly measure: PairMeasure
  /** Position in the measure's themes. */
  readonly at: number
  readonly theme: ThemeModel
  /** Offset of the theme's first cell. */
  readonly first: number
  readonly foreground: readonly ResolvedCell[]
  readonly background: readonly ResolvedCell[]
  readonly identity: string
  readonly pairs: readonly string[]
}

function commonOf({ resolved }: Evaluation, measure: PairMeasure, at: number): Common {
  const { pair, kind } = measure
  const position = measure.themes[at]!
  const theme = resolved.model.themes[position]!
  const { foreground, background, backdrop } = pair
  return {
    measure,
    at,
    theme,
    first: position * STATE_COUNT,
    foreground: resolved.tokens.get(foreground)!.cells,
    background: resolved.tokens.get(background)!.cells,
    identity: identityInTheme({
      foreground,
      background,
      backdrop,
      ground: theme.ground,
      kind,
      theme: theme.id,
    }),
    pairs: [pair.id],
  }
}

function hexOf({ color: { rendered } }: ResolvedCell): string {
  return formatHex(rendered.r, rendered.g, rendered.b, rendered.a)
}

/** A writer for one evaluation; rows of one pair and theme that follow each other share what they have in common. */
export function createFindingWriter(evaluation: Evaluation): FindingWriter {
  let common: Common | undefined
  return (measure, row, judgement, declared) => {
    const width = measure.combinations.length
    const place = row % width
    const at = (row - place) / width
    if (common?.measure !== measure || common.at !== at) common = commonOf(evaluation, measure, at)
    const { pair } = measure
    const { theme, first } = common
    const combination = measure.combinations[place]!
    const bg = combination % STATE_COUNT
    const fg = (combination - bg) / STATE_COUNT
    const ratio = measure.ratio[row]!
    const srgb = measure.srgb[row]!
    const p3 = measure.p3[row] ?? Number.NaN
    const { waiver, reason, outcome } = judgement
    const finding: Mutable<Finding> = {
      foreground: pair.foreground,
      background: pair.background,
      theme: theme.id,
      foregroundState: STATES[fg]!,
      backgroundState: STATES[bg]!,
      use: pair.use,
      kind: measure.kind,
      ratio,
      required: requiredOfRow(evaluation, measure, row),
      basis: ratio === srgb ? 'srgb' : 'p3',
      ratios: Number.isNaN(p3) ? { srgb } : { srgb, p3 },
      outcome,
      gating: theme.gating,
      rendered: {
        foreground: hexOf(common.foreground[first + fg]!),
        background: hexOf(common.background[first + bg]!),
      },
      pairs: declared ? declared.map((other) => other.pair.id) : common.pairs,
      identity: common.identity + ENDINGS[combination]!,
    }
    if (reason !== undefined) finding.reason = reason
    if (measure.tight[row] === 1 && reason !== 'any-of') finding.tight = true
    if (waiver !== undefined) finding.waiver = { id: waiver.id, endsAt: waiver.endsAt }
    return finding
  }
}
