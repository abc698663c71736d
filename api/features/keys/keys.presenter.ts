import type { Scope } from '#shared/contracts/permissions.ts'
import type { KeyWire } from '#shared/contracts/keys.contract.ts'
import type { KeyRow } from './keys.repository.ts'

export const presentKey = (row: KeyRow): KeyWire => ({
  ...row,
  scopes: row.scopes.map((scope) => scope as Scope),
  createdAt: row.createdAt.toISOString(),
  expiresAt: row.expiresAt.toISOString(),
  lastUsedAt: row.lastUsedAt?.toISOString() ?? null,
})
