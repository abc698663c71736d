/**
 * The one permission table: what each role of a system and each scope of a key allows.
 * Routes, the document, the guard tests and the console read it from here.
 */
export const ROLES = ['engineer', 'maintainer', 'accessibility-lead'] as const
export type Role = (typeof ROLES)[number]

export const SCOPES = ['themes:read', 'checks:write', 'tokens:write'] as const
export type Scope = (typeof SCOPES)[number]

const READ = [
  'system:read',
  'tokens:read',
  'pairs:read',
  'themes:read',
  'rules:read',
  'distinct-sets:read',
  'checks:read',
  'checks:write',
  'breaches:read',
  'breaches:comment',
  'revisions:read',
  'jobs:read',
  'members:read',
  'keys:own',
] as const

export const ROLE_PERMISSIONS = {
  engineer: READ,
  maintainer: [
    ...READ,
    'tokens:write',
    'pairs:write',
    'themes:write',
    'rules:write',
    'distinct-sets:write',
    'settings:write',
    'keys:ci',
  ],
  // Of edits only exemptions, levels, and which themes gate: the services refuse the other members.
  'accessibility-lead': [
    ...READ,
    'pairs:write',
    'themes:write',
    'settings:write',
    'breaches:assign',
  ],
} as const satisfies Record<Role, readonly string[]>

/** What only an administrator of the instance may do. */
export const ADMIN_PERMISSIONS = ['systems:create', 'members:write'] as const

export const SCOPE_PERMISSIONS = {
  'themes:read': ['system:read', 'themes:read', 'tokens:read', 'jobs:read-own'],
  'checks:write': ['checks:write', 'checks:read-own', 'jobs:read-own'],
  'tokens:write': ['tokens:read', 'tokens:write', 'jobs:read-own'],
} as const satisfies Record<Scope, readonly string[]>

export type Permission =
  | (typeof ROLE_PERMISSIONS)[Role][number]
  | (typeof ADMIN_PERMISSIONS)[number]
  | (typeof SCOPE_PERMISSIONS)[Scope][number]

/** The roles that hold a permission, in the words a refusal uses. */
export function rolesWith(permission: Permission): (Role | 'admin')[] {
  const roles = ROLES.filter((role) =>
    (ROLE_PERMISSIONS[role] as readonly string[]).includes(permission),
  )
  return [...roles, 'admin']
}

/** The scopes that carry a permission. */
export function scopesWith(permission: Permission): Scope[] {
  return SCOPES.filter((scope) =>
    (SCOPE_PERMISSIONS[scope] as readonly string[]).includes(permission),
  )
}
