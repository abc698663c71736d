import type { IfMatch } from '#api/precondition.ts'
import type { HeadMark, HeadsRepository, LockedHead } from './heads.repository.ts'

/**
 * What keeps concurrent writes of a system apart. The races of tests/load run against this and against
 * mutants of it that leave one of them out.
 */
export interface WriteGuards {
  /** Waits for every other write of the system; the first statement of the transaction. */
  lock(heads: HeadsRepository, systemId: string): Promise<LockedHead | undefined>
  /** Whether what was decided on one mark still holds at another. */
  isCurrent(decidedOn: HeadMark, locked: HeadMark): boolean
  /** Whether the edit is meant for what stands there now. */
  isMeantFor(ifMatch: IfMatch, etag: string): boolean
}

export const WRITE_GUARDS: WriteGuards = {
  lock: (heads, systemId) => heads.lock(systemId),
  isCurrent: (decidedOn, locked) =>
    decidedOn.revision === locked.revision && decidedOn.epoch === locked.epoch,
  isMeantFor: (ifMatch, etag) => ifMatch.matches(etag),
}
