import { exemptionOf } from './pair-requirements.ts'
import { type PairModel, STATES, type State, type SystemSettings } from './model.ts'
import { combinationsOf } from './pair-states.ts'
import { type ResolvedSystem, STATE_COUNT } from './resolved.ts'
import { createPairTitles, createTokenNames, type Weakening } from './weakening-kinds.ts'

type Side = 'foreground' | 'background'
type Listed = Readonly<Record<Side, readonly State[]>>

/**
 * States of tokens that come or go so that a pair is measured in fewer of them: one that goes takes its findings
 * with it, and one that comes can make others impossible.
 */
export function stateWeakenings(before: ResolvedSystem, after: ResolvedSystem): Weakening[] {
  const moved = tokensOfOtherStates(before, after)
  if (moved.size === 0) return []
  const { settings } = after.model
  const titleOf = createPairTitles(after)
  const nameOf = createTokenNames(after)
  const details = new Map<string, string[]>()
  const say = (token: string, detail: string) =>
    details.set(token, [...(details.get(token) ?? []), detail])
  for (const pair of after.model.pairs) {
    const { foreground, background } = pair
    if (!moved.has(foreground) && !moved.has(background)) continue
    const was = listedIn(before, pair)
    const is = listedIn(after, pair)
    if (was === undefined || is === undefined) continue
    for (const side of ['foreground', 'background'] as const) {
      const gone = goneStates({ pair, side, was, is, settings })
      if (gone.length > 0) say(pair[side], `${titleOf(pair)} in ${gone.join(', ')}`)
      const hidden = hiddenSituations({ pair, side, was, is, settings })
      if (hidden.length > 0) say(pair[side], `${titleOf(pair)} in ${hidden.join(', ')}`)
    }
  }
  return [...details].map(([id, lost]) => {
    const detail = `With the states of ${nameOf(id)}, ${listed([...new Set(lost)])} is measured no longer`
    return { code: 'states-changed', item: { kind: 'token', id }, member: 'states', detail }
  })
}

/** Ids of tokens that list other states than before, themselves or through an alias. */
export function tokensOfOtherStates(before: ResolvedSystem, after: ResolvedSystem): Set<string> {
  const moved = new Set<string>()
  if (before.tokens === after.tokens) return moved
  for (const [id, { states }] of after.tokens) {
    const known = before.tokens.get(id)?.states
    if (known !== undefined && known !== states && known.join() !== states.join()) moved.add(id)
  }
  return moved
}

function listedIn({ tokens }: ResolvedSystem, pair: PairModel): Listed | undefined {
  const foreground = tokens.get(pair.foreground)?.states
  const background = tokens.get(pair.background)?.states
  return foreground && background && { foreground, background }
}

interface Question {
  readonly pair: PairModel
  readonly side: Side
  readonly was: Listed
  readonly is: Listed
  readonly settings: SystemSettings
}

/** States that the token of one side lists no longer and that were asked something of. */
function goneStates({ pair, side, was, is, settings }: Question): State[] {
  const gone = was[side].filter((state) => !is[side].includes(state))
  if (gone.length === 0) return []
  const asked = askedOf(pair, was, settings).map((combination) => statesAt(combination)[side])
  return gone.filter((state) => asked.includes(state))
}

/** What was asked for and is impossible beside the states that one side has gained. */
function hiddenSituations({ pair, side, was, is, settings }: Question): string[] {
  const gained = is[side].filter((state) => !was[side].includes(state))
  if (gained.length === 0) return []
  const widened = { ...was, [side]: [...was[side], ...gained] }
  const remaining = new Set(
    askedOf(pair, widened, settings).map((combination) => situationOf(pair, combination)),
  )
  return askedOf(pair, was, settings)
    .filter((combination) => !remaining.has(situationOf(pair, combination)))
    .map((combination) => Object.values(statesAt(combination)).join('/'))
}

/** The fg/bg states in which a pair is measured and not exempt, or exempt above a floor. */
function askedOf(pair: PairModel, listed: Listed, settings: SystemSettings): number[] {
  return combinationsOf(pair, listed).filter((combination) => {
    const exemption = exemptionOf(pair, combination)
    if (exemption === undefined) return true
    const hasFloor = exemption === 'disabled' || exemption === 'inactive'
    return hasFloor && settings.disabledFloor !== undefined
  })
}

const statesAt = (combination: number): Readonly<Record<Side, State>> => ({
  foreground: STATES[Math.floor(combination / STATE_COUNT)]!,
  background: STATES[combination % STATE_COUNT]!,
})

/**
 * What a fg/bg state stands for, whichever states the other side lists: of one component its one state; of a
 * foreground under the pointer, that its container is under it as well.
 */
function situationOf({ relation, use }: PairModel, combination: number): string {
  const { foreground, background } = statesAt(combination)
  if (use === 'link-in-text') return background
  if (relation === 'together') return foreground === 'rest' ? background : foreground
  return foreground === 'hover' || foreground === 'active'
    ? foreground
    : `${foreground}/${background}`
}

const MOST_SAID = 5

function listed(lost: readonly string[]): string {
  const more = lost.length - MOST_SAID
  return lost.slice(0, MOST_SAID).join('; ') + (more > 0 ? `; and ${more} more` : '')
}
