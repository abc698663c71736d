import { readNumber } from '#console/lib/read-number.ts'
import type { SystemEdits } from '#shared/checks/edits.ts'
import type { Level } from '#shared/checks/model.ts'
import { settingsFromWire } from '#shared/contracts/system-model.ts'
import type { ProtectedBranchWire, SystemWire } from '#shared/contracts/systems.contract.ts'

/** What is edited of a system's settings; absent members stay as they are. */
export interface SettingsDraft {
  readonly name?: string
  readonly writeMode?: SystemWire['writeMode']
  readonly level?: Level
  readonly p3?: boolean
  readonly p3Gates?: boolean
  /** As it stands in its field; empty: none. */
  readonly disabledFloor?: string
  readonly protectedBranches?: readonly ProtectedBranchWire[]
}

/** The draft as the service takes it; none where the floor cannot be read. */
export function readSettings({ disabledFloor, protectedBranches, ...draft }: SettingsDraft) {
  const floor = readFloor(disabledFloor)
  if (floor.fault !== undefined) return undefined
  return {
    ...draft,
    ...(disabledFloor === undefined ? {} : { disabledFloor: floor.value ?? null }),
    ...(protectedBranches === undefined ? {} : { protectedBranches: [...protectedBranches] }),
  }
}
export type SettingsPatch = NonNullable<ReturnType<typeof readSettings>>

export const readFloor = (text: string | undefined) => readNumber(text ?? '', 1, 21)

/** What the draft does to verdicts; none where it touches none. */
export function settingsEdits(system: SystemWire, patch: SettingsPatch): SystemEdits | undefined {
  const { level, p3, p3Gates, disabledFloor } = patch
  const isMeasured = [level, p3, p3Gates, disabledFloor].some((member) => member !== undefined)
  if (!isMeasured) return undefined
  return {
    settings: settingsFromWire({
      level: level ?? system.level,
      p3: p3 ?? system.p3,
      p3Gates: p3Gates ?? system.p3Gates,
      disabledFloor: disabledFloor === undefined ? system.disabledFloor : disabledFloor,
    }),
  }
}

/** The draft without members that say what the system says anyway. */
export function leftOf(system: SystemWire, draft: SettingsDraft): SettingsDraft {
  const standing: Record<string, unknown> = {
    ...system,
    disabledFloor: system.disabledFloor === null ? '' : String(system.disabledFloor),
  }
  return Object.fromEntries(
    Object.entries(draft).filter(
      ([member, value]) => JSON.stringify(standing[member]) !== JSON.stringify(value),
    ),
  )
}

const WORDS = {
  name: 'Name',
  writeMode: 'Edits',
  level: 'Level',
  p3: 'Display P3 ships',
  p3Gates: 'Display P3 gates',
  disabledFloor: 'Least ratio in disabled',
  protectedBranches: 'Protected branches',
} as const

/** Members that are drafted, as they are now and as they are here. */
export function settingsVersions(
  now: SystemWire,
  draft: SettingsDraft,
): { member: string; now: string; yours: string }[] {
  return (Object.keys(WORDS) as (keyof typeof WORDS)[]).flatMap((member) =>
    draft[member] === undefined
      ? []
      : [{ member: WORDS[member], now: inWords(now[member]), yours: inWords(draft[member]) }],
  )
}

function inWords(value: SystemWire[keyof typeof WORDS] | SettingsDraft[keyof typeof WORDS]) {
  if (Array.isArray(value)) {
    const branches = value as readonly ProtectedBranchWire[]
    return branches.length === 0 ? 'none' : branches.map(branchInWords).join('\n')
  }
  if (typeof value === 'boolean') return value ? 'yes' : 'no'
  return value === null || value === '' ? 'none' : String(value)
}

export const branchInWords = ({ repository, branch }: ProtectedBranchWire): string =>
  `${branch} of ${repository}`
