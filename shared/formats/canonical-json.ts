/**
 * The one text of a JSON value, whatever order its members were written in: members sorted by UTF-16 code
 * units, no white space, numbers as ECMAScript prints them. Members that are `undefined` are left out,
 * a date is its RFC 3339 text.
 * @throws {TypeError} for what JSON cannot hold (NaN, infinities, functions, bigint, `undefined` in an array)
 * @see https://www.rfc-editor.org/rfc/rfc8785
 * @example canonicalJson({ b: 1, a: [true, null] }) // '{"a":[true,null],"b":1}'
 */
export function canonicalJson(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`
  if (value instanceof Date) return JSON.stringify(value)
  if (typeof value === 'object' && value !== null) {
    const members = Object.entries(value)
      .filter(([, member]) => member !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([name, member]) => `${JSON.stringify(name)}:${canonicalJson(member)}`)
    return `{${members.join(',')}}`
  }
  if (typeof value === 'number' && !Number.isFinite(value)) {
    throw new TypeError(`JSON has no ${value}`)
  }
  const text = JSON.stringify(value)
  if (text === undefined) throw new TypeError(`JSON has no ${typeof value}`)
  return text
}
