// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what it looks for
const ESCAPES = /\u001b\[[0-?]*[ -/]*[@-~]|\u001b\][^\u0007\u001b]*(?:\u0007|\u001b\\)?|\u001b./g
// biome-ignore lint/suspicious/noControlCharactersInRegex: the same
const CONTROLS = /[\u0000-\u001f\u007f-\u009f\u200e\u200f\u2028-\u202e\u2066-\u2069]/g

/**
 * Text from the wire as a terminal may show it: without escape sequences, control characters, line breaks
 * and direction marks, so that a token's name can neither paint nor hide a line.
 */
export function plain(text: string): string {
  return text.replace(ESCAPES, '').replace(CONTROLS, '')
}

const WIDE =
  /[\p{sc=Han}\p{sc=Hiragana}\p{sc=Katakana}\p{sc=Hangul}\p{Emoji_Presentation}\uff01-\uff60]/u
const graphemes = new Intl.Segmenter('en', { granularity: 'grapheme' })

const columnsOf = (grapheme: string): number => (WIDE.test(grapheme) ? 2 : 1)

/** How much of a text fits, in UTF-16 units: to the last space or dot in the width, else to its end. */
const fitting = (text: string, width: number): number => {
  let columns = 0
  let end = 0
  let seam = 0
  for (const { segment, index } of graphemes.segment(text)) {
    columns += columnsOf(segment)
    if (columns > width && end > 0) return seam > 0 ? seam : end
    end = index + segment.length
    if (segment === ' ') seam = end
    if (segment === '.' && index > 0) seam = index
  }
  return text.length
}

/** Folds a text to a width in columns, at a space or before a dot where there is one; nothing is left out. */
export function folded(text: string, width: number): string[] {
  const lines: string[] = []
  let rest = text
  for (let end = fitting(rest, width); end < rest.length; end = fitting(rest, width)) {
    lines.push(rest.slice(0, end).trimEnd())
    rest = rest.slice(end)
  }
  return [...lines, rest]
}
