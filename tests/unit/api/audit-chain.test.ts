import fc from 'fast-check'
import { expect, it } from 'vitest'
import {
  type AuditEntry,
  CHAIN_START,
  entryHash,
  findTampering,
  type SealedEntry,
} from '#api/platform/audit/audit-chain.ts'

const chainOf = (length: number): SealedEntry[] => {
  const entries: SealedEntry[] = []
  for (let seq = 1; seq <= length; seq += 1) {
    const entry: AuditEntry = {
      chainId: 'sys_1',
      seq,
      at: new Date(1_795_000_000_000 + seq),
      actor: { kind: 'user', id: `usr_${seq % 3}` },
      action: 'token.created',
      subject: `tok_${seq}`,
      details: '{}',
    }
    const previousHash = entries.at(-1)?.hash ?? CHAIN_START
    entries.push({ ...entry, previousHash, hash: entryHash(previousHash, entry) })
  }
  return entries
}

const whole = chainOf(40)

const TAMPERINGS: readonly ((entry: SealedEntry) => Partial<SealedEntry>)[] = [
  () => ({ action: 'token.removed' }),
  () => ({ subject: 'tok_other' }),
  () => ({ details: '{"a":1}' }),
  ({ at }) => ({ at: new Date(at.getTime() + 1) }),
  () => ({ actor: { kind: 'key', id: 'usr_0' } }),
  () => ({ actor: { kind: 'user', id: null } }),
  () => ({ chainId: 'sys_2' }),
  ({ seq }) => ({ seq: seq + 1 }),
  () => ({ previousHash: 'f'.repeat(64) }),
  () => ({ hash: 'f'.repeat(64) }),
]

it('answers nothing of a chain that is whole', () => {
  expect(findTampering(whole)).toBeUndefined()
  expect(findTampering([])).toBeUndefined()
})

it('answers the very entry that was changed, whatever was changed of it', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 0, max: whole.length - 1 }),
      fc.constantFrom(...TAMPERINGS),
      (index, tamper) => {
        const entry = whole[index] as SealedEntry
        const changed = whole.with(index, { ...entry, ...tamper(entry) })
        expect(findTampering(changed)).toBe(index + 1)
      },
    ),
    { numRuns: 1000 },
  )
})

it('answers the place of an entry that was taken out, put in or moved, even if it is sealed anew', () => {
  expect(findTampering(whole.toSpliced(10, 1))).toBe(11)
  expect(findTampering(whole.toSpliced(10, 0, whole[10] as SealedEntry))).toBe(12)
  const swapped = whole.with(10, whole[11] as SealedEntry).with(11, whole[10] as SealedEntry)
  expect(findTampering(swapped)).toBe(11)
  const entry = { ...(whole[10] as SealedEntry), action: 'token.removed' }
  const sealed = { ...entry, hash: entryHash(entry.previousHash, entry) }
  expect(findTampering(whole.with(10, sealed))).toBe(12)
})
