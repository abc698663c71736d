/** What is wrong with a design token document, by kind. */
export type DtcgFaultCode =
  | 'document-shape'
  | 'name-invalid'
  | 'name-duplicate'
  | 'member-unknown'
  | 'token-shape'
  | 'type-unknown'
  | 'type-missing'
  | 'type-mismatch'
  | 'description-type'
  | 'deprecated-type'
  | 'extensions-type'
  | 'value-missing'
  | 'value-and-ref'
  | 'alias-syntax'
  | 'alias-unresolved'
  | 'alias-not-token'
  | 'alias-circular'
  | 'pointer-syntax'
  | 'pointer-unresolved'
  | 'extends-syntax'
  | 'extends-unresolved'
  | 'extends-circular'
  | 'color-shape'
  | 'color-component'
  | 'color-range'
  | 'color-alpha'
  | 'color-hex'
  | 'resolver-version'
  | 'resolver-order'
  | 'resolver-set'
  | 'resolver-contexts'
  | 'resolver-default'
  | 'resolver-pointer'
  | 'resolver-unresolved'
  | 'resolver-circular'
  | 'resolver-name'
  | 'resolver-inline'
  | 'input-missing'
  | 'input-context'
  | 'input-unknown-modifier'
  | 'input-not-string'
  | 'too-many-contexts'
  | 'too-many-tokens'

/** One fault of a document. */
export interface DtcgFault {
  /** Where, from the value that was read. @see https://www.rfc-editor.org/rfc/rfc6901 */
  readonly pointer: string
  /** Why, one sentence. */
  readonly detail: string
  readonly code: DtcgFaultCode
}

/** An object as JSON has it, members not yet known. */
export interface JsonObject {
  readonly [member: string]: unknown
}

/** Gives `value` as an object with members, or nothing where it is an array or a plain value. */
export function objectOf(value: unknown): JsonObject | undefined {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
    ? (value as JsonObject)
    : undefined
}

/** Makes a fault; the empty pointer is the value itself. */
export function fault(code: DtcgFaultCode, pointer: string, detail: string): DtcgFault {
  return { pointer, detail, code }
}

/** The pointer of a member or an item. */
export function pointerTo(holder: string, member: string | number): string {
  return `${holder}/${segmentOf(String(member))}`
}

/** Escapes a member name. @see https://www.rfc-editor.org/rfc/rfc6901#section-3 */
function segmentOf(name: string): string {
  return name.replaceAll('~', '~0').replaceAll('/', '~1')
}

/** Text from a document inside a sentence: quoted, control characters escaped, cut at 80 characters. */
export function quoted(text: string): string {
  return JSON.stringify(text.length > 80 ? `${text.slice(0, 79)}…` : text)
}
