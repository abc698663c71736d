import type * as z from 'zod'
import type { SystemSettings } from '#shared/checks/model.ts'
import {
  type Decision,
  memberOf,
  refuse,
  type SystemIndex,
} from '#shared/contracts/governed-system.ts'
import type {
  createSystemBody,
  patchSystemBody,
  ProtectedBranchWire,
} from '#shared/contracts/systems.contract.ts'

export type CreateSystemBody = z.output<typeof createSystemBody>
export type PatchSystemBody = z.output<typeof patchSystemBody>

/** What the caller's roles allow: every setting, or level and write mode only; and to end review. */
export interface SettingsAuthority {
  readonly maintains: boolean
  readonly leads: boolean
}

/** What is no part of a revision, as it stands. */
export interface Handling {
  readonly writeMode: 'direct' | 'review'
  readonly protectedBranches: readonly ProtectedBranchWire[]
}

export const settingsOf = (body: CreateSystemBody): SystemSettings =>
  withFloor({ level: body.level, p3: body.p3, p3Gates: body.p3Gates }, body.disabledFloor)

/** The settings as the body leaves them; name and write mode are no part of a revision. */
export function decidePatch(
  { model }: SystemIndex,
  body: PatchSystemBody,
  caller: Patching,
): Decision {
  const refusal = roleRefusal(body, caller)
  if (refusal) return refusal
  const { disabledFloor: standing, level, p3, p3Gates } = model.settings
  const settings = withFloor(
    { level: body.level ?? level, p3: body.p3 ?? p3, p3Gates: body.p3Gates ?? p3Gates },
    body.disabledFloor === undefined ? standing : body.disabledFloor,
  )
  return {
    ok: true,
    edits: { settings },
    pointerOf: ({ code }) => (code === 'level-lower' ? '/level' : undefined),
    weakenedAt: memberOf({ kind: 'system' }),
  }
}

interface Patching {
  readonly authority: SettingsAuthority
  readonly handling: Handling
}

/** What takes the log's eye off something is the lead's to decide: the end of review, and a branch left alone. */
function roleRefusal(body: PatchSystemBody, { authority, handling }: Patching) {
  const others = [body.name, body.p3, body.p3Gates, body.disabledFloor]
  if (!authority.maintains && others.some((member) => member !== undefined)) {
    const detail =
      'A maintainer edits these settings; an accessibility-lead level, write mode and protected branches'
    return refuse('role-missing', detail)
  }
  if (authority.leads) return undefined
  if (handling.writeMode === 'review' && body.writeMode === 'direct') {
    return refuse('role-missing', 'Only an accessibility-lead may set direct again')
  }
  const after = body.protectedBranches && distinctBranches(body.protectedBranches)
  const left = after && handling.protectedBranches.filter((branch) => !includes(after, branch))
  if (left !== undefined && left.length > 0) {
    const named = left.map(({ repository, branch }) => `${branch} of ${repository}`).join(', ')
    const detail = `Only an accessibility-lead may take a protected branch away: ${named}`
    return refuse('role-missing', detail)
  }
  return undefined
}

const includes = (
  branches: readonly ProtectedBranchWire[],
  { repository, branch }: ProtectedBranchWire,
): boolean => branches.some((one) => one.repository === repository && one.branch === branch)

/** Each once, named as a pipeline names it: without the part of a ref that says that it is a branch. */
export function distinctBranches(given: readonly ProtectedBranchWire[]): ProtectedBranchWire[] {
  const branches: ProtectedBranchWire[] = []
  for (const { repository, branch } of given) {
    const named = { repository, branch: branch.replace(/^refs\/heads\//, '') }
    if (!includes(branches, named)) branches.push(named)
  }
  return branches
}

const withFloor = (
  settings: SystemSettings,
  disabledFloor: number | null | undefined,
): SystemSettings =>
  disabledFloor === null || disabledFloor === undefined ? settings : { ...settings, disabledFloor }
