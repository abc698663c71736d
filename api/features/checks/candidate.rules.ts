import type { SystemEdits } from '#shared/checks/edits.ts'
import type { ModelFault, PairModel, TokenModel } from '#shared/checks/model.ts'
import type { SystemIndex } from '#shared/contracts/governed-system.ts'
import type { PairInput } from '#shared/contracts/pairs.contract.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { pairFromWire } from '#shared/contracts/system-model.ts'
import type { Reading, WireNames } from '#shared/contracts/wire-values.ts'
import { type CandidateToken, readExtension } from './token-document.rules.ts'

/** What a check is asked to measure besides, or instead of, what the head holds. */
export interface Candidate {
  readonly tokens?: readonly CandidateToken[] | undefined
  readonly mode: 'merge' | 'replace'
  readonly pairs: readonly PairInput[]
}

export type CandidateEdits =
  | {
      readonly ok: true
      readonly edits: SystemEdits
      /** Where in the body a fault of resolution lies. */
      readonly pointerOf: (fault: ModelFault) => string | undefined
    }
  | { readonly ok: false; readonly faults: readonly Fault[] }

/** Ids that no stored item has, without the signs that part a finding's identity. */
const newTokenId = (name: string) => `new:${name.replace(/[%/+]/g, encodeURIComponent)}`
const newPairId = (position: number) => `new-pair:${position}`

/** The edits that make the head into a candidate, or every reason why they cannot. */
export function candidateEdits(head: SystemIndex, candidate: Candidate): CandidateEdits {
  const tokens = candidate.tokens ?? []
  const replaced = candidate.tokens !== undefined && candidate.mode === 'replace'
  const given = new Map(tokens.map(({ name }) => [name, idIn(head, name)]))
  const tokenId = (name: string) =>
    given.get(name) ?? (replaced ? undefined : head.names.tokenId(name))
  const reading: Reading = { names: { tokenId, themeId: head.names.themeId }, faults: [] }
  const put = tokens.map((token) => tokenOf(head, token, reading))
  const pairs = candidate.pairs.map((pair, position) => pairOf(pair, position, reading))
  const kept = new Set(given.values())
  const removed = replaced ? head.model.tokens.filter(({ id }) => !kept.has(id)) : []
  const faults = [
    ...reading.faults,
    ...lackedByPairs(head, new Set(removed.map(({ id }) => id))),
    ...(replaced ? [] : clashingNames(head, tokens)),
  ]
  if (faults.length > 0) return { ok: false, faults }
  const distinctSets = setsWithout(head, new Set(removed.map(({ id }) => id)))
  const edits: SystemEdits = {
    ...(put.length + removed.length > 0
      ? { tokens: { put, remove: removed.map(({ id }) => id) } }
      : {}),
    ...(pairs.length > 0 ? { pairs: { put: pairs } } : {}),
    ...(distinctSets ? { distinctSets } : {}),
  }
  return { ok: true, edits, pointerOf: pointersOf(head, candidate) }
}

const idIn = ({ names }: { readonly names: WireNames }, name: string) =>
  names.tokenId(name) ?? newTokenId(name)

/** A document sets the value; states, overrides and rules that it does not give are kept. */
function tokenOf(head: SystemIndex, given: CandidateToken, reading: Reading): TokenModel {
  const standing = head.tokensByName.get(given.name)
  return {
    ...(standing ?? { id: newTokenId(given.name), name: given.name, states: [], values: {} }),
    value: sourceOf(given, reading),
    ...readExtension(given, reading),
  }
}

function sourceOf({ value, pointer }: CandidateToken, reading: Reading): TokenModel['value'] {
  if (value.kind === 'color') return value
  const token = reading.names.tokenId(value.name)
  if (token !== undefined) return { kind: 'alias', token }
  const detail = `There is no token named ${value.name}`
  reading.faults.push({ pointer: `${pointer}/$value`, detail })
  return { kind: 'alias', token: newTokenId(value.name) }
}

/** The faults of pairs beside a document that cannot be read: of its tokens no more than the names are known. */
export function unknownNames(
  { names }: SystemIndex,
  pairs: readonly PairInput[],
  isNamed: (name: string) => boolean,
): readonly Fault[] {
  const tokenId = (name: string) => (isNamed(name) ? newTokenId(name) : undefined)
  const reading: Reading = { names: { tokenId, themeId: names.themeId }, faults: [] }
  pairs.forEach((pair, position) => {
    pairOf(pair, position, reading)
  })
  return reading.faults
}

