import {
  type DtcgFault,
  fault,
  type JsonObject,
  objectOf,
  quoted,
  pointerTo,
} from './dtcg-fault.ts'

/** The types of the format module; case matters. */
export const DTCG_TYPES = [
  'color',
  'dimension',
  'fontFamily',
  'fontWeight',
  'duration',
  'cubicBezier',
  'number',
  'strokeStyle',
  'border',
  'transition',
  'shadow',
  'gradient',
  'typography',
] as const
/** One of the types. */
export type DtcgType = (typeof DTCG_TYPES)[number]

const TOKEN_MEMBERS = ['$value', '$ref', '$type', '$description', '$deprecated', '$extensions']
const GROUP_MEMBERS = ['$type', '$description', '$deprecated', '$extensions', '$extends', '$root']
/** The name of the token that a group itself is. */
export const ROOT_TOKEN = '$root'

/** Every group and token as written, before anything is inherited. */
export interface DtcgSurvey {
  /** Groups in document order, the document itself first. */
  readonly groups: readonly JsonObject[]
  /** The JSON pointer of a group or token. */
  readonly pointerOf: ReadonlyMap<JsonObject, string>
  readonly faults: readonly DtcgFault[]
}

/** Tells a token from a group: a token has a `$value` or a `$ref`. */
export function isToken(node: JsonObject): boolean {
  return Object.hasOwn(node, '$value') || Object.hasOwn(node, '$ref')
}

/** Gives the child group or token of that name, or nothing. */
export function childOf(group: JsonObject, name: string): JsonObject | undefined {
  return isChildName(name) && Object.hasOwn(group, name) ? objectOf(group[name]) : undefined
}

/** Lists the names of a group's children as written, `$root` among them. */
export function childNamesOf(group: JsonObject): string[] {
  return Object.keys(group).filter((name) => childOf(group, name) !== undefined)
}

/** Tells whether the format module has a type of that name; case matters. */
export function isTypeName(type: unknown): type is DtcgType {
  return DTCG_TYPES.some((known) => known === type)
}

/** Walks a document once, checks the members of every group and token, and reports every fault. */
export function surveyDocument(document: JsonObject): DtcgSurvey {
  const groups: JsonObject[] = []
  const pointerOf = new Map<JsonObject, string>([[document, '']])
  const faults: DtcgFault[] = []
  const waiting = [document]
  for (let node = waiting.pop(); node; node = waiting.pop()) {
    const pointer = pointerOf.get(node)!
    faults.push(...memberFaults(node, pointer))
    if (isToken(node)) {
      faults.push(...tokenFaults(node, pointer))
      continue
    }
    groups.push(node)
    const children: JsonObject[] = []
    for (const name of Object.keys(node)) {
      const at = pointerTo(pointer, name)
      faults.push(...childFaults(node, name, at))
      const child = childOf(node, name)
      if (!child) continue
      pointerOf.set(child, at)
      children.push(child)
    }
    for (const child of children.reverse()) waiting.push(child)
  }
  return { groups, pointerOf, faults }
}

function isChildName(name: string): boolean {
  return name === ROOT_TOKEN || (name !== '' && !name.startsWith('$') && !/[.{}]/.test(name))
}

function childFaults(group: JsonObject, name: string, at: string): DtcgFault[] {
  const child = objectOf(group[name])
  if (name === ROOT_TOKEN) {
    if (child && isToken(child)) return []
    return [fault('token-shape', at, '$root is a token: an object with $value or $ref.')]
  }
  if (GROUP_MEMBERS.includes(name)) return []
  // A member that begins with $ and holds a plain value may come from a later module: it is kept.
  if (name.startsWith('$') && !child) return []
  if (!isChildName(name)) {
    const rule = 'A name is not empty, does not begin with $ and has no ".", "{" or "}"'
    return name === '$defs' ? [] : [fault('name-invalid', at, `${rule}: ${quoted(name)}.`)]
  }
  return child ? [] : [fault('token-shape', at, 'Neither a group nor a token: not an object.')]
}

function tokenFaults(token: JsonObject, pointer: string): DtcgFault[] {
  const children = Object.keys(token)
    .filter((name) => !TOKEN_MEMBERS.includes(name) && objectOf(token[name]))
    .map((name) => fault('token-shape', pointerTo(pointer, name), 'A token has no children.'))
  if (pointer === '')
    children.push(fault('document-shape', '', 'A document is a group, not a token.'))
  if (Object.hasOwn(token, '$value') && Object.hasOwn(token, '$ref')) {
    children.push(fault('value-and-ref', pointer, '$value and $ref exclude each other.'))
  }
  return children
}

function memberFaults(node: JsonObject, pointer: string): DtcgFault[] {
  const { $type, $description, $deprecated, $extensions } = node
  const faults: DtcgFault[] = []
  if ($type !== undefined && !isTypeName($type)) {
    const known = DTCG_TYPES.join(', ')
    faults.push(fault('type-unknown', pointerTo(pointer, '$type'), `$type is one of ${known}.`))
  }
  if ($description !== undefined && typeof $description !== 'string') {
    faults.push(
      fault('description-type', pointerTo(pointer, '$description'), '$description is text.'),
    )
  }
  if ($deprecated !== undefined && !['boolean', 'string'].includes(typeof $deprecated)) {
    const detail = '$deprecated is true, false or text.'
    faults.push(fault('deprecated-type', pointerTo(pointer, '$deprecated'), detail))
  }
  if ($extensions !== undefined && !objectOf($extensions)) {
    faults.push(
      fault('extensions-type', pointerTo(pointer, '$extensions'), '$extensions is an object.'),
    )
  }
  return faults
}
