import type { DistinctSetWire } from '#shared/contracts/distinct-sets.contract.ts'

/** A distinct set as it is written here; its tokens by name. */
export interface SetDraft {
  readonly name: string
  readonly tokens: readonly string[]
}

/** What stands where nothing is edited yet: the set, or an empty one. */
export function draftOf(set: DistinctSetWire | undefined): SetDraft {
  return { name: set?.name ?? '', tokens: set?.tokens ?? [] }
}

export function isSameDraft(one: SetDraft, other: SetDraft): boolean {
  return one.name === other.name && one.tokens.join('\n') === other.tokens.join('\n')
}

/** Members in which a set as it is now and as it is drafted here differ, in words. */
export function setVersions(now: SetDraft, yours: SetDraft) {
  const rows = [
    { member: 'Name', now: now.name, yours: yours.name },
    { member: 'Tokens', now: now.tokens.join('\n'), yours: yours.tokens.join('\n') },
  ]
  const differing = rows.filter((row) => row.now !== row.yours)
  return differing.length > 0 ? differing : rows
}

/** What keeps a draft from being a set, as a sentence. */
export function lackOf({ name, tokens }: SetDraft): string | undefined {
  if (tokens.length < 2) return 'A distinct set has two tokens or more.'
  return name.trim() === '' ? 'A distinct set has a name.' : undefined
}
