import type * as z from 'zod'
import type { SystemSettings } from '#shared/checks/model.ts'
import {
  type Decision,
  memberOf,
  refuse,
  type SystemIndex,
} from '#shared/contracts/governed-system.ts'
import type { createSystemBody, patchSystemBody } from '#shared/contracts/systems.contract.ts'

export type CreateSystemBody = z.output<typeof createSystemBody>
export type PatchSystemBody = z.output<typeof patchSystemBody>

/** What the caller's roles allow: every setting, or level and write mode only; and to end review. */
export interface SettingsAuthority {
  readonly maintains: boolean
  readonly leads: boolean
}

type WriteMode = NonNullable<PatchSystemBody['writeMode']>

export const settingsOf = (body: CreateSystemBody): SystemSettings =>
  withFloor({ level: body.level, p3: body.p3, p3Gates: body.p3Gates }, body.disabledFloor)

/** The settings as the body leaves them; name and write mode are no part of a revision. */
export function decidePatch(
  { model }: SystemIndex,
  body: PatchSystemBody,
  caller: { readonly authority: SettingsAuthority; readonly writeMode: WriteMode },
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

function roleRefusal(
  body: PatchSystemBody,
  { authority, writeMode }: { authority: SettingsAuthority; writeMode: WriteMode },
) {
  const others = [body.name, body.p3, body.p3Gates, body.disabledFloor]
  if (!authority.maintains && others.some((member) => member !== undefined)) {
    const detail = 'A maintainer edits these settings; an accessibility-lead level and write mode'
    return refuse('role-missing', detail)
  }
  if (!authority.leads && writeMode === 'review' && body.writeMode === 'direct') {
    return refuse('role-missing', 'Only an accessibility-lead may set direct again')
  }
  return undefined
}

const withFloor = (
  settings: SystemSettings,
  disabledFloor: number | null | undefined,
): SystemSettings =>
  disabledFloor === null || disabledFloor === undefined ? settings : { ...settings, disabledFloor }
