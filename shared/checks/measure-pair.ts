import type { PairMeasure } from './evaluation.ts'
import type { PairModel } from './model.ts'
import { requiredIn } from './pair-requirements.ts'
import { createColumns, fillRows, type UnderlayOf } from './pair-rows.ts'
import { combinationsOf } from './pair-states.ts'
import { type ResolvedSystem, type ResolvedToken, STATE_COUNT } from './resolved.ts'
import { toUnderlay, type Underlay } from './stack-ratio.ts'
import { kindOf } from './uses.ts'

/** A resolved model has every token that its pairs name. */
function tokenOf(resolved: ResolvedSystem, id: string): ResolvedToken {
  return resolved.tokens.get(id)!
}

/** Reads what lies under pairs; a ground that nothing else covers is read once a theme. */
function createUnderlays(resolved: ResolvedSystem): (pair: PairModel, theme: number) => Underlay {
  const grounds: (Underlay | undefined)[] = []
  const unknown = toUnderlay([], true)
  const read = (backdrop: readonly string[], theme: number) => {
    const ids = [resolved.model.themes[theme]!.ground, ...backdrop]
    const cells = ids.map((id) => tokenOf(resolved, id).cells[theme * STATE_COUNT]!)
    return toUnderlay(
      cells.map((cell) => cell.color.rendered),
      false,
    )
  }
  return ({ backdrop }, theme) => {
    if (backdrop === 'unknown') return unknown
    if (backdrop.length > 0) return read(backdrop, theme)
    grounds[theme] ??= read(backdrop, theme)
    return grounds[theme]
  }
}

/** Measures pairs of a system, each in all of its themes and fg/bg states. */
export function createPairMeasuring(resolved: ResolvedSystem): (pair: PairModel) => PairMeasure {
  const { settings, themes: all } = resolved.model
  const positions = [...all.keys()]
  const underlayIn = createUnderlays(resolved)
  return (pair) => {
    const foreground = tokenOf(resolved, pair.foreground)
    const background = tokenOf(resolved, pair.background)
    const named = pair.themes
    const themes = named ? positions.filter((at) => named.includes(all[at]!.id)) : positions
    const combinations = combinationsOf(pair, {
      foreground: foreground.states,
      background: background.states,
    })
    const required = themes.map((theme) => requiredIn(resolved, pair, theme))
    const underlayOf: UnderlayOf = (theme) => underlayIn(pair, theme)
    const columns = createColumns(themes.length * combinations.length, settings)
    const measure = { pair, kind: kindOf(pair.use), themes, combinations, required, ...columns }
    fillRows(measure, { settings, foreground, background, underlayOf })
    return measure
  }
}

/** Measures a pair in each of its themes and fg/bg states. */
export function measurePair(resolved: ResolvedSystem, pair: PairModel): PairMeasure {
  return createPairMeasuring(resolved)(pair)
}
