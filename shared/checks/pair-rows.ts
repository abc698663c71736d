import { contrastRatio } from '#shared/color/luminance.ts'
import { type PairMeasure, ROW_EXEMPT, ROW_MET, ROW_SHORT, ROW_UNDER_FLOOR } from './evaluation.ts'
import { exemptionOf, gatingRatio, isLaidOn, isWide, thresholdOf } from './pair-requirements.ts'
import type { SystemSettings } from './model.ts'
import { type ResolvedToken, STATE_COUNT } from './resolved.ts'
import {
  type MeasuredStack,
  stackRatio,
  translucentOver,
  type Underlay,
  writeMovedRatios,
} from './stack-ratio.ts'
import { LIGHT_PLAIN, LIGHT_TRANSLUCENT } from './token-light.ts'

/** What lies under a pair in a theme; asked for only where it can be seen. */
export type UnderlayOf = (theme: number) => Underlay

/** The columns of a measure while they are filled. */
export type Columns = Pick<PairMeasure, 'srgb' | 'p3' | 'ratio' | 'status' | 'tight'>

const NONE = new Float64Array(0)

/** Makes the columns of a measure in one piece of memory. */
export function createColumns(rows: number, settings: SystemSettings): Columns {
  const hasRatio = settings.p3 && settings.p3Gates
  const doubles = 1 + Number(settings.p3) + Number(hasRatio)
  const memory = new ArrayBuffer(rows * (8 * doubles + 2))
  const column = (at: number) => new Float64Array(memory, at * rows * 8, rows)
  const srgb = column(0)
  return {
    srgb,
    p3: settings.p3 ? column(1) : NONE,
    ratio: hasRatio ? column(2) : srgb,
    status: new Uint8Array(memory, doubles * rows * 8, rows),
    tight: new Uint8Array(memory, doubles * rows * 8 + rows, rows),
  }
}

/** What the rows of a measure are filled from. */
export interface RowSources {
  readonly settings: SystemSettings
  readonly foreground: ResolvedToken
  readonly background: ResolvedToken
  readonly underlayOf: UnderlayOf
}

const levels = { foreground: 0, background: 0 }
const movedRatios = new Float64Array(4)
const movedP3 = new Float64Array(4)

/** Whether the verdict flips when each side moves by one level for each translucent layer seen on it. */
function isTight(
  stack: MeasuredStack,
  aim: { readonly meets: boolean; readonly threshold: number; readonly withP3: boolean },
): boolean {
  const under = translucentOver(stack.background, stack.underlay.translucent)
  const below = stack.isLaidOn ? under : stack.underlay.translucent
  const over = translucentOver(stack.foreground, below)
  if (over === 0 && under === 0) return false
  levels.foreground = over
  levels.background = under
  writeMovedRatios(stack, 'srgb', levels, movedRatios)
  if (aim.withP3) writeMovedRatios(stack, 'p3', levels, movedP3)
  for (let corner = 0; corner < 4; corner++) {
    const srgb = movedRatios[corner]!
    const lower = aim.withP3 ? Math.min(srgb, movedP3[corner]!) : srgb
    if (lower >= aim.threshold !== aim.meets) return true
  }
  return false
}

/** What one row must reach, NaN where nothing can fail; and whether it is exempt. */
interface RowAim {
  readonly threshold: number
  readonly isExempt: boolean
}

function statusOf(meets: boolean, isExempt: boolean): number {
  if (meets) return isExempt ? ROW_EXEMPT : ROW_MET
  return isExempt ? ROW_UNDER_FLOOR : ROW_SHORT
}

/** Fills the row of two colours through which something can be seen. */
function fillStack(
  columns: Columns,
  row: number,
  task: { readonly stack: MeasuredStack; readonly settings: SystemSettings; readonly aim: RowAim },
): void {
  const { stack, settings, aim } = task
  const { threshold, isExempt } = aim
  const srgb = stackRatio(stack, 'srgb')
  const hasP3 = settings.p3 && isWide(stack)
  const p3 = hasP3 ? stackRatio(stack, 'p3') : Number.NaN
  const ratio = gatingRatio(srgb, p3, settings)
  columns.srgb[row] = srgb
  if (settings.p3) columns.p3[row] = p3
  columns.ratio[row] = ratio
  const meets = !(ratio < threshold)
  columns.status[row] = statusOf(meets, isExempt)
  if (Number.isNaN(threshold)) return
  const withP3 = hasP3 && settings.p3Gates
  columns.tight[row] = isTight(stack, { meets, threshold, withP3 }) ? 1 : 0
}

/** By position in the combinations: what a row of a theme must reach. */
function aimsOf(
  { pair, combinations }: Pick<PairMeasure, 'pair' | 'combinations'>,
  required: number,
  settings: SystemSettings,
): RowAim[] {
  return combinations.map((combination) => {
    const exemption = exemptionOf(pair, combination)
    const threshold = thresholdOf(exemption, required, settings) ?? Number.NaN
    return { threshold, isExempt: exemption !== undefined }
  })
}

/**
 * Measures every row of a pair. Two opaque colours hide what lies under them: their ratio comes from luminances
 * read once a colour. Anything else is composited.
 */
export function fillRows(measure: PairMeasure, sources: RowSources): void {
  const { settings, foreground, background } = sources
  const { combinations, themes } = measure
  const over = foreground.light
  const under = background.light
  let aims: RowAim[] = []
  for (let at = 0; at < themes.length; at++) {
    const first = themes[at]! * STATE_COUNT
    const required = measure.required[at]!
    if (at === 0 || required !== measure.required[at - 1])
      aims = aimsOf(measure, required, settings)
    let stack: MeasuredStack | undefined
    for (let place = 0; place < combinations.length; place++) {
      const combination = combinations[place]!
      const bg = first + (combination % STATE_COUNT)
      const fg = first + Math.floor(combination / STATE_COUNT)
      const row = at * combinations.length + place
      const aim = aims[place]!
      const kinds = over.kinds[fg]! | under.kinds[bg]!
      if (kinds >= LIGHT_TRANSLUCENT) {
        const underlay = sources.underlayOf(themes[at]!)
        stack ??= stackOf(measure, sources, underlay)
        stack.foreground = foreground.cells[fg]!.color.rendered
        stack.background = background.cells[bg]!.color.rendered
        fillStack(measure, row, { stack, settings, aim })
        continue
      }
      const srgb = contrastRatio(over.srgb[fg]!, under.srgb[bg]!)
      const isP3 = settings.p3 && kinds !== LIGHT_PLAIN
      const p3 = isP3 ? contrastRatio(over.p3[fg]!, under.p3[bg]!) : Number.NaN
      const ratio = gatingRatio(srgb, p3, settings)
      measure.srgb[row] = srgb
      if (settings.p3) measure.p3[row] = p3
      measure.ratio[row] = ratio
      measure.status[row] = statusOf(!(ratio < aim.threshold), aim.isExempt)
    }
  }
}

/** One object serves all rows of a pair in a theme. */
function stackOf(
  { pair }: PairMeasure,
  { foreground, background }: RowSources,
  underlay: Underlay,
): MeasuredStack {
  return {
    foreground: foreground.cells[0]!.color.rendered,
    background: background.cells[0]!.color.rendered,
    underlay,
    isLaidOn: isLaidOn(pair.use),
  }
}
