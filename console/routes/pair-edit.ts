import { useMemo, useState } from 'react'
import { useTriedEffect } from '#console/features/checks/tried-effect.ts'
import {
  leftOf,
  type PairDraft,
  type PairFields,
  pairEdits,
  readPair,
} from '#console/features/pairs/pair-draft.ts'
import { startSentence } from '#console/lib/format.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { ModelFault } from '#shared/checks/model.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { weakeningsBetween } from '#shared/checks/weakening.ts'

/** A pair being edited or declared: what is written, what that comes to, and what it would move. */
export function usePairEdit(
  { id, standing }: { readonly id: string; readonly standing: PairFields },
  evaluation: Evaluation | undefined,
  start: PairDraft = {},
) {
  const [written, setWritten] = useState<PairDraft>(start)
  const draft = useMemo(() => leftOf(standing, written), [standing, written])
  const fields = useMemo<PairFields>(() => ({ ...standing, ...draft }), [standing, draft])
  const reading = useMemo(() => readPair(fields), [fields])
  const isEdited = Object.keys(draft).length > 0
  const read = useMemo(
    () =>
      evaluation && isEdited && reading.ok
        ? pairEdits(evaluation.resolved.model, id, reading.input)
        : undefined,
    [evaluation, isEdited, reading, id],
  )
  const tried = useTriedEffect(evaluation, read?.ok === true ? read.edits : undefined)
  const weakenings = useMemo(
    () =>
      evaluation && tried.kind === 'measured'
        ? weakeningsBetween(evaluation.resolved, tried.evaluation.resolved)
        : [],
    [evaluation, tried],
  )
  const missing = read?.ok === false ? read.faults : []
  const refused = tried.kind === 'unresolvable' ? tried.faults.flatMap(demandFault(id)) : []
  return {
    id,
    draft,
    fields,
    isEdited,
    /** As a write gives it; none while a field cannot be read. */
    input: reading.ok ? reading.input : undefined,
    faults: reading.ok ? [...missing, ...refused] : reading.faults,
    tried,
    /** What the edit asks less of, each as a sentence. */
    weakenings: weakenings.map(({ detail }) => `${detail}.`),
    put: (part: PairDraft) => setWritten((before) => ({ ...before, ...part })),
    putBack: () => setWritten(start),
  }
}

const DEMANDS: { readonly [code in ModelFault['code']]?: string } = {
  'level-lower': '/level',
  'minimum-lower': '/minimum',
}

/** What the engine refuses of the pair's own demands, beside the field that it is about. */
const demandFault =
  (id: string) =>
  ({ pair, code, detail }: ModelFault): Fault[] => {
    const pointer = DEMANDS[code]
    return pair === id && pointer !== undefined
      ? [{ pointer, detail: `${startSentence(detail)}.` }]
      : []
  }

export type PairEdit = ReturnType<typeof usePairEdit>
