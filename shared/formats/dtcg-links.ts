import { cyclesOf } from './cycles.ts'
import { type DtcgSurvey, type DtcgType, isTypeName } from './dtcg-document.ts'
import type { DtcgEntry } from './dtcg-entries.ts'
import { type DtcgFault, fault, pointerTo } from './dtcg-fault.ts'
import { type DtcgReferences, isAliasLike, type Referent, referenceOf } from './dtcg-references.ts'

/** A token with where its value comes from and what type it is. */
export interface DtcgLink {
  readonly entry: DtcgEntry
  /** Pointer of its value. */
  readonly pointer: string
  /** The whole token it takes its value from. */
  readonly target?: string
  /** The value as written, or what a reference into another value leads to. */
  readonly value?: unknown
  readonly type: DtcgType | undefined
}

/** Every token with what its reference leads to, in the order of the entries. */
export interface DtcgLinks {
  readonly links: readonly DtcgLink[]
  readonly faults: readonly DtcgFault[]
}

/** Follows every token's reference, reports those that lead nowhere or in a circle, and settles every type. */
export function linkEntries(
  entries: ReadonlyMap<string, DtcgEntry>,
  { pointerOf }: DtcgSurvey,
  references: DtcgReferences,
): DtcgLinks {
  const faults: DtcgFault[] = []
  const sources = new Map<string, Source>()
  for (const entry of entries.values()) {
    const source = sourceOf(entry, pointerOf.get(entry.token)!, references)
    sources.set(entry.name, source)
    const { referent } = source
    if (referent.kind === 'fault')
      faults.push(fault(referent.code, source.pointer, referent.detail))
  }
  const targetOf = (name: string) => {
    const referent = sources.get(name)!.referent
    return referent.kind === 'token' ? referent.name : undefined
  }
  const circular = new Set<string>()
  for (const members of cyclesOf(sources.keys(), (name) => [targetOf(name) ?? []].flat())) {
    const detail = `The reference leads in a circle: ${members.slice(0, 8).join(', ')}.`
    for (const name of members) {
      circular.add(name)
      faults.push(fault('alias-circular', sources.get(name)!.pointer, detail))
    }
  }
  const types = typesOf(entries, targetOf, circular)
  const links = [...entries.values()].map((entry): DtcgLink => {
    const { pointer, referent } = sources.get(entry.name)!
    const type = types.get(entry.name)
    const target = targetOf(entry.name)
    const isLost = circular.has(entry.name) || referent.kind === 'fault'
    faults.push(
      ...typeFaults(entry, pointerOf, { type, targetType: types.get(target ?? ''), isLost }),
    )
    if (isLost) return { entry, pointer, type }
    return referent.kind === 'token'
      ? { entry, pointer, type, target: referent.name }
      : { entry, pointer, type, value: referent.value }
  })
  return { links, faults }
}

interface Source {
  readonly pointer: string
  readonly referent: Referent
}

function sourceOf({ token }: DtcgEntry, pointer: string, references: DtcgReferences): Source {
  if (!Object.hasOwn(token, '$value')) {
    return { pointer: pointerTo(pointer, '$ref'), referent: references.followPointer(token.$ref) }
  }
  const at = pointerTo(pointer, '$value')
  const value = token.$value
  if (isAliasLike(value)) return { pointer: at, referent: references.followAlias(value) }
  const reference = referenceOf(value)
  if (!reference) return { pointer: at, referent: { kind: 'value', value } }
  return { pointer: pointerTo(at, '$ref'), referent: references.followPointer(reference.$ref) }
}

/** A token's own type, else that of what it refers to, else that of its groups; never guessed. */
function typesOf(
  entries: ReadonlyMap<string, DtcgEntry>,
  targetOf: (name: string) => string | undefined,
  circular: ReadonlySet<string>,
): Map<string, DtcgType | undefined> {
  const types = new Map<string, DtcgType | undefined>()
  for (const start of entries.keys()) {
    const chain: string[] = []
    let name: string | undefined = start
    while (name !== undefined && !types.has(name)) {
      chain.push(name)
      const isKnown: boolean = isTypeName(entries.get(name)!.token.$type) || circular.has(name)
      name = isKnown ? undefined : targetOf(name)
    }
    for (const member of chain.reverse()) {
      const { token, groupType } = entries.get(member)!
      const own = isTypeName(token.$type) ? token.$type : undefined
      types.set(member, own ?? types.get(targetOf(member) ?? '') ?? groupType)
    }
  }
  return types
}

interface SettledType {
  readonly type: DtcgType | undefined
  readonly targetType: DtcgType | undefined
  readonly isLost: boolean
}

function typeFaults(
  { token }: DtcgEntry,
  pointerOf: DtcgSurvey['pointerOf'],
  { type, targetType, isLost }: SettledType,
): DtcgFault[] {
  const pointer = pointerOf.get(token)!
  if (type === undefined && !isLost && token.$type === undefined) {
    return [
      fault('type-missing', pointer, 'No $type here, in what it refers to, or in its groups.'),
    ]
  }
  if (type === undefined || targetType === undefined || type === targetType) return []
  const detail = `The type is ${type}, but what it refers to is a ${targetType}.`
  return [fault('type-mismatch', pointer, detail)]
}
