import { actorOf, type SystemAccess } from '#api/caller.ts'
import { AppError, invalidRequest } from '#api/errors.ts'
import type { NewId } from '#api/platform/ids.ts'
import { type IfMatch, preconditionFailed } from '#api/precondition.ts'
import type { Repositories, Transact } from '#api/repositories.ts'
import type { BreachEventWire, BreachWithEvents } from '#shared/contracts/breaches.contract.ts'
import { wholeBreach } from './breach-answers.ts'
import { presentEvents } from './breaches.presenter.ts'
import type { NewBreachEventRow } from './breaches.repository.ts'

export interface BreachHandlingDeps {
  readonly transact: Transact<'breaches' | 'members' | 'audit'>
  readonly newId: NewId
}

export interface Assignment {
  /** A person's id; null: nobody. */
  readonly assignee: string | null
  readonly ifMatch: IfMatch
}

export type BreachHandlingService = ReturnType<typeof createBreachHandlingService>

/** What people do about a breach: who is on it, and what they say. Neither moves its status. */
export const createBreachHandlingService = ({ transact, newId }: BreachHandlingDeps) => ({
  assign: (system: SystemAccess, id: string, { assignee, ifMatch }: Assignment) =>
    transact(async ({ breaches, members, audit }) => {
      const current = await locked(breaches, system.id, id)
      if (!ifMatch.matches(current.etag)) throw preconditionFailed(current)
      const before = current.assignee?.id ?? null
      if (assignee === before) return current
      if (assignee !== null && !(await members.isMember(system.id, assignee))) {
        throw invalidRequest([
          { pointer: '/assignee', detail: 'Nobody with this id is a member of the system' },
        ])
      }
      await breaches.touch(id, { assigneeUserId: assignee })
      await breaches.addEvents([
        {
          ...eventOn(current, system),
          id: newId('bev'),
          kind: assignee === null ? 'unassigned' : 'assigned',
          assigneeUserId: assignee ?? before,
        },
      ])
      const answer = await standing(breaches, system.id, id)
      const details = { before, after: assignee }
      await audit.append({ ...actOn(system, id), action: 'breach.assigned', details })
      return answer
    }),

  comment: (system: SystemAccess, id: string, body: string): Promise<BreachEventWire> =>
    transact(async ({ breaches, audit }) => {
      const current = await locked(breaches, system.id, id)
      const event = newId('bev')
      await breaches.addEvents([
        { ...eventOn(current, system), id: event, kind: 'commented', body },
      ])
      await breaches.touch(id)
      const row = await breaches.findEvent(event)
      const [answer] = presentEvents(row === undefined ? [] : [row])
      if (answer === undefined) throw new TypeError('The comment that was just made is not there')
      await audit.append({ ...actOn(system, id), action: 'breach.commented', details: { event } })
      return answer
    }),
})

type Log = Repositories['breaches']

/** The entry as it stands; nobody else writes it before the transaction ends. */
async function locked(breaches: Log, systemId: string, id: string): Promise<BreachWithEvents> {
  await breaches.lock(systemId, id)
  return standing(breaches, systemId, id)
}

async function standing(breaches: Log, systemId: string, id: string): Promise<BreachWithEvents> {
  const breach = await wholeBreach(breaches, systemId, id)
  if (breach === undefined) throw new AppError('not-found', { detail: `No breach ${id}` })
  return breach
}

/** An event that measures nothing: it repeats the measures of its time. */
const eventOn = (
  { id, ratio, required }: BreachWithEvents,
  { caller }: SystemAccess,
): Omit<NewBreachEventRow, 'id' | 'kind'> => ({
  breachId: id,
  ratio,
  required,
  actorUserId: caller.userId,
})

const actOn = (system: SystemAccess, id: string) => ({
  chain: system.id,
  actor: actorOf(system.caller),
  subject: id,
})
