import { cyclesOf } from './cycles.ts'
import { childNamesOf, childOf, type DtcgSurvey, isToken } from './dtcg-document.ts'
import { type DtcgFault, fault, type JsonObject, pointerTo } from './dtcg-fault.ts'
import { readAlias, readPointer } from './dtcg-path.ts'

/** A group as its layers: what is written in it first, then what it inherits; or one token. */
export type Layers = readonly JsonObject[]

/** Where each group and token stands once `$extends` is applied, without copying anything. */
export interface DtcgLayers {
  readonly root: Layers
  /** A child of a group: its layers, or none where there is no such child. */
  readonly childLayers: (group: Layers, name: string) => Layers
  /** The names of a group's children, inherited ones in their place. */
  readonly namesOf: (group: Layers) => string[]
  readonly faults: readonly DtcgFault[]
}

type Targets = Map<JsonObject, readonly string[]>

const DEEPEST = 64

/** Applies `$extends` of every group, and reports each that cannot be: syntax, no such group, a cycle. */
export function layerDocument(document: JsonObject, survey: DtcgSurvey): DtcgLayers {
  const faults: DtcgFault[] = []
  const targets: Targets = new Map()
  const report = (group: JsonObject, code: DtcgFault['code'], detail: string) => {
    faults.push(fault(code, pointerTo(survey.pointerOf.get(group)!, '$extends'), detail))
    targets.delete(group)
  }
  for (const group of survey.groups) {
    if (!Object.hasOwn(group, '$extends')) continue
    const target = readTarget(group.$extends)
    if (target) targets.set(group, target)
    else report(group, 'extends-syntax', '$extends is {group} or a JSON pointer (#/group).')
  }
  for (const group of circularGroups(document, survey, targets)) {
    report(group, 'extends-circular', 'A group extends neither itself nor what contains it.')
  }
  const lookup = createLookup(document, targets)
  for (const [group, target] of [...targets]) {
    const found = lookup.layersAt(target)
    if (found.length > 0 && !isToken(found[0]!)) continue
    report(group, 'extends-unresolved', `There is no group ${target.join('.') || 'there'}.`)
  }
  for (const group of lookup.tooDeep) {
    const detail = `Groups extend each other to a depth of ${DEEPEST} at most.`
    report(group, 'extends-circular', detail)
  }
  return { root: lookup.layersAt([]), childLayers: lookup.childLayers, namesOf, faults }
}

function readTarget(reference: unknown): string[] | undefined {
  if (typeof reference !== 'string') return undefined
  return reference.startsWith('{') ? readAlias(reference) : readPointer(reference)
}

function namesOf(group: Layers): string[] {
  return group.length === 1
    ? childNamesOf(group[0]!)
    : [...new Set(group.toReversed().flatMap(childNamesOf))]
}

/** Groups whose `$extends` leads back to themselves, through what they extend or contain. */
function circularGroups(document: JsonObject, survey: DtcgSurvey, targets: Targets): JsonObject[] {
  if (targets.size === 0) return []
  const { layersAt } = createLookup(document, targets)
  const inherited = (group: JsonObject) => {
    const target = targets.get(group)
    return target ? layersAt(target) : []
  }
  const cycles = cyclesOf(survey.groups, (group) => [
    ...childNamesOf(group).map((name) => childOf(group, name)!),
    ...inherited(group),
  ])
  return cycles.flatMap((members) => {
    const cycle = new Set(members)
    return members.filter((group) => inherited(group).some((layer) => cycle.has(layer)))
  })
}

function createLookup(document: JsonObject, targets: Targets) {
  const known = new Map<string, Layers>()
  const underWay = new Set<string>()
  const tooDeep = new Set<JsonObject>()

  function layersAt(path: readonly string[]): Layers {
    const key = JSON.stringify(path)
    const found = known.get(key)
    if (found) return found
    if (underWay.has(key)) return []
    underWay.add(key)
    let layers = withInherited([document])
    for (const name of path) layers = childLayers(layers, name)
    underWay.delete(key)
    known.set(key, layers)
    return layers
  }

  function withInherited(groups: readonly JsonObject[]): Layers {
    const layers = new Set<JsonObject>()
    for (const group of groups) {
      layers.add(group)
      const target = targets.get(group)
      if (!target) continue
      const inherited = underWay.size > DEEPEST ? undefined : layersAt(target)
      if (!inherited || inherited.length > DEEPEST) tooDeep.add(group)
      else for (const layer of inherited) layers.add(layer)
    }
    return [...layers]
  }

  function childLayers(group: Layers, name: string): Layers {
    const children: JsonObject[] = []
    for (const layer of group) {
      const child = childOf(layer, name)
      if (!child) continue
      // The nearest layer decides: a token there is the whole token, and a token further off is replaced.
      if (!isToken(child)) children.push(child)
      else if (children.length === 0) return [child]
    }
    return withInherited(children)
  }

  return { layersAt, childLayers, tooDeep }
}
