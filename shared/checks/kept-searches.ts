import type { ColorPlace } from './color-place.ts'
import type { ColorProbe } from './color-probe.ts'
import { createColorProbe } from './color-probe.ts'
import type { Evaluation } from './evaluation.ts'
import type { NearestAt, PlacedColor } from './nearest-at.ts'
import { placeKey } from './repair-places.ts'
import { STATE_COUNT } from './resolved.ts'

/** What was found for places, kept until something that hangs on them moves: searching again would find the same. */
export interface KeptSearches {
  /** Absent where it has to be searched; null where nothing was found. */
  find(place: ColorPlace): PlacedColor | null | undefined
  keep(place: ColorPlace, search: NearestAt): void
  /** Forgets what shares a finding or a distinct set with a place that is about to move. */
  forget(evaluation: Evaluation, moved: ColorPlace): void
}

/** Findings and distinct sets that hang on a place. */
function hangingOn({ rows, values, evaluation }: ColorProbe): Set<string> {
  const hanging = new Set(rows.map(({ finding }) => finding.identity))
  const { themes, distinctSets = [] } = evaluation.resolved.model
  for (const { id, tokens } of distinctSets) {
    const isReached = [...themes.keys()].some((theme) =>
      [themes[theme]!.ground, ...tokens].some((token) =>
        values.reaches(token, theme * STATE_COUNT),
      ),
    )
    if (isReached) hanging.add(`distinct set ${id}`)
  }
  return hanging
}

export function createKeptSearches(): KeptSearches {
  const kept = new Map<string, { found: PlacedColor | null; hanging: ReadonlySet<string> }>()
  return {
    find: (place) => kept.get(placeKey(place))?.found,
    keep(place, { found = null, probe }) {
      kept.set(placeKey(place), { found, hanging: hangingOn(probe) })
    },
    forget(evaluation, moved) {
      const moving = hangingOn(createColorProbe(evaluation, moved))
      for (const [key, { hanging }] of kept) {
        if ([...moving].some((one) => hanging.has(one))) kept.delete(key)
      }
    },
  }
}
