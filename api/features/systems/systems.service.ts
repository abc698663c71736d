import { actorOf, type Caller, type SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { HeadBeginService } from '#api/features/revisions/head-begin.service.ts'
import type { HeadWriteService, Writing } from '#api/features/revisions/head-write.service.ts'
import type { NewId } from '#api/platform/ids.ts'
import { etagOf, type IfMatch } from '#api/precondition.ts'
import type { Repositories, Transact } from '#api/repositories.ts'
import type { SystemWire } from '#shared/contracts/systems.contract.ts'
import { presentSystem, type SystemFound } from './systems.presenter.ts'
import type { SystemHandling } from './systems.repository.ts'
import {
  type CreateSystemBody,
  decidePatch,
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
}

/** Systems: what they are called, how they are written, and the settings that revisions govern. */
export function createSystemsService({ reads, transact, begins, writes, newId }: SystemsDeps) {
  return {
    async list(caller: Caller): Promise<SystemWire[]> {
      const rows =
        caller.kind === 'user' && caller.isAdmin
          ? await reads.systems.listAll()
          : await reads.systems.listOfMember(caller.userId)
      const own = rows.filter(({ id }) => caller.kind === 'user' || caller.systemId === id)
      return own.map(tagged)
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
      const { writeMode } = await found(reads, system.id)
      const { effect } = await writes.write({
        system,
        message: body.message,
        expected: {
          ifMatch,
          beyondHead: true,
          current: async (_, reading) => tagged(await found(reading, system.id)),
        },
        decide: ({ index }) => decidePatch(index, body, { authority, writeMode }),
        audit: { action: 'settings.edited', subject: system.id },
        ...(body.name === undefined && body.writeMode === undefined
          ? {}
          : { alongside: (repositories) => handle(repositories, system, body) }),
      })
      return { ...tagged(await found(reads, system.id)), effect }
    },
  }
}
export type SystemsService = ReturnType<typeof createSystemsService>

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

/** Name and write mode: no revision, an entry in the audit log. */
async function handle(
  { systems, audit }: Writing,
  system: SystemAccess,
  { name, writeMode }: PatchSystemBody,
): Promise<void> {
  const before = await found({ systems }, system.id)
  const moved: Partial<SystemHandling> = {
    ...(name === undefined || name === before.name ? {} : { name }),
    ...(writeMode === undefined || writeMode === before.writeMode ? {} : { writeMode }),
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
