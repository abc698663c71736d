import { type PairMeasure, ROW_EXEMPT, ROW_MET, ROW_SHORT, ROW_UNDER_FLOOR } from './evaluation.ts'
import { type PairModel, STATES, type SystemSettings, type Use } from './model.ts'
import { combinationsOf } from './pair-states.ts'
import { type ResolvedSystem, type ResolvedToken, STATE_COUNT } from './resolved.ts'
import {
  type MeasuredStack,
  stackRatio,
  toUnderlay,
  translucentOver,
  type Underlay,
  wideOver,
} from './stack-ratio.ts'
import { effectiveLevel, kindOf, requiredRatio } from './uses.ts'

const DISABLED = STATES.indexOf('disabled')
const UNMOVED = { foreground: 0, background: 0 }
const NONE = new Float64Array(0)

/** Why a row is exempt: by declaration, or because the state is disabled. */
export function exemptionOf(pair: PairModel, combination: number): string | undefined {
  if (pair.exempt !== undefined) return pair.exempt.kind
  if (Math.floor(combination / STATE_COUNT) === DISABLED) return 'disabled'
  const isOneComponent = pair.relation === 'together' && pair.use !== 'link-in-text'
  return isOneComponent && combination % STATE_COUNT === DISABLED ? 'disabled' : undefined
}

/** Whether the foreground is measured as it lies on the background, or each side on the backdrop. */
export function isLaidOn(use: Use): boolean {
  return use !== 'link-in-text' && use !== 'focus-adjacent'
}

/** What a row must reach to keep its verdict; undefined where nothing can fail. */
export function thresholdOf(
  exemption: string | undefined,
  required: number,
  settings: SystemSettings,
): number | undefined {
  if (exemption === undefined) return required
  const isDisabled = exemption === 'disabled' || exemption === 'inactive'
  return isDisabled ? settings.disabledFloor : undefined
}

/** What a pair asks for in a theme: the highest of its use's ratio, the levels that hold, and its minimum. */
export function requiredIn(resolved: ResolvedSystem, pair: PairModel, theme: number): number {
  const { settings, themes } = resolved.model
  const level = effectiveLevel(settings.level, themes[theme]!.level, pair.level)
  return Math.max(requiredRatio(pair.use, level), pair.minimum ?? 0)
}

function underlayIn(resolved: ResolvedSystem, pair: PairModel, theme: number): Underlay {
  const restOf = (id: string) => tokenOf(resolved, id).cells[theme * STATE_COUNT]!.color.rendered
  const isUnknown = pair.backdrop === 'unknown'
  const backdrop = pair.backdrop === 'unknown' ? [] : pair.backdrop
  const layers = [resolved.model.themes[theme]!.ground, ...backdrop].map(restOf)
  return toUnderlay(isUnknown ? [] : layers, isUnknown)
}

/** A resolved model has every token that its pairs name. */
function tokenOf(resolved: ResolvedSystem, id: string): ResolvedToken {
  return resolved.tokens.get(id)!
}

/** The columns of a pair while they are filled. */
interface Columns {
  readonly srgb: Float64Array
  readonly p3: Float64Array
  readonly ratio: Float64Array
  readonly status: Uint8Array
  readonly tight: Uint8Array
}

function createColumns(rows: number, settings: SystemSettings): Columns {
  const srgb = new Float64Array(rows)
  return {
    srgb,
    p3: settings.p3 ? new Float64Array(rows) : NONE,
    ratio: settings.p3 && settings.p3Gates ? new Float64Array(rows) : srgb,
    status: new Uint8Array(rows),
    tight: new Uint8Array(rows),
  }
}

/** The ratio that decides: the lower of the two where P3 gates. */
export function gatingRatio(srgb: number, p3: number, settings: SystemSettings): number {
  return settings.p3Gates && p3 < srgb ? p3 : srgb
}

/** Whether the pair shows a layer that leaves sRGB or is translucent. */
export function isWide(stack: MeasuredStack): boolean {
  const under = wideOver(stack.background, stack.underlay.isWide)
  return under || wideOver(stack.foreground, stack.isLaidOn ? under : stack.underlay.isWide)
}

const moved = { foreground: 0, background: 0 }

