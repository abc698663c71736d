import {
  type Permission,
  ROLE_PERMISSIONS,
  type Role,
  rolesWith,
  SCOPE_PERMISSIONS,
  type Scope,
  scopesWith,
} from '#shared/contracts/permissions.ts'
import { AppError } from './errors.ts'

/** Someone with a session. */
export interface UserCaller {
  readonly kind: 'user'
  readonly userId: string
  readonly sessionId: string
  readonly name: string
  readonly email: string
  readonly isAdmin: boolean
}

/** Someone, mostly something, with a key; `userId` and `name` are those of its owner. */
export interface KeyCaller {
  readonly kind: 'key'
  readonly keyId: string
  readonly userId: string
  readonly name: string
  readonly systemId: string
  readonly scopes: readonly Scope[]
}

export type Caller = UserCaller | KeyCaller

/** Who an audit entry names. */
export interface AuditActor {
  readonly kind: 'user' | 'key' | 'service'
  readonly id: string | null
}

/** What one caller may do in one system. */
export interface SystemAccess {
  readonly id: string
  readonly key: string
  readonly name: string
  /** Of the person, or of the key's owner. */
  readonly role: Role | 'admin'
  /** The permission that the call takes is held in its `-own` form only. */
  readonly ownOnly: boolean
  allows(permission: Permission): boolean
  readonly caller: Caller
}

export const actorOf = (caller: Caller): AuditActor => ({
  kind: caller.kind,
  id: caller.kind === 'user' ? caller.userId : caller.keyId,
})

const roleAllows = (role: Role | 'admin', permission: Permission): boolean =>
  role === 'admin' || (ROLE_PERMISSIONS[role] as readonly string[]).includes(permission)

const scopesAllow = (scopes: readonly Scope[], permission: string): boolean =>
  scopes.some((scope) => (SCOPE_PERMISSIONS[scope] as readonly string[]).includes(permission))

/** A key never does more than its owner could do now. */
const allowsIn = (caller: Caller, role: Role | 'admin', permission: Permission): boolean => {
  if (caller.kind === 'user') return roleAllows(role, permission)
  if (!scopesAllow(caller.scopes, permission)) return false
  return roleAllows(role, permission.replace(/-own$/, '') as Permission)
}

export interface SystemRow {
  readonly id: string
  readonly key: string
  readonly name: string
}

/** What a caller may do in a system, before any question was asked. */
export function createSystemAccess(
  caller: Caller,
  system: SystemRow,
  role: Role | 'admin',
): SystemAccess {
  const allows = (permission: Permission) => allowsIn(caller, role, permission)
  return { id: system.id, key: system.key, name: system.name, role, ownOnly: false, allows, caller }
}

/**
 * Leaves a caller through who holds the permission, or its `-own` form.
 * @returns the access, marked `ownOnly` where only that form is held
 */
export function requirePermission(access: SystemAccess, permission: Permission): SystemAccess {
  if (access.allows(permission)) return access
  if (access.allows(`${permission}-own` as Permission)) return { ...access, ownOnly: true }
  throw permissionMissing(access.caller, permission)
}

const oneOf = (words: readonly string[]): string =>
  words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} or ${words.at(-1)}`

/** The refusal that names the missing role, or the missing scope of a key. */
export function permissionMissing(caller: Caller, permission: Permission): AppError {
  const scopes = [permission, `${permission}-own` as Permission].flatMap(scopesWith)
  if (caller.kind === 'key' && !scopesAllow(caller.scopes, permission)) {
    return new AppError('scope-missing', {
      detail:
        scopes.length === 0
          ? 'No key may do this: sign in'
          : `The key lacks the scope ${oneOf(scopes)}`,
      extra: { scopes },
    })
  }
  const roles = rolesWith(permission)
  return new AppError('role-missing', {
    detail: `This takes the role ${oneOf(roles)}`,
    extra: { roles },
  })
}
