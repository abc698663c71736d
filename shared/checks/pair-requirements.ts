import { type PairModel, STATES, type SystemSettings, type Use } from './model.ts'
import { type ResolvedSystem, STATE_COUNT } from './resolved.ts'
import { type MeasuredStack, wideOver } from './stack-ratio.ts'
import { effectiveLevel, requiredRatio } from './uses.ts'

const DISABLED = STATES.indexOf('disabled')

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

/** The ratio that decides: the lower of the two where P3 gates. */
export function gatingRatio(srgb: number, p3: number, settings: SystemSettings): number {
  return settings.p3Gates && p3 < srgb ? p3 : srgb
}

/** Whether the pair shows a layer that leaves sRGB or is translucent. */
export function isWide(stack: MeasuredStack): boolean {
  const under = wideOver(stack.background, stack.underlay.isWide)
  return under || wideOver(stack.foreground, stack.isLaidOn ? under : stack.underlay.isWide)
}