/**
 * A group of the candidate's own: a passing pair that a caller makes up must not excuse a declared one that
 * falls short.
 */
function pairOf(pair: PairInput, position: number, reading: Reading): PairModel {
  const model = pairFromWire({ ...pair, id: newPairId(position) }, `/pairs/${position}`, reading)
  return model.anyOf === undefined ? model : { ...model, anyOf: `new:${model.anyOf}` }
}

/** Declared pairs are part of what is asked: a document without their tokens cannot be measured. */
function lackedByPairs(head: SystemIndex, removed: ReadonlySet<string>): Fault[] {
  if (removed.size === 0) return []
  const { names } = head
  return head.model.pairs.flatMap(({ foreground, background, backdrop }) => {
    const layers = [foreground, background, ...(backdrop === 'unknown' ? [] : backdrop)]
    const declared = `${names.tokenName(foreground)} on ${names.tokenName(background)}`
    return [...new Set(layers)]
      .filter((id) => removed.has(id))
      .map((id) => ({
        pointer: '/tokens',
        detail: `${names.tokenName(id)} is missing, which the declared pair ${declared} needs`,
      }))
  })
}

/** A distinct set gates nothing: of one whose tokens a document lacks, what is left is measured. */
function setsWithout({ model }: SystemIndex, removed: ReadonlySet<string>) {
  const sets = (model.distinctSets ?? []).filter(({ tokens }) =>
    tokens.some((id) => removed.has(id)),
  )
  if (sets.length === 0) return undefined
  const left = sets.map((set) => ({
    ...set,
    tokens: set.tokens.filter((id) => !removed.has(id)),
  }))
  const isMeasured = ({ tokens }: { readonly tokens: readonly string[] }) => tokens.length > 1
  return { put: left.filter(isMeasured), remove: sets.map(({ id }) => id) }
}

/** A new name must not be an old one composed differently, nor make a name a group and a token at once. */
function clashingNames(head: SystemIndex, tokens: readonly CandidateToken[]): Fault[] {
  const fresh = tokens.filter(({ name }) => !head.tokensByName.has(name))
  if (fresh.length === 0) return []
  const standing = new Map(head.model.tokens.map(({ name }) => [name.normalize('NFC'), name]))
  const groups = new Map(
    [...standing].flatMap(([normal, name]) => groupsOf(normal).map((group) => [group, name])),
  )
  return fresh.flatMap(({ name, pointer }) => {
    const normal = name.normalize('NFC')
    const within = groupsOf(normal).find((group) => standing.has(group))
    const member = groups.get(normal)
    return [
      ...(standing.has(normal) ? [`Another token has the name ${name}, composed differently`] : []),
      ...(within === undefined ? [] : [`${standing.get(within)} is a token, so it holds none`]),
      ...(member === undefined ? [] : [`${name} is a group: ${member} is in it`]),
    ].map((detail) => ({ pointer, detail }))
  })
}

/** The groups that a name lies in, outermost first. */
const groupsOf = (name: string): string[] => {
  const segments = name.split('.')
  return segments.slice(1).map((_, at) => segments.slice(0, at + 1).join('.'))
}

/** The member of a pair that a fault of resolution lies in. */
const MEMBERS: { readonly [code in ModelFault['code']]?: string } = {
  'level-lower': '/level',
  'minimum-lower': '/minimum',
}

function pointersOf(head: SystemIndex, { tokens, pairs }: Candidate) {
  const pointers = new Map<string, string>(
    tokens?.map(({ name, pointer }) => [idIn(head, name), pointer]),
  )
  pairs.forEach((_, position) => {
    pointers.set(newPairId(position), `/pairs/${position}`)
  })
  return ({ token, pair, code }: ModelFault) => {
    const ofPair = pointers.get(pair ?? '')
    if (ofPair !== undefined) return `${ofPair}${MEMBERS[code] ?? ''}`
    return pointers.get(token ?? '') ?? (tokens ? '/tokens' : undefined)
  }
}
