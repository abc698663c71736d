import { actorOf, type Caller, type KeyCaller, type SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { HeadBeginService } from '#api/features/revisions/head-begin.service.ts'
import type { HeadWriteService, Writing } from '#api/features/revisions/head-write.service.ts'
import type { NewId } from '#api/platform/ids.ts'
import { etagOf, type IfMatch } from '#api/precondition.ts'
import type { Repositories, Transact } from '#api/repositories.ts'
import type { SystemWire } from '#shared/contracts/systems.contract.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'
import { presentSystem, type SystemFound } from './systems.presenter.ts'
import type { SystemHandling } from './systems.repository.ts'
import {
  type CreateSystemBody,
  decidePatch,
  distinctBranches,
  type PatchSystemBody,
  type SettingsAuthority,
  settingsOf,
} from './systems.rules.ts'

export interface SystemsDeps {
  readonly reads: Pick<Repositories, 'systems'>
  readonly transact: Transact<'systems' | 'heads' | 'versions' | 'audit'>
  readonly begins: HeadBeginService
  readonly writes: HeadWriteService
  readonly newId: NewId
  /** What a caller may do in a system; nothing where they may not know of it. */
  readonly findAccess: (caller: Caller, systemKey: string) => Promise<SystemAccess | undefined>
}

/** Systems: what they are called, how they are written, and the settings that revisions govern. */
export function createSystemsService(deps: SystemsDeps) {
  const { reads, transact, begins, writes, newId } = deps
  return {
    /** Every role reads its system; of keys some do. */
    async list(caller: Caller): Promise<SystemWire[]> {
      if (caller.kind === 'key') return ofKey(deps, caller)
      const rows = caller.isAdmin
        ? await reads.systems.listAll()
        : await reads.systems.listOfMember(caller.userId)
      return rows.map(tagged)
    },

    async get(system: SystemAccess): Promise<SystemWire> {
      return tagged(await found(reads, system.id))
    },

    async create(caller: Caller, body: CreateSystemBody): Promise<SystemWire> {
      const id = newId('sys')
      const { key, name } = body
      return transact(async (repositories) => {
        if (!(await repositories.systems.add({ id, key, name }))) {
          throw new AppError('system-key-taken', { detail: `There is a system ${key}` })
        }
        await begins.begin(repositories, { systemId: id, settings: settingsOf(body), caller })
        const actor = actorOf(caller)
        const details = { key, name }
        await repositories.audit.append({
          chain: id,
          actor,
          action: 'system.created',
          subject: id,
          details,
        })
        return tagged(await found(repositories, id))
      })
    },

    async patch(system: SystemAccess, ifMatch: IfMatch, body: PatchSystemBody) {
      const authority = authorityIn(system)
      let standing: SystemFound
      const { effect } = await writes.write({
        system,
        message: body.message,
        expected: {
          ifMatch,
          beyondHead: true,
          current: async (_, reading) => {
            standing = await found(reading, system.id)
            return tagged(standing)
          },
        },
        // Asked after `current`, each time: the handling that counts is the one read under the lock.
        decide: ({ index }) => decidePatch(index, body, { authority, handling: standing }),
        audit: { action: 'settings.edited', subject: system.id },
        ...(isHandled(body)
          ? { alongside: (repositories) => handle(repositories, system, body) }
          : {}),
      })
      return { ...tagged(await found(reads, system.id)), effect }
    },
  }
}
export type SystemsService = ReturnType<typeof createSystemsService>

async function ofKey({ reads, findAccess }: SystemsDeps, caller: KeyCaller) {
  const row = await reads.systems.find(caller.systemId)
  const access = row && (await findAccess(caller, row.key))
  return row && access?.allows('system:read') ? [tagged(row)] : []
}

const authorityIn = ({ role }: SystemAccess): SettingsAuthority => ({
  maintains: role === 'maintainer' || role === 'admin',
  leads: role === 'accessibility-lead' || role === 'admin',
})

async function found(reads: Pick<Repositories, 'systems'>, id: string): Promise<SystemFound> {
  const row = await reads.systems.find(id)
  if (row === undefined) throw new AppError('not-found')
  return row
}

function tagged(row: SystemFound): SystemWire {
  const wire = presentSystem(row)
  return { ...wire, etag: etagOf(wire) }
}

const isHandled = ({ name, writeMode, protectedBranches }: PatchSystemBody): boolean =>
  [name, writeMode, protectedBranches].some((member) => member !== undefined)

/** Name, write mode and protected branches: no revision, an entry in the audit log. */
async function handle(
  { systems, audit }: Writing,
  system: SystemAccess,
  { name, writeMode, protectedBranches }: PatchSystemBody,
): Promise<void> {
  const before = await found({ systems }, system.id)
  const moved: Partial<SystemHandling> = {
    ...(name === undefined || name === before.name ? {} : { name }),
    ...(writeMode === undefined || writeMode === before.writeMode ? {} : { writeMode }),
    ...movedBranches(before, protectedBranches),
  }
  if (Object.keys(moved).length === 0) return
  await systems.setHandling(system.id, moved)
  await audit.append({
    chain: system.id,
    actor: actorOf(system.caller),
    action: 'system.edited',
    subject: system.id,
    details: moved,
  })
}

function movedBranches(
  before: SystemFound,
  given: PatchSystemBody['protectedBranches'],
): Partial<SystemHandling> {
  const protectedBranches = given && distinctBranches(given)
  return protectedBranches === undefined ||
    canonicalJson(protectedBranches) === canonicalJson(before.protectedBranches)
    ? {}
    : { protectedBranches }
}
