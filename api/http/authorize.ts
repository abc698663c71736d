import {
  type Caller,
  permissionMissing,
  requirePermission,
  type SystemAccess,
} from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { Access } from '#shared/contracts/route.ts'

/** What the caller may do in the system of this key; nothing where they may not even know of it. */
export type FindAccess = (caller: Caller, systemKey: string) => Promise<SystemAccess | undefined>

/**
 * Leaves through who holds what the operation takes. A foreign system and an absent one look the same.
 * @returns what the caller may do in the system of the path, where it names one
 * @throws {AppError} `not-found`, `role-missing`, `scope-missing`
 */
export async function authorize(
  caller: Caller,
  access: Exclude<Access, 'anyone'>,
  systemKey: string | undefined,
  findAccess: FindAccess,
): Promise<SystemAccess | undefined> {
  if (systemKey === undefined) {
    if (access !== 'known' && !(caller.kind === 'user' && caller.isAdmin)) {
      throw permissionMissing(caller, access)
    }
    return undefined
  }
  const found = await findAccess(caller, systemKey)
  if (found === undefined) throw new AppError('not-found')
  return access === 'known' ? found : requirePermission(found, access)
}
