import { actorOf, type KeyCaller, requirePermission, type SystemAccess } from '#api/caller.ts'
import { sha256Hex } from '#api/sha256.ts'
import { AppError, invalidRequest } from '#api/errors.ts'
import type { NewId } from '#api/platform/ids.ts'
import { isApiKeyShaped, newApiKey } from '#api/platform/secrets.ts'
import type { Repositories, Transact } from '#api/repositories.ts'
import type { KeyWire } from '#shared/contracts/keys.contract.ts'
import type { Scope } from '#shared/contracts/permissions.ts'
import { presentKey } from './keys.presenter.ts'
import { keyFaults, kindOfKey } from './keys.rules.ts'

export interface KeysDependencies {
  readonly transact: Transact<'keys' | 'audit'>
  readonly reads: Pick<Repositories, 'keys'>
  readonly newId: NewId
}

export interface WantedKey {
  readonly name: string
  readonly scopes: readonly Scope[]
  readonly days: number
}

export type KeysService = ReturnType<typeof createKeysService>

const HINT_LETTERS = 4

/** Who makes keys for pipelines sees and ends all of a system's keys, anybody else their own. */
const ownOnlyOf = (system: SystemAccess) =>
  system.allows('keys:ci') ? {} : { ownerUserId: system.caller.userId }

export const createKeysService = ({ transact, reads, newId }: KeysDependencies) => ({
  /** Whose the key is; one that is mistyped is told without a query. */
  identify: async (key: string): Promise<KeyCaller | undefined> => {
    if (!isApiKeyShaped(key)) return undefined
    const row = await reads.keys.findLive(sha256Hex(key))
    if (row === undefined) return undefined
    const { isStale, scopes, ...caller } = row
    if (isStale) await reads.keys.touch(caller.keyId)
    return { kind: 'key', ...caller, scopes: scopes as readonly Scope[] }
  },

  list: async (system: SystemAccess): Promise<{ items: KeyWire[] }> => ({
    items: (await reads.keys.list(system.id, ownOnlyOf(system))).map(presentKey),
  }),

  /** @returns the key itself besides: the only time anybody sees it */
  create: async (system: SystemAccess, wanted: WantedKey): Promise<KeyWire & { key: string }> => {
    const scopes = [...new Set(wanted.scopes)]
    const kind = kindOfKey(scopes)
    if (kind === 'ci') requirePermission(system, 'keys:ci')
    const faults = keyFaults(scopes, wanted.days)
    if (faults.length > 0) throw invalidRequest(faults)
    const key = newApiKey(kind)
    const id = newId('key')
    return transact(async ({ keys, audit }) => {
      await keys.insert({
        id,
        systemId: system.id,
        ownerUserId: system.caller.userId,
        name: wanted.name,
        kind,
        hint: key.slice(0, `dyw_${kind}_`.length + HINT_LETTERS),
        secretHash: sha256Hex(key),
        scopes,
        days: wanted.days,
      })
      const [row] = await keys.list(system.id, { id })
      if (row === undefined) throw new TypeError('The key that was just made is not there')
      const details = { kind, scopes, days: wanted.days }
      await audit.append({
        chain: system.id,
        actor: actorOf(system.caller),
        action: 'key.created',
        subject: id,
        details,
      })
      return { ...presentKey(row), key }
    })
  },

  revoke: (system: SystemAccess, id: string): Promise<void> =>
    transact(async ({ keys, audit }) => {
      const [row] = await keys.list(system.id, { id, ...ownOnlyOf(system) })
      if (row === undefined || !(await keys.revoke(id))) throw new AppError('not-found')
      await audit.append({
        chain: system.id,
        actor: actorOf(system.caller),
        action: 'key.revoked',
        subject: id,
      })
    }),
})
