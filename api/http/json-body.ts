import { AppError, invalidRequest } from '#api/errors.ts'
import { pointerOf } from '#shared/contracts/faults.ts'

/** How deep a body may be nested. */
export const MOST_DEPTH = 32
/** How many members and elements a body may have, by its size limit. */
const MEMBERS_PER_MEBIBYTE = 125_000

const unreadable = (detail: string, cause?: unknown): AppError =>
  new AppError('request-unreadable', { detail, cause })

/**
 * Answers the value of a JSON body. Its encoding, depth and count are judged before anything walks it: a deep
 * text passes `JSON.parse` and overflows the stack of a validator.
 * @param limitBytes what the body may have had at most; the count it may have goes with it
 * @throws {AppError} `request-unreadable` for what is no such JSON
 * @see https://www.rfc-editor.org/rfc/rfc8259
 */
export function readJsonBody(bytes: Uint8Array, limitBytes: number): unknown {
  const text = readText(bytes)
  measure(text, Math.ceil((limitBytes / 2 ** 20) * MEMBERS_PER_MEBIBYTE))
  const value = parse(text)
  if (HALF_CHARACTER.test(text)) refuseHalfCharacters(value)
  if (PROTOTYPE_NAME.test(text)) refusePrototypeNames(value)
  return value
}

/**
 * Answers the text of a body; a byte order mark is no part of it.
 * @throws {AppError} `request-unreadable` for what is not UTF-8
 */
export function readText(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch (cause) {
    throw unreadable('The body is not UTF-8', cause)
  }
}

function parse(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch (cause) {
    throw unreadable('The body is not JSON', cause)
  }
}

const [QUOTE, BACKSLASH, COMMA] = [0x22, 0x5c, 0x2c]
const OPENING = new Set([0x5b, 0x7b])
const CLOSING = new Set([0x5d, 0x7d])

/** One pass over the text; what is inside strings does not count. */
function measure(text: string, mostMembers: number): void {
  let depth = 0
  let members = 0
  let isString = false
  for (let at = 0; at < text.length; at += 1) {
    const unit = text.charCodeAt(at)
    if (isString) {
      if (unit === BACKSLASH) at += 1
      else if (unit === QUOTE) isString = false
    } else if (unit === QUOTE) isString = true
    else if (unit === COMMA) members += 1
    else if (OPENING.has(unit)) {
      depth += 1
      members += 1
      if (depth > MOST_DEPTH) throw unreadable(`The body is nested deeper than ${MOST_DEPTH}`)
    } else if (CLOSING.has(unit)) depth -= 1
    if (members > mostMembers) throw unreadable(`The body has more than ${mostMembers} members`)
  }
}

/** The bytes were UTF-8, so only an escape can bring in half of a surrogate pair. */
const HALF_CHARACTER = /\\u[dD][89a-fA-F]/

/** What is no Unicode text can be neither stored nor sent back. @see https://www.rfc-editor.org/rfc/rfc8259#section-8.2 */
function refuseHalfCharacters(value: unknown): void {
  const detail = 'Half of a surrogate pair is no character'
  const faults = faultsWithin(value, (node, name) =>
    [node, name].some((text) => typeof text === 'string' && !isWellFormed(text)),
  ).map((pointer) => ({ pointer, detail }))
  if (faults.length > 0) throw new AppError('request-unreadable', { faults })
}

const isWellFormed = (text: string): boolean => !/\p{Surrogate}/u.test(text)

/** Also with its underscores escaped. */
const PROTOTYPE_NAME = /"(?:_|\\u005[fF]){2}proto/

/** A validator drops this name without a word, so it is refused aloud. */
function refusePrototypeNames(value: unknown): void {
  const detail = 'This name cannot be used'
  const pointers = faultsWithin(value, (_, name) => name === '__proto__')
  if (pointers.length > 0) throw invalidRequest(pointers.map((pointer) => ({ pointer, detail })))
}

/** Answers the pointers of the outermost members that are at fault. */
function faultsWithin(
  value: unknown,
  isFault: (node: unknown, name: string | undefined) => boolean,
): string[] {
  const pointers: string[] = []
  const walk = (node: unknown, path: readonly string[]): void => {
    if (isFault(node, path.at(-1))) pointers.push(pointerOf(path))
    else if (typeof node === 'object' && node !== null) {
      for (const [name, member] of Object.entries(node)) walk(member, [...path, name])
    }
  }
  walk(value, [])
  return pointers
}
