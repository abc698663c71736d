import { childOf, type DtcgType, isToken, isTypeName } from './dtcg-document.ts'
import { type DtcgFault, fault, type JsonObject, pointerTo } from './dtcg-fault.ts'
import type { DtcgLayers, Layers } from './dtcg-layers.ts'

/** A token under the name it is referred to by, with what its groups give it. */
export interface DtcgEntry {
  /** Dot path, as in a reference. */
  readonly name: string
  readonly token: JsonObject
  /** Type of the nearest group that has one. */
  readonly groupType: DtcgType | undefined
  /** Its own, else of the nearest group that has one. */
  readonly deprecated: boolean | string | undefined
}

/** A group under its name, with its own members. */
export interface DtcgGroup {
  readonly name: string
  readonly description?: string
  readonly deprecated?: boolean | string
  readonly extensions?: JsonObject
}

export interface DtcgEntries {
  /** In document order. */
  readonly entries: readonly DtcgEntry[]
  readonly groups: readonly DtcgGroup[]
  readonly faults: readonly DtcgFault[]
}

interface Place {
  readonly name: string
  readonly layers: Layers
  readonly groupType: DtcgType | undefined
  readonly deprecated: boolean | string | undefined
  /** The written group that this is inherited by; nothing where it is written at its place itself. */
  readonly inheritedBy: JsonObject | undefined
}

const MOST = 100_000
/** Groups that extend groups that extend groups multiply without end. */
const MOST_INHERITED = 10_000

/**
 * Names every group and token, inherited ones included, and hands types and deprecations down.
 * @param pointerOf the pointer of a written group
 * @returns past either limit the fault alone, so that nothing is done for a document that is refused
 */
export function namedEntries(
  layers: DtcgLayers,
  pointerOf: (group: JsonObject) => string,
): DtcgEntries {
  const entries: DtcgEntry[] = []
  const groups: DtcgGroup[] = []
  const waiting: Place[] = [
    {
      name: '',
      layers: layers.root,
      groupType: undefined,
      deprecated: undefined,
      inheritedBy: undefined,
    },
  ]
  let inherited = 0
  for (let place = waiting.pop(); place; place = waiting.pop()) {
    const { name, layers: own, groupType, deprecated, inheritedBy } = place
    if (inheritedBy) inherited += 1
    if (inheritedBy && inherited > MOST_INHERITED) return tooManyInherited(inheritedBy, pointerOf)
    if (entries.length + groups.length >= MOST) {
      return refused('', `A document has at most ${MOST} groups and tokens.`)
    }
    const [first] = own
    if (first && isToken(first) && name !== '') {
      const { $deprecated } = first
      const isSet = typeof $deprecated === 'boolean' || typeof $deprecated === 'string'
      const kept = isSet ? $deprecated : deprecated
      entries.push({ name, token: first, groupType, deprecated: kept })
      continue
    }
    const members = membersOf(own)
    if (name !== '') groups.push({ name, ...members.own })
    const children = layers.namesOf(own).map((child) => ({
      name: name === '' ? child : `${name}.${child}`,
      layers: layers.childLayers(own, child),
      groupType: members.type ?? groupType,
      deprecated: members.own.deprecated ?? deprecated,
      inheritedBy: inheritedBy ?? (first && !childOf(first, child) ? first : undefined),
    }))
    for (const child of children.reverse()) waiting.push(child)
  }
  return { entries, groups, faults: [] }
}

const refused = (pointer: string, detail: string): DtcgEntries => ({
  entries: [],
  groups: [],
  faults: [fault('too-many-tokens', pointer, detail)],
})

function tooManyInherited(
  group: JsonObject,
  pointerOf: (group: JsonObject) => string,
): DtcgEntries {
  const at = pointerOf(group)
  const pointer = Object.hasOwn(group, '$extends') ? pointerTo(at, '$extends') : at
  const detail = `A document has at most ${MOST_INHERITED} groups and tokens by $extends.`
  return refused(pointer, detail)
}

function membersOf(layers: Layers) {
  const first = (member: string) => layers.find((layer) => layer[member] !== undefined)?.[member]
  const type = first('$type')
  const description = first('$description')
  const deprecated = first('$deprecated')
  const extensions = first('$extensions')
  return {
    type: isTypeName(type) ? type : undefined,
    own: {
      ...(typeof description === 'string' ? { description } : {}),
      ...(typeof deprecated === 'boolean' || typeof deprecated === 'string' ? { deprecated } : {}),
      ...(typeof extensions === 'object' ? { extensions: extensions as JsonObject } : {}),
    },
  }
}
