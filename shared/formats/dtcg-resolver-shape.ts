import { cyclesOf } from './cycles.ts'
import {
  type DtcgFault,
  fault,
  type JsonObject,
  objectOf,
  quoted,
  pointerTo,
} from './dtcg-fault.ts'
import { readPointer } from './dtcg-path.ts'

/** A token document in a set or context, or a set that it names. */
export type ResolverSource =
  | { readonly kind: 'tokens'; readonly tokens: JsonObject; readonly pointer: string }
  | { readonly kind: 'set'; readonly name: string; readonly pointer: string }

/** A choice of one among named contexts. */
export interface ResolverModifier {
  readonly name: string
  readonly contexts: ReadonlyMap<string, readonly ResolverSource[]>
  readonly default?: string
}

/** One item of the resolution order, in the order of the file. */
export type ResolverStep = (
  | { readonly kind: 'set'; readonly name: string; readonly sources: readonly ResolverSource[] }
  | { readonly kind: 'modifier'; readonly modifier: ResolverModifier }
) & {
  /** The members that give no tokens, verbatim. */
  readonly besides: JsonObject
}

/** What a resolver file says, before any document is put together. */
export interface ResolverShape {
  readonly sets: ReadonlyMap<string, readonly ResolverSource[]>
  readonly order: readonly ResolverStep[]
  readonly faults: readonly DtcgFault[]
}

/**
 * Reads the sets, modifiers and order of a resolver file and checks every one of them.
 * @see https://www.designtokens.org/tr/2025.10/resolver/#syntax
 */
export function readResolverShape(file: JsonObject): ResolverShape {
  const faults: DtcgFault[] = []
  if (file.version !== '2025.10') {
    faults.push(fault('resolver-version', '/version', 'version is "2025.10".'))
  }
  if (file.name !== undefined && typeof file.name !== 'string') {
    faults.push(fault('document-shape', '/name', 'name is text.'))
  }
  faults.push(...wordFaults(file, ''))
  const setObjects = membersOf(file, 'sets', faults)
  const sets = new Map(
    setObjects.map(([name, set]) => [name, readSet(set, pointerTo('/sets', name), faults)]),
  )
  const modifiers = new Map(
    membersOf(file, 'modifiers', faults).map(([name, modifier]) => [
      name,
      readModifier(name, modifier, pointerTo('/modifiers', name), faults),
    ]),
  )
  const order = readOrder(file.resolutionOrder, { file, sets, modifiers }, faults)
  const inline = order.filter((step) => step.kind === 'set').map((step) => step.sources)
  const contexts = [...modifiers.values(), ...inlineModifiers(order)].map(
    ({ contexts }) => contexts,
  )
  for (const source of [sets, ...contexts]
    .flatMap((lists) => [...lists.values()])
    .concat(inline)
    .flat()) {
    if (source.kind !== 'set' || sets.has(source.name)) continue
    faults.push(
      fault('resolver-unresolved', source.pointer, `There is no set ${quoted(source.name)}.`),
    )
  }
  const namesIn = (name: string) => [
    ...new Set(
      (sets.get(name) ?? []).flatMap((source) => (source.kind === 'set' ? source.name : [])),
    ),
  ]
  for (const members of cyclesOf(sets.keys(), (name) =>
    namesIn(name).filter((to) => sets.has(to)),
  )) {
    const detail = `Sets refer to each other in a circle: ${members.slice(0, 8).join(', ')}.`
    for (const name of members)
      faults.push(fault('resolver-circular', pointerTo('/sets', name), detail))
  }
  return { sets, order, faults }
}

interface Known {
  readonly file: JsonObject
  readonly sets: ReadonlyMap<string, readonly ResolverSource[]>
  readonly modifiers: ReadonlyMap<string, ResolverModifier>
}

function inlineModifiers(order: readonly ResolverStep[]): ResolverModifier[] {
  return order.flatMap((step) => (step.kind === 'modifier' ? step.modifier : []))
}

function membersOf(file: JsonObject, member: string, faults: DtcgFault[]): [string, JsonObject][] {
  const value = file[member]
  if (value === undefined) return []
  const holder = objectOf(value)
  if (!holder) {
    faults.push(fault('document-shape', `/${member}`, `${member} is an object.`))
    return []
  }
  return Object.entries(holder).flatMap(([name, each]): [string, JsonObject][] => {
    const object = objectOf(each)
    const pointer = pointerTo(`/${member}`, name)
    faults.push(...(object ? wordFaults(object, pointer) : []))
    if (object) return [[name, object]]
    faults.push(fault('document-shape', pointer, 'Not an object.'))
    return []
  })
}

/** What a file, a set or a modifier says of itself. */
function wordFaults({ description, $extensions }: JsonObject, pointer: string): DtcgFault[] {
  const faults: DtcgFault[] = []
  if (description !== undefined && typeof description !== 'string') {
    faults.push(
      fault('description-type', pointerTo(pointer, 'description'), 'description is text.'),
    )
  }
  if ($extensions !== undefined && !objectOf($extensions)) {
    const at = pointerTo(pointer, '$extensions')
    faults.push(fault('extensions-type', at, '$extensions is an object.'))
  }
  return faults
}

const READ_MEMBERS = { set: ['sources'], modifier: ['contexts', 'default'] }

const besidesOf = (kind: ResolverStep['kind'], item: JsonObject, read: readonly string[]) =>
  Object.fromEntries(
    Object.entries(item).filter(
      ([member]) => !READ_MEMBERS[kind].includes(member) && !read.includes(member),
    ),
  )

