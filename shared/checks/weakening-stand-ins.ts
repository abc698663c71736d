import type { PairModel, ThemeModel } from './model.ts'
import { combinationsOf } from './pair-states.ts'
import { type ResolvedSystem, statesOf } from './resolved.ts'
import { effectiveLevel, requiredRatio } from './uses.ts'
import { createPairTitles, type Weakening } from './weakening-kinds.ts'
import { tokensOfOtherStates } from './weakening-states.ts'

/**
 * Pairs of an `anyOf` group that can be met by one that could not stand in for them before: because either
 * joined the group, or because the other is measured where it was not.
 */
export function standInWeakenings(before: ResolvedSystem, after: ResolvedSystem): Weakening[] {
  if (isMeasuredAlike(before, after)) return []
  const groups = groupsOf(after)
  if (groups.size === 0) return []
  const standing = new Map(before.model.pairs.map((pair) => [pair.id, pair]))
  const titleOf = createPairTitles(after)
  const found = new Map<string, Weakening>()
  for (const members of groups.values()) {
    for (const { member, other } of newStandIns(members, { before, after, standing })) {
      const joins = standing.get(member.id)?.anyOf === member.anyOf ? other : member
      const isJoining = standing.get(joins.id)?.anyOf !== joins.anyOf
      if (found.has(joins.id)) continue
      found.set(joins.id, {
        code: 'any-of-joined',
        item: { kind: 'pair', id: joins.id },
        ...(isJoining ? { member: 'anyOf' } : {}),
        detail: `${titleOf(other)} can stand in for ${titleOf(member)} now`,
      })
    }
  }
  return [...found.values()]
}

/** Colours alone moved: no pair is measured in other places, or asked more. */
function isMeasuredAlike(before: ResolvedSystem, after: ResolvedSystem): boolean {
  const { pairs, themes, settings } = before.model
  if (pairs !== after.model.pairs || themes !== after.model.themes) return false
  return settings === after.model.settings && tokensOfOtherStates(before, after).size === 0
}

function groupsOf({ model }: ResolvedSystem): Map<string, PairModel[]> {
  const groups = new Map<string, PairModel[]>()
  for (const pair of model.pairs) {
    if (pair.anyOf === undefined) continue
    const known = groups.get(pair.anyOf)
    if (known) known.push(pair)
    else groups.set(pair.anyOf, [pair])
  }
  return groups
}

interface Sides {
  readonly before: ResolvedSystem
  readonly after: ResolvedSystem
  /** By id, as they were. */
  readonly standing: ReadonlyMap<string, PairModel>
}

function newStandIns(members: readonly PairModel[], { before, after, standing }: Sides) {
  const placesNow = new Map(members.map((pair) => [pair, placesOf(after, pair)]))
  return members.flatMap((member) => {
    const was = standing.get(member.id)
    if (was === undefined) return []
    const own = placesOf(before, was)
    return members.flatMap((other) => {
      if (other === member) return []
      const stoodBefore = standing.get(other.id)
      const isOld = stoodBefore !== undefined && was.anyOf !== undefined
      const covered =
        isOld && stoodBefore.anyOf === was.anyOf ? meetingPlaces(before, stoodBefore) : NOWHERE
      const covers = meetingPlaces(after, other)
      const isNew = [...placesNow.get(member)!].some(
        (place) => own.has(place) && covers.has(place) && !covered.has(place),
      )
      return isNew ? [{ member, other }] : []
    })
  })
}

const NOWHERE: ReadonlySet<string> = new Set()

/** Theme and fg/bg state of everything that is measured of a pair. */
const placesOf = (system: ResolvedSystem, pair: PairModel): ReadonlySet<string> =>
  placesWhere(system, pair, () => true)

/** Of it, what something is required of: only that can meet anything. */
const meetingPlaces = (system: ResolvedSystem, pair: PairModel): ReadonlySet<string> =>
  placesWhere(system, pair, (theme) => {
    const level = effectiveLevel(system.model.settings.level, theme.level, pair.level)
    return Math.max(requiredRatio(pair.use, level), pair.minimum ?? 0) > 0
  })

function placesWhere(
  system: ResolvedSystem,
  pair: PairModel,
  holds: (theme: ThemeModel) => boolean,
): ReadonlySet<string> {
  const combinations = combinationsOf(pair, {
    foreground: statesOf(system, pair.foreground),
    background: statesOf(system, pair.background),
  })
  const themes = system.model.themes.filter(
    (theme) => (pair.themes?.includes(theme.id) ?? true) && holds(theme),
  )
  return new Set(themes.flatMap(({ id }) => combinations.map((state) => `${id} ${state}`)))
}
