import { stateAt } from './model-graph.ts'
import type { PairModel, State } from './model.ts'
import { STATE_COUNT } from './resolved.ts'

/** One fg/bg state as a number. */
export function combinationOf(foreground: State, background: State): number {
  return stateAt(foreground) * STATE_COUNT + stateAt(background)
}

type Combination = readonly [foreground: State, background: State]

/** One component: each state that either token lists; one that lacks it stays at rest. */
function together(foreground: readonly State[], background: readonly State[]): Combination[] {
  const states = [...new Set([...foreground, ...background])]
  return states.map((state) => [
    foreground.includes(state) ? state : 'rest',
    background.includes(state) ? state : 'rest',
  ])
}

/** A foreground under the pointer whose container, though it reacts to pointers, does not: they cannot part. */
function isPointerApart(foreground: State, background: State, listed: readonly State[]): boolean {
  const isPointed = (state: State) => state === 'hover' || state === 'active'
  return isPointed(foreground) && listed.includes('hover') && !isPointed(background)
}

/** A foreground within a container: every state of one on every state of the other that can occur. */
function inside(foreground: readonly State[], background: readonly State[]): Combination[] {
  return foreground.flatMap((fg) =>
    background
      .filter((bg) => !isPointerApart(fg, bg, background))
      .filter((bg) => !(bg === 'disabled' && fg !== 'disabled' && foreground.includes('disabled')))
      .map((bg): Combination => [fg, bg]),
  )
}

/**
 * The fg/bg states in which a pair occurs, as numbers of `combinationOf`.
 * @param listed the states of both tokens, `rest` first
 */
export function combinationsOf(
  pair: PairModel,
  listed: { readonly foreground: readonly State[]; readonly background: readonly State[] },
): number[] {
  const { foreground, background } = listed
  const all =
    pair.use === 'link-in-text'
      ? background.map((state): Combination => ['rest', state])
      : pair.relation === 'together'
        ? together(foreground, background)
        : inside(foreground, background)
  const stays = (state: State) =>
    state === 'rest' || pair.states === undefined || pair.states.includes(state)
  return all.filter(([fg, bg]) => stays(fg) && stays(bg)).map(([fg, bg]) => combinationOf(fg, bg))
}
