import { useEffect, useState } from 'react'
import { consequences } from '#shared/checks/consequences.ts'
import type { SystemEdits } from '#shared/checks/edits.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { ModelFault } from '#shared/checks/model.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { type Effect, effectOf } from './effect-lines.ts'

/** What is known of an edit that is being tried. */
export type TriedEffect =
  | { readonly kind: 'none' }
  | { readonly kind: 'measuring' }
  | { readonly kind: 'unresolvable'; readonly faults: readonly ModelFault[] }
  | { readonly kind: 'measured'; readonly effect: Effect; readonly evaluation: Evaluation }

/** A full check holds the page for a moment, so that it waits until nobody types. */
const PAUSE_MS = 150

/** Measures what edits would do to the head; `edits` must keep its identity while nothing is edited. */
export function useTriedEffect(
  present: Evaluation | undefined,
  edits: SystemEdits | undefined,
): TriedEffect {
  const [known, setKnown] = useState<{
    readonly present: Evaluation
    readonly edits: SystemEdits
    readonly tried: TriedEffect
  }>()
  useEffect(() => {
    if (present === undefined || edits === undefined) return
    const pause = setTimeout(() => {
      setKnown({ present, edits, tried: measure(present, edits) })
    }, PAUSE_MS)
    return () => clearTimeout(pause)
  }, [present, edits])
  if (edits === undefined) return { kind: 'none' }
  return known?.edits === edits && known.present === present ? known.tried : { kind: 'measuring' }
}

function measure(present: Evaluation, edits: SystemEdits): TriedEffect {
  const checked = recheck(present, edits)
  if (!checked.ok) return { kind: 'unresolvable', faults: checked.faults }
  const { evaluation } = checked
  return { kind: 'measured', effect: effectOf(consequences(present, evaluation)), evaluation }
}
