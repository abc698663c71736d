import type { ImportNoteWire } from '#shared/contracts/import-outcome.ts'
import { isToken, isTypeName } from '#shared/formats/dtcg-document.ts'
import { type JsonObject, objectOf, pointerTo } from '#shared/formats/dtcg-fault.ts'

const HEX = /^#(?:[\da-f]{3,4}|[\da-f]{6}|[\da-f]{8})$/i

/** A document with colour objects in place of hexadecimal text, and what was converted where. */
export interface Converted {
  readonly document: JsonObject
  readonly notes: readonly ImportNoteWire[]
}

interface Place {
  readonly pointer: string
  readonly type: unknown
}

/**
 * Reads colours as older files write them: a token of type color whose value is text such as `#1a73e8`. The
 * document given stays as it is.
 */
export function withColorObjects(given: JsonObject): Converted {
  const notes: ImportNoteWire[] = []
  return { document: convert(given, { pointer: '', type: undefined }, notes), notes }
}

function convert(node: JsonObject, { pointer, type }: Place, notes: ImportNoteWire[]): JsonObject {
  const own = isTypeName(node.$type) ? node.$type : type
  if (isToken(node)) return own === 'color' ? converted(node, pointer, notes) : node
  const into = (value: unknown, at: string): unknown => {
    const child = objectOf(value)
    return child ? convert(child, { pointer: at, type: own }, notes) : value
  }
  const members = Object.entries(node).map(([name, value]) => {
    const at = pointerTo(pointer, name)
    if (name.startsWith('$') && name !== '$root') return [name, value]
    // Sources of a resolver file are lists of documents.
    if (!Array.isArray(value)) return [name, into(value, at)]
    return [name, value.map((item, i) => into(item, pointerTo(at, i)))]
  })
  return Object.fromEntries(members)
}

function converted(token: JsonObject, pointer: string, notes: ImportNoteWire[]): JsonObject {
  const { $value } = token
  if (typeof $value !== 'string' || !HEX.test($value)) return token
  notes.push({
    kind: 'converted',
    pointer: `${pointer}/$value`,
    detail: `${$value} was read as an sRGB colour`,
  })
  return { ...token, $value: colorOf($value.slice(1).toLowerCase()) }
}

function colorOf(digits: string) {
  const full = digits.length < 6 ? [...digits].map((digit) => digit + digit).join('') : digits
  const bytes = (full.match(/../g) ?? []).map((pair) => Number.parseInt(pair, 16) / 255)
  const [r = 0, g = 0, b = 0, alpha = 1] = bytes
  return { colorSpace: 'srgb', components: [r, g, b], alpha, hex: `#${full.slice(0, 6)}` }
}
