import { call } from '#console/lib/api.ts'
import { patchSystem } from '#shared/contracts/systems.contract.ts'
import type { SettingsPatch } from './settings-draft.ts'

/** Changes the settings that a draft names; answers the system and what that did to the head. */
export async function saveSettings({
  system,
  etag,
  patch,
  message,
}: {
  readonly system: string
  readonly etag: string
  readonly patch: SettingsPatch
  readonly message: string
}) {
  const body = { ...patch, ...(message.trim() === '' ? {} : { message }) }
  return (await call(patchSystem, { params: { system }, ifMatch: etag, body })).body
}