/** Whether the verdict flips when each side moves by one level for each translucent layer seen on it. */
function isTight(
  stack: MeasuredStack,
  aim: { readonly meets: boolean; readonly threshold: number; readonly withP3: boolean },
): boolean {
  const under = translucentOver(stack.background, stack.underlay.translucent)
  const below = stack.isLaidOn ? under : stack.underlay.translucent
  const over = translucentOver(stack.foreground, below)
  if (over === 0 && under === 0) return false
  for (let corner = 0; corner < 4; corner++) {
    moved.foreground = corner & 1 ? over : -over
    moved.background = corner & 2 ? under : -under
    const srgb = stackRatio(stack, 'srgb', moved)
    const lower = aim.withP3 ? Math.min(srgb, stackRatio(stack, 'p3', moved)) : srgb
    if (lower >= aim.threshold !== aim.meets) return true
  }
  return false
}

/** What one row is measured from. Mutable: one object serves all rows of a pair. */
interface RowTask {
  readonly settings: SystemSettings
  readonly stack: MeasuredStack
  required: number
  exemption: string | undefined
}

function measureRow(columns: Columns, row: number, task: RowTask): void {
  const { stack, settings, exemption, required } = task
  const srgb = stackRatio(stack, 'srgb', UNMOVED)
  const withP3 = settings.p3 && isWide(stack)
  const p3 = withP3 ? stackRatio(stack, 'p3', UNMOVED) : Number.NaN
  const ratio = gatingRatio(srgb, p3, settings)
  columns.srgb[row] = srgb
  if (settings.p3) columns.p3[row] = p3
  columns.ratio[row] = ratio
  const threshold = thresholdOf(exemption, required, settings)
  const meets = threshold === undefined || ratio >= threshold
  const isExempt = exemption !== undefined
  columns.status[row] = meets
    ? isExempt
      ? ROW_EXEMPT
      : ROW_MET
    : isExempt
      ? ROW_UNDER_FLOOR
      : ROW_SHORT
  if (threshold === undefined) return
  const aim = { meets, threshold, withP3: withP3 && settings.p3Gates }
  columns.tight[row] = isTight(stack, aim) ? 1 : 0
}

function fillRows(
  resolved: ResolvedSystem,
  columns: Columns,
  measure: Pick<PairMeasure, 'pair' | 'themes' | 'combinations' | 'required'>,
): void {
  const { pair, themes, combinations, required } = measure
  const foreground = tokenOf(resolved, pair.foreground).cells
  const background = tokenOf(resolved, pair.background).cells
  const exemptions = combinations.map((combination) => exemptionOf(pair, combination))
  for (let at = 0; at < themes.length; at++) {
    const first = themes[at]! * STATE_COUNT
    const task: RowTask = {
      settings: resolved.model.settings,
      stack: {
        foreground: foreground[first]!.color.rendered,
        background: background[first]!.color.rendered,
        underlay: underlayIn(resolved, pair, themes[at]!),
        isLaidOn: isLaidOn(pair.use),
      },
      required: required[at]!,
      exemption: undefined,
    }
    for (let place = 0; place < combinations.length; place++) {
      const combination = combinations[place]!
      const bg = combination % STATE_COUNT
      const fg = (combination - bg) / STATE_COUNT
      task.stack.foreground = foreground[first + fg]!.color.rendered
      task.stack.background = background[first + bg]!.color.rendered
      task.exemption = exemptions[place]
      measureRow(columns, at * combinations.length + place, task)
    }
  }
}

/** Measures a pair in each of its themes and fg/bg states. */
export function measurePair(resolved: ResolvedSystem, pair: PairModel): PairMeasure {
  const themes = resolved.model.themes.flatMap((theme, position) =>
    pair.themes === undefined || pair.themes.includes(theme.id) ? [position] : [],
  )
  const combinations = combinationsOf(pair, {
    foreground: tokenOf(resolved, pair.foreground).states,
    background: tokenOf(resolved, pair.background).states,
  })
  const required = themes.map((theme) => requiredIn(resolved, pair, theme))
  const columns = createColumns(themes.length * combinations.length, resolved.model.settings)
  fillRows(resolved, columns, { pair, themes, combinations, required })
  return { pair, kind: kindOf(pair.use), themes, combinations, required, ...columns }
}
