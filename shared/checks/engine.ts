import { GAMUT_MAP } from '#shared/color/gamut-map.ts'
import type { EngineStamp } from './model.ts'

/** Version of resolution, measuring and verdict; any change that can move a verdict raises it. */
export const ENGINE_VERSION = '1.0.0'

/** The rules that the requirements are taken from. @see https://www.w3.org/TR/WCAG22/ */
export const RULE_SET = 'wcag-2.2'

/** What every verdict names, so that it can be told apart from another engine's. */
export const ENGINE_STAMP: EngineStamp = {
  version: ENGINE_VERSION,
  gamutMap: GAMUT_MAP,
  ruleSet: RULE_SET,
}
