import type { Consequence } from '#shared/checks/consequences.ts'
import { applyEdits } from '#shared/checks/edits.ts'
import type { GovernedEdits, GovernedSystem } from '#shared/checks/governed-model.ts'
import { weakeningsBetween } from '#shared/checks/weakening.ts'
import type { Weakening } from '#shared/checks/weakening-kinds.ts'
import { ENGINE_STAMP } from '#shared/checks/engine.ts'
import type { Decision, Refusal } from '#shared/contracts/governed-system.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'
import { actorOf, type SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { BreachesService } from '#api/features/breaches/breaches.service.ts'
import { type IfMatch, preconditionFailed } from '#api/precondition.ts'
import type { Repositories, Transact } from '#api/repositories.ts'
import type { LockedHead } from './heads.repository.ts'
import { verdictIn } from './head-tally.rules.ts'
import { advanceHead, editedHead, type Head, type HeadsService } from './heads.service.ts'
import { stateDigest } from './state-digest.ts'
import { changesBetween, isEmpty, type VersionChanges } from './version-changes.rules.ts'
import { REPLACING, unapproved, weakeningFaults } from './weakening.rules.ts'
import { type Effect, effectOf } from './write-effect.ts'
import type { WriteGuards } from './write-guards.ts'

export type WriteRepositories = 'heads' | 'versions' | 'breaches' | 'audit' | 'systems'
export type Writing = Pick<Repositories, WriteRepositories>

export interface HeadWriteDeps {
  readonly heads: HeadsService
  readonly breaches: Pick<BreachesService, 'recordHead'>
  readonly transact: Transact<WriteRepositories>
  /** For what is compared before the transaction. */
  readonly outside: Writing
  readonly guards: WriteGuards
}

/** A write of what a revision governs. */
export interface HeadWrite {
  readonly system: SystemAccess
  readonly message: string | undefined
  /** What the revision comes of. */
  readonly origin?: 'direct' | 'import'
  /** An import that replaces what stands. */
  readonly replaces?: boolean
  /** Edits or a refusal, from the head alone: it may be asked again under the lock. */
  readonly decide: (head: Head) => Decision
  /** What the edit is meant for, and what stands there now. */
  readonly expected?: {
    readonly ifMatch: IfMatch | 'nothing-there'
    /** What stands there can change without a move of the head: it is compared under the lock, always. */
    readonly beyondHead?: true
    readonly current: (
      head: Head,
      reading: Writing,
    ) => Promise<Tagged | undefined> | Tagged | undefined
  }
  readonly audit: { readonly action: string; readonly subject: string }
  /** Handling that belongs to the same call: no part of a revision, and audited by itself. */
  readonly alongside?: (repositories: Writing) => Promise<void>
}

export interface Tagged {
  readonly etag: string
}

/** The head as the write left it, and what the write did. */
export interface Written {
  readonly head: Head
  readonly effect: Effect
}

/** What a write comes to on one head; `next` is absent where nothing would change. */
interface Plan {
  readonly head: Head
  readonly next?: {
    readonly head: Head
    readonly changes: VersionChanges
    readonly moved: readonly Consequence[]
    readonly weakened: WeakenedEdits
  }
}

/** What the edits weaken, and where in the request. */
interface WeakenedEdits {
  readonly weakenings: readonly Weakening[]
  readonly pointerOf: (weakening: Weakening) => string | undefined
}

/**
 * The one write: every change of what a revision governs goes through it, and makes exactly one revision or
 * none. It decides before the transaction, and again under the lock where the head moved meanwhile.
 */
export function createHeadWriteService(deps: HeadWriteDeps) {
  return {
    async write(request: HeadWrite): Promise<Written> {
      const { heads, transact, outside } = deps
      const plan = await planOn(deps, request, {
        head: await heads.current(request.system.id),
        reading: outside,
      })
      if (plan.next === undefined && request.alongside === undefined) return unmoved(plan.head)
      const written = await transact((repositories) =>
        writeUnderLock(deps, request, { plan, repositories }),
      )
      heads.keep(written.head)
      return written
    },

    /** What a write would come to on the head as it stands: nothing is written, nor asked whether it may be. */
    async preview({ system, decide, replaces }: Previewed): Promise<Preview> {
      const before = await deps.heads.current(system.id)
      const { head, next } = planEdits(before, { decision: decide(before), replaces })
      if (next === undefined) return { ...unmoved(head), weakenings: [] }
      const effect = effectOf({ before, after: next.head, moved: next.moved })
      return { head: next.head, effect, weakenings: next.weakened.weakenings }
    },
  }
}

/** What a write would come to, and what of it asks for approval. */
export interface Preview extends Written {
  readonly weakenings: readonly Weakening[]
}
type Previewed = Pick<HeadWrite, 'system' | 'decide' | 'replaces'>
export type HeadWriteService = ReturnType<typeof createHeadWriteService>

async function planOn(
  { guards }: HeadWriteDeps,
  { expected, decide, replaces }: HeadWrite,
  { head, reading }: { readonly head: Head; readonly reading: Writing },
): Promise<Plan> {
  if (expected) await compare(guards, expected, { head, reading })
  return planEdits(head, { decision: decide(head), replaces })
}

interface Decided {
  readonly decision: Decision
  readonly replaces: boolean | undefined
}

function planEdits(head: Head, { decision, replaces }: Decided): Plan {
  if (!decision.ok) throw refusalError(decision.refusal)
  const { edits } = decision
  const changes = changesBetween(head.model, editedModel(head, edits))
  if (isEmpty(changes)) return { head }
  const edited = editedHead(head, edits)
  if (!edited.ok) {
    const faults = edited.faults.map((fault): Fault => {
      const pointer = decision.pointerOf?.(fault)
      return {
        ...(pointer === undefined ? {} : { pointer }),
        detail: fault.detail,
        code: fault.code,
      }
    })
    throw new AppError('system-unresolvable', { faults })
  }
  const weakened = {
    weakenings: [
      ...(replaces && head.model.tokens.length > 0 ? [REPLACING] : []),
      ...weakeningsBetween(head.evaluation.resolved, edited.head.evaluation.resolved),
    ],
    pointerOf: decision.weakenedAt ?? (() => undefined),
  }
  return { head, next: { head: edited.head, changes, moved: edited.moved, weakened } }
}

async function compare(
  guards: WriteGuards,
  { ifMatch, current }: NonNullable<HeadWrite['expected']>,
  { head, reading }: { readonly head: Head; readonly reading: Writing },
): Promise<void> {
  const standing = await current(head, reading)
  const holds =
    standing === undefined || ifMatch === 'nothing-there'
      ? (standing === undefined) === (ifMatch === 'nothing-there')
      : guards.isMeantFor(ifMatch, standing.etag)
  if (!holds) throw preconditionFailed(standing ?? null)
}

async function writeUnderLock(
  deps: HeadWriteDeps,
  request: HeadWrite,
  { plan: prepared, repositories }: { readonly plan: Plan; readonly repositories: Writing },
): Promise<Written> {
  const { id } = request.system
  const locked = await deps.guards.lock(repositories.heads, id)
  if (locked === undefined) throw new AppError('not-found')
  const isSettled = request.expected?.beyondHead !== true
  const plan =
    isSettled && deps.guards.isCurrent(prepared.head, locked)
      ? prepared
      : await planOn(deps, request, {
          head: await advanceHead(prepared.head, locked, repositories.versions),
          reading: repositories,
        })
  const written =
    plan.next === undefined
      ? unmoved(plan.head)
      : await writeRevision(deps, request, { plan, next: plan.next, locked, repositories })
  await request.alongside?.(repositories)
  if (plan.next) {
    const { revision } = written.head
    const { action, subject } = request.audit
    const actor = actorOf(request.system.caller)
    await repositories.audit.append({ chain: id, actor, action, subject, details: { revision } })
  }
  return written
}

interface Turn {
  readonly plan: Plan
  readonly next: NonNullable<Plan['next']>
  readonly locked: LockedHead
  readonly repositories: Writing
}

async function writeRevision(
  { breaches }: HeadWriteDeps,
  { system, message, origin = 'direct' }: HeadWrite,
  { plan, next, locked, repositories }: Turn,
): Promise<Written> {
  const mode = await repositories.heads.writeModeOf(system.id)
  if (mode === 'review') throw new AppError('review-required')
  requireApproved(system, next.weakened)
  await followEngine(breaches, { systemId: system.id, head: plan.head, locked, repositories })
  const revision = await repositories.heads.advance(system.id)
  await repositories.versions.write({ systemId: system.id, revision }, next.changes)
  const verdict = verdictIn(next.head.tally)
  await repositories.heads.addRevision({
    systemId: system.id,
    number: revision,
    origin,
    authorUserId: system.caller.userId,
    message: message || null,
    verdict,
    counts: next.head.tally.counts,
    engineVersion: ENGINE_STAMP.version,
    gamutMap: ENGINE_STAMP.gamutMap,
    ruleSet: ENGINE_STAMP.ruleSet,
    digest: stateDigest(next.head.model),
    at: locked.at,
  })
  await breaches.recordHead(repositories, {
    systemId: system.id,
    revision,
    at: locked.at,
    actor: system.caller.userId,
    before: plan.head.evaluation,
    after: next.head.evaluation,
    cause: 'edit',
  })
  const head: Head = { ...next.head, revision, epoch: locked.epoch }
  return { head, effect: effectOf({ before: plan.head, after: head, moved: next.moved }) }
}

/** Under `direct` nobody is there to approve: who may not weaken alone is refused. */
function requireApproved({ caller, role }: SystemAccess, weakened: WeakenedEdits): void {
  const refused = unapproved(weakened.weakenings, { kind: caller.kind, role })
  if (refused.length === 0) return
  throw new AppError('weakening-needs-approval', {
    detail: 'An accessibility-lead approves what weakens, in a change',
    faults: weakeningFaults(refused, weakened.pointerOf),
  })
}

interface Measured {
  readonly systemId: string
  readonly head: Head
  readonly locked: LockedHead
  readonly repositories: Writing
}

/** Where another engine measured the head, the log is first set against what this one measures. */
async function followEngine(
  breaches: HeadWriteDeps['breaches'],
  { systemId, head, locked, repositories }: Measured,
): Promise<void> {
  const engine = await repositories.heads.engineOf(systemId, locked.revision)
  if (engine === undefined || canonicalJson(engine) === canonicalJson(ENGINE_STAMP)) return
  await breaches.recordHead(repositories, {
    systemId,
    revision: locked.revision,
    at: locked.at,
    actor: null,
    before: null,
    after: head.evaluation,
    cause: 'engine',
  })
}

const editedModel = (head: Head, edits: GovernedEdits) =>
  applyEdits(head.model, edits) as GovernedSystem

const unmoved = (head: Head): Written => ({
  head,
  effect: effectOf({ before: head, after: head, moved: [] }),
})

const refusalError = ({ code, ...options }: Refusal) => new AppError(code, options)
