import { visitEntries } from './entries.ts'
import type { Evaluation, Subject } from './evaluation.ts'
import { createFindingWriter, type FindingWriter } from './finding-writer.ts'
import { createJudge, type Judge, type JudgementOptions } from './judgement.ts'
import type { Finding } from './model.ts'

/** One finding that an edit moves; absent where it was not, or is no longer, measured. */
export interface Consequence {
  readonly identity: string
  readonly before?: Finding
  readonly after?: Finding
  /** Whether the edit makes it a breach, or makes a breach pass. */
  readonly newly: 'breaching' | 'passing' | null
}

interface Side {
  readonly evaluation: Evaluation
  readonly judge: Judge
  readonly write: FindingWriter
}

function toSide(evaluation: Evaluation, options: JudgementOptions): Side {
  const judge = createJudge(evaluation, options)
  return { evaluation, judge, write: createFindingWriter(evaluation) }
}

function subjectKey(subject: Subject): string {
  return JSON.stringify([subject.kind, subject.foreground, subject.background])
}

/** Subjects of both evaluations, matched by what they are about. */
function* matchedSubjects(
  before: Evaluation,
  after: Evaluation,
): Generator<readonly [Subject | undefined, Subject | undefined]> {
  if (before.subjects === after.subjects) {
    for (const subject of before.subjects) yield [subject, subject]
    return
  }
  const rest = new Map(before.subjects.map((subject) => [subjectKey(subject), subject]))
  for (const subject of after.subjects) {
    const key = subjectKey(subject)
    yield [rest.get(key), subject]
    rest.delete(key)
  }
  for (const subject of rest.values()) yield [subject, undefined]
}

function isSameBytes(first: Uint8Array | undefined, second: Uint8Array | undefined): boolean {
  if (first === second) return true
  return first !== undefined && second !== undefined && first.join() === second.join()
}

/** Groups in which a different set of places is met now. */
function movedGroups(before: Evaluation, after: Evaluation): Set<string> {
  if (before.anyOf === after.anyOf) return new Set()
  const names = new Set([...before.anyOf.keys(), ...after.anyOf.keys()])
  return new Set(
    [...names].filter((name) => !isSameBytes(before.anyOf.get(name), after.anyOf.get(name))),
  )
}

/** The subjects of a measurement that is not the same on both sides, where all else is. */
function* remeasuredSubjects(before: Evaluation, after: Evaluation): Generator<Subject> {
  const seen = new Set<number>()
  for (let at = 0; at < after.measures.length; at++) {
    if (before.measures[at] === after.measures[at]) continue
    const subject = after.subjectOf[at]!
    if (seen.has(subject)) continue
    seen.add(subject)
    yield after.subjects[subject]!
  }
}

/** Whether a theme's findings can differ though nothing measured does. */
function areThemesSame(before: Evaluation, after: Evaluation): boolean {
  return before.resolved.model.themes === after.resolved.model.themes
}

/** Whether both sides share every measurement of a subject, and no group of theirs moved. */
function isUntouched(
  sides: { readonly before: Side; readonly after: Side },
  [earlier, later]: readonly [Subject | undefined, Subject | undefined],
  moved: ReadonlySet<string>,
): boolean {
  if (earlier === undefined || later === undefined) return false
  if (earlier.members.length !== later.members.length) return false
  for (let at = 0; at < earlier.members.length; at++) {
    const measure = sides.before.evaluation.measures[earlier.members[at]!]!
    if (measure !== sides.after.evaluation.measures[later.members[at]!]) return false
    if (measure.pair.anyOf !== undefined && moved.has(measure.pair.anyOf)) return false
  }
  return true
}

function findingsOf(side: Side, subject: Subject | undefined): Map<string, Finding> {
  const findings = new Map<string, Finding>()
  if (subject === undefined) return findings
  visitEntries(side.evaluation, subject, side.judge, (measure, row, judgement, merged) => {
    const finding = side.write(measure, row, judgement, merged?.declared)
    findings.set(finding.identity, finding)
  })
  return findings
}

function isMoved(before: Finding | undefined, after: Finding | undefined): boolean {
  if (before === undefined || after === undefined) return true
  return (
    before.ratio !== after.ratio ||
    before.required !== after.required ||
    before.outcome !== after.outcome ||
    before.basis !== after.basis ||
    before.gating !== after.gating ||
    before.waiver?.id !== after.waiver?.id
  )
}

function newlyOf(before: Finding | undefined, after: Finding | undefined): Consequence['newly'] {
  if (after?.outcome === 'breach') return before?.outcome === 'breach' ? null : 'breaching'
  return before?.outcome === 'breach' && after?.outcome === 'pass' ? 'passing' : null
}

function compareSubject(
  sides: { readonly before: Side; readonly after: Side },
  [earlier, later]: readonly [Subject | undefined, Subject | undefined],
): Consequence[] {
  const before = findingsOf(sides.before, earlier)
  const after = findingsOf(sides.after, later)
  const consequences: Consequence[] = []
  for (const identity of new Set([...before.keys(), ...after.keys()])) {
    const first = before.get(identity)
    const second = after.get(identity)
    if (!isMoved(first, second)) continue
    consequences.push({
      identity,
      ...(first ? { before: first } : {}),
      ...(second ? { after: second } : {}),
      newly: newlyOf(first, second),
    })
  }
  return consequences
}

const ORDER = ['breaching', 'passing', null] as const

function reach({ after, before }: Consequence): number {
  const finding = after ?? before!
  return finding.required === 0 ? Number.MAX_VALUE : finding.ratio / finding.required
}

/**
 * Every finding that moved between two evaluations of one system: newly breaching first, then newly passing,
 * then the rest, and among them the one furthest short of its requirement first. What both share costs nothing.
 */
export function consequences(
  before: Evaluation,
  after: Evaluation,
  options: JudgementOptions = {},
): Consequence[] {
  const sides = {
    before: toSide(before, options),
    after: toSide(after, options),
  }
  const moved = movedGroups(before, after)
  const canSkip = areThemesSame(before, after)
  const found: Consequence[] = []
  if (canSkip && before.subjects === after.subjects && moved.size === 0) {
    for (const subject of remeasuredSubjects(before, after)) {
      found.push(...compareSubject(sides, [subject, subject]))
    }
  } else {
    for (const pair of matchedSubjects(before, after)) {
      if (canSkip && isUntouched(sides, pair, moved)) continue
      found.push(...compareSubject(sides, pair))
    }
  }
  return found.toSorted(
    (a, b) => ORDER.indexOf(a.newly) - ORDER.indexOf(b.newly) || reach(a) - reach(b),
  )
}
