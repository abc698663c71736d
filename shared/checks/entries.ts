import type { Evaluation, PairMeasure, Subject } from './evaluation.ts'
import { createFindingWriter } from './finding-writer.ts'
import type { Judge, Judgement } from './judgement.ts'
import { identityOfRow, reachOfRow } from './measured-row.ts'
import type { Finding, Outcome } from './model.ts'

/** Strictest first: what an entry made of several findings answers. */
const STRICTNESS: readonly Outcome[] = ['breach', 'waived', 'known', 'pass', 'exempt']

/** One entry of a verdict: the row that speaks for it, and every measure that declares it. */
export interface Entry {
  readonly measure: PairMeasure
  readonly row: number
  readonly judgement: Judgement
  readonly declared: readonly PairMeasure[]
}

type Visit = (measure: PairMeasure, row: number, judgement: Judgement, merged?: Entry) => void

function speaksLouder(evaluation: Evaluation, challenger: Entry, holder: Entry): boolean {
  const order =
    STRICTNESS.indexOf(challenger.judgement.outcome) - STRICTNESS.indexOf(holder.judgement.outcome)
  if (order !== 0) return order < 0
  const reach = (entry: Entry) => reachOfRow(evaluation, entry.measure, entry.row)
  return reach(challenger) < reach(holder)
}

function mergedEntries(evaluation: Evaluation, subject: Subject, judge: Judge): Entry[] {
  const entries = new Map<string, Entry>()
  for (const member of subject.members) {
    const measure = evaluation.measures[member]!
    for (let row = 0; row < measure.ratio.length; row++) {
      const identity = identityOfRow(evaluation, measure, row)
      const holder = entries.get(identity)
      const declared = [...(holder?.declared ?? []), measure]
      const challenger = { measure, row, judgement: judge(measure, row), declared }
      const isLouder = holder === undefined || speaksLouder(evaluation, challenger, holder)
      entries.set(identity, isLouder ? challenger : { ...holder, declared })
    }
  }
  return [...entries.values()]
}

/** Visits each entry of a subject once; where one pair alone declares it, no object is made. */
export function visitEntries(
  evaluation: Evaluation,
  subject: Subject,
  judge: Judge,
  visit: Visit,
): void {
  if (subject.members.length === 1) {
    const measure = evaluation.measures[subject.members[0]!]!
    for (let row = 0; row < measure.ratio.length; row++) visit(measure, row, judge(measure, row))
    return
  }
  for (const entry of mergedEntries(evaluation, subject, judge)) {
    visit(entry.measure, entry.row, entry.judgement, entry)
  }
}

/** Writes an entry out as a finding. */
export function toFinding(evaluation: Evaluation, entry: Entry): Finding {
  const { measure, row, judgement, declared } = entry
  return createFindingWriter(evaluation)(measure, row, judgement, declared)
}