function readSet(set: JsonObject, pointer: string, faults: DtcgFault[]): ResolverSource[] {
  if (Array.isArray(set.sources))
    return readSources(set.sources, pointerTo(pointer, 'sources'), faults)
  faults.push(fault('resolver-set', pointer, 'A set has an array of sources.'))
  return []
}

function readModifier(
  name: string,
  modifier: JsonObject,
  pointer: string,
  faults: DtcgFault[],
): ResolverModifier {
  const at = pointerTo(pointer, 'contexts')
  const entries = Object.entries(objectOf(modifier.contexts) ?? {})
  if (entries.length < 2) {
    faults.push(fault('resolver-contexts', at, 'A modifier has two contexts or more.'))
  }
  const contexts = new Map(
    entries.map(([context, sources]) => {
      const where = pointerTo(at, context)
      if (Array.isArray(sources)) return [context, readSources(sources, where, faults)]
      faults.push(fault('resolver-contexts', where, 'A context is an array of sources.'))
      return [context, []]
    }),
  )
  const chosen = modifier.default
  if (chosen === undefined) return { name, contexts }
  if (typeof chosen === 'string' && contexts.has(chosen)) return { name, contexts, default: chosen }
  faults.push(
    fault('resolver-default', pointerTo(pointer, 'default'), 'default names one of the contexts.'),
  )
  return { name, contexts }
}

function readSources(
  sources: readonly unknown[],
  pointer: string,
  faults: DtcgFault[],
): ResolverSource[] {
  return sources.flatMap((source: unknown, i): ResolverSource[] => {
    const at = pointerTo(pointer, i)
    const object = objectOf(source)
    if (!object) {
      faults.push(fault('document-shape', at, 'A source is a token document or a $ref to a set.'))
      return []
    }
    if (!Object.hasOwn(object, '$ref')) return [{ kind: 'tokens', tokens: object, pointer: at }]
    const target = readPointer(object.$ref)
    if (target?.[0] === 'sets' && target.length === 2) {
      // Members beside $ref override those of what it refers to.
      if (Object.hasOwn(object, 'sources')) return readSet(object, at, faults)
      return [{ kind: 'set', name: target[1]!, pointer: pointerTo(at, '$ref') }]
    }
    const detail = 'A source refers to a set of this file (#/sets/…), to nothing else.'
    faults.push(fault('resolver-pointer', pointerTo(at, '$ref'), detail))
    return []
  })
}

function readOrder(order: unknown, known: Known, faults: DtcgFault[]): ResolverStep[] {
  if (!Array.isArray(order)) {
    faults.push(fault('resolver-order', '', 'resolutionOrder is an array of sets and modifiers.'))
    return []
  }
  const names = new Set<string>()
  return order.flatMap((item: unknown, i): ResolverStep[] => {
    const pointer = `/resolutionOrder/${i}`
    const object = objectOf(item)
    faults.push(...(object ? wordFaults(object, pointer) : []))
    const step =
      object && Object.hasOwn(object, '$ref')
        ? referredStep(object, pointer, known, faults)
        : inlineStep(object, pointer, faults)
    if (!step) return []
    const name = step.kind === 'set' ? `set ${step.name}` : `modifier ${step.modifier.name}`
    if (names.has(name)) {
      faults.push(fault('resolver-name', pointer, `The ${quoted(name)} is in the order already.`))
    }
    names.add(name)
    return [step]
  })
}

function referredStep(
  item: JsonObject,
  pointer: string,
  { file, sets, modifiers }: Known,
  faults: DtcgFault[],
): ResolverStep | undefined {
  const at = pointerTo(pointer, '$ref')
  const target = readPointer(item.$ref)
  const [kind, name = ''] = target ?? []
  if (target?.length !== 2 || !(kind === 'sets' || kind === 'modifiers')) {
    faults.push(fault('resolver-pointer', at, '$ref is #/sets/… or #/modifiers/….'))
    return undefined
  }
  const sources = kind === 'sets' ? sets.get(name) : undefined
  // Members beside $ref override those of what it refers to.
  if (sources) {
    const own = Object.hasOwn(item, 'sources') ? readSet(item, pointer, faults) : sources
    const besides = besidesOf('set', { ...written(file.sets, name), ...item }, ['$ref'])
    return { kind: 'set', name, sources: own, besides }
  }
  const modifier = kind === 'modifiers' ? modifiers.get(name) : undefined
  if (modifier) {
    const overrides = item.contexts !== undefined || item.default !== undefined
    const whole = { ...written(file.modifiers, name), ...item }
    return {
      kind: 'modifier',
      modifier: overrides ? readModifier(name, whole, pointer, faults) : modifier,
      besides: besidesOf('modifier', whole, ['$ref']),
    }
  }
  faults.push(fault('resolver-unresolved', at, `There is no ${quoted(name)} in ${kind}.`))
  return undefined
}

function written(holder: unknown, name: string): JsonObject | undefined {
  return objectOf(objectOf(holder)?.[name])
}

function inlineStep(
  item: JsonObject | undefined,
  pointer: string,
  faults: DtcgFault[],
): ResolverStep | undefined {
  const name = item?.name
  if (!item || typeof name !== 'string' || !(item.type === 'set' || item.type === 'modifier')) {
    const detail = 'An item of the order is a $ref, or has a name and the type "set" or "modifier".'
    faults.push(fault('resolver-inline', pointer, detail))
    return undefined
  }
  const besides = besidesOf(item.type, item, ['name', 'type'])
  return item.type === 'set'
    ? { kind: 'set', name, sources: readSet(item, pointer, faults), besides }
    : { kind: 'modifier', modifier: readModifier(name, item, pointer, faults), besides }
}
