import type { SystemSettings } from '#shared/checks/model.ts'
import { presentSettings } from '#shared/contracts/present-items.ts'
import type { ProtectedBranchWire, SystemWire } from '#shared/contracts/systems.contract.ts'

/** A system as it is read, with its counts and head. */
export interface SystemFound {
  readonly id: string
  readonly key: string
  readonly name: string
  readonly writeMode: SystemWire['writeMode']
  readonly protectedBranches: readonly ProtectedBranchWire[]
  readonly settings: SystemSettings
  readonly tokens: number
  readonly pairs: number
  readonly themes: number
  readonly openBreaches: number
  readonly revision: number
  readonly at: Date
  readonly verdict: SystemWire['head']['verdict']
  readonly authorId: string | null
  readonly authorName: string | null
}

export function presentSystem(found: SystemFound): Omit<SystemWire, 'etag'> {
  const { tokens, pairs, themes, openBreaches, revision, at, verdict } = found
  const { authorId, authorName } = found
  return {
    id: found.id,
    key: found.key,
    name: found.name,
    writeMode: found.writeMode,
    protectedBranches: [...found.protectedBranches],
    ...presentSettings(found.settings),
    counts: { tokens, pairs, themes, openBreaches },
    head: {
      revision,
      at: at.toISOString(),
      author: authorId === null ? null : { id: authorId, name: authorName ?? '' },
      verdict,
    },
    latestRelease: null,
  }
}
