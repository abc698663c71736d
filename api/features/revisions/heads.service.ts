import { type Consequence, consequences } from '#shared/checks/consequences.ts'
import { afterCommit } from '#api/platform/enclosing-transaction.ts'
import { checkSystem } from '#shared/checks/check-system.ts'
import type { Checked, Evaluation } from '#shared/checks/evaluation.ts'
import type { GovernedEdits, GovernedSystem } from '#shared/checks/governed-model.ts'
import { recheck } from '#shared/checks/recheck.ts'
import { indexSystem, type SystemIndex } from '#shared/contracts/governed-system.ts'
import { movedTally, type Tally, tallyOf } from './head-tally.rules.ts'
import type { HeadMark, HeadsRepository } from './heads.repository.ts'
import type { VersionsReads } from './versions.reads.ts'

/** A system at its head, resolved and measured. Never changed in place. */
export interface Head extends HeadMark {
  readonly systemId: string
  readonly model: GovernedSystem
  readonly index: SystemIndex
  readonly evaluation: Evaluation
  readonly tally: Tally
}

export interface HeadsDeps {
  readonly heads: Pick<HeadsRepository, 'peek'>
  readonly versions: VersionsReads
}

const MOST_KEPT = 64

/**
 * Keeps the last resolved head of each system in this process, and brings it up to date by what was edited
 * since. A head that is kept was committed; several processes may keep different ones for a moment.
 */
export function createHeadsService({ heads, versions }: HeadsDeps) {
  const kept = new Map<string, Head>()
  const running = new Map<string, Promise<Head>>()

  const put = (head: Head): void => {
    const known = kept.get(head.systemId)
    if (known && (known.revision > head.revision || known.epoch > head.epoch)) return
    kept.delete(head.systemId)
    kept.set(head.systemId, head)
    const [oldest] = kept.keys()
    if (kept.size > MOST_KEPT && oldest !== undefined) kept.delete(oldest)
  }

  /** What a transaction that is given up had led to was never there. */
  const keep = (head: Head): void => afterCommit(() => put(head))

  const follow = async (systemId: string, mark: HeadMark): Promise<Head> => {
    const known = kept.get(systemId)
    const head = known
      ? await advanceHead(known, mark, versions)
      : firstHead(systemId, mark, await versions.systemAt(systemId, mark.revision))
    keep(head)
    return head
  }

  return {
    keep,

    /** The head as the database has it now. */
    async current(systemId: string): Promise<Head> {
      const mark = await heads.peek(systemId)
      if (mark === undefined) throw new TypeError(`No system ${systemId}`)
      const known = kept.get(systemId)
      if (known && isAt(known, mark)) return known
      const key = `${systemId} ${mark.revision} ${mark.epoch}`
      const started = running.get(key) ?? follow(systemId, mark)
      running.set(key, started)
      try {
        return await started
      } finally {
        running.delete(key)
      }
    },
  }
}
export type HeadsService = ReturnType<typeof createHeadsService>

const isAt = (head: HeadMark, mark: HeadMark) =>
  head.revision >= mark.revision && head.epoch >= mark.epoch

function firstHead(systemId: string, mark: HeadMark, model: GovernedSystem): Head {
  const evaluation = committed(systemId, mark, checkSystem(model))
  const { revision, epoch } = mark
  return { systemId, revision, epoch, tally: tallyOf(evaluation), ...measured(evaluation) }
}

/** The head that a kept one becomes at a later mark, by what lies between the two. */
export async function advanceHead(
  head: Head,
  { revision, epoch }: HeadMark,
  versions: VersionsReads,
): Promise<Head> {
  const { systemId } = head
  if (head.revision >= revision) return { ...head, epoch: Math.max(epoch, head.epoch) }
  const edits = await versions.editsIn({ systemId, after: head.revision, upTo: revision })
  const evaluation = committed(systemId, { revision, epoch }, recheck(head.evaluation, edits))
  return followed(head, { revision, epoch }, evaluation).head
}

/** The head that edits lead to and what they moved, or the faults of resolution. */
export function editedHead(
  head: Head,
  edits: GovernedEdits,
): { ok: true; head: Head; moved: readonly Consequence[] } | Extract<Checked, { ok: false }> {
  const checked = recheck(head.evaluation, edits)
  if (!checked.ok) return checked
  return { ok: true, ...followed(head, head, checked.evaluation) }
}

/** A head whose evaluation follows from another's. */
function followed(head: Head, { revision, epoch }: HeadMark, evaluation: Evaluation) {
  const moved = consequences(head.evaluation, evaluation)
  const tally = movedTally(head.tally, moved)
  const { systemId } = head
  return { head: { systemId, revision, epoch, tally, ...measured(evaluation) }, moved }
}

function measured(evaluation: Evaluation) {
  // The engine hands on the very items that it was given.
  const model = evaluation.resolved.model as GovernedSystem
  return { model, index: indexSystem(model), evaluation }
}

/** What was committed resolves, or something is wrong with the database or the engine. */
function committed(systemId: string, { revision }: HeadMark, checked: Checked): Evaluation {
  if (checked.ok) return checked.evaluation
  const details = checked.faults.map(({ detail }) => detail).join('; ')
  throw new Error(`Revision ${revision} of ${systemId} cannot be resolved: ${details}`)
}
