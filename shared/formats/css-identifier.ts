/**
 * Decodes the escapes of a CSS identifier.
 * @returns what it names; code points that there are none of come back as U+FFFD
 * @see https://www.w3.org/TR/css-syntax-3/#consume-escaped-code-point
 * @example readCssIdentifier('--a\\/b') // '--a/b'
 */
export function readCssIdentifier(identifier: string): string {
  return identifier.replaceAll(
    /\\(?:([\da-f]{1,6})\s?|([\s\S]))/gi,
    (_, code: string | undefined, character: string | undefined) => {
      if (code === undefined) return character ?? ''
      const point = Number.parseInt(code, 16)
      const isNone = point === 0 || point > 0x10_ff_ff || (point >= 0xd8_00 && point <= 0xdf_ff)
      return isNone ? '\ufffd' : String.fromCodePoint(point)
    },
  )
}

/**
 * Writes every escape of a style sheet as six digits, which leave no character in it that a parser could take for
 * more than a letter. Lines stay where they are.
 * @see https://www.w3.org/TR/css-syntax-3/#escaping
 */
export function withPlainEscapes(text: string): string {
  return text.replaceAll(
    /\\(?:([\da-f]{1,6})[ \t]?|([^\da-f\r\n\f]))/giu,
    (...[whole, code, character = '', at]: [string, string?, string?, number?]) => {
      const digits = code ?? character.codePointAt(0)?.toString(16) ?? ''
      // A blank after an escape belongs to it, so one that does not comes second.
      const isBlankNext = /\s/.test(text.charAt((at ?? 0) + whole.length))
      return `\\${digits.padStart(6, '0')}${isBlankNext ? ' ' : ''}`
    },
  )
}
