import type { ImportNoteWire } from '#shared/contracts/import-outcome.ts'
import type { Fault } from '#shared/contracts/problems.ts'
import { type CssNote, readCssTokens } from '#shared/formats/css-tokens.ts'
import type { JsonObject } from '#shared/formats/dtcg-fault.ts'

export type StyleSheetReading =
  | { readonly ok: true; readonly document: JsonObject; readonly notes: readonly ImportNoteWire[] }
  | { readonly ok: false; readonly faults: readonly Fault[] }

interface Sheet {
  readonly hyphensAsDots: boolean
  readonly stands: (name: string) => boolean
}

/** Reads a style sheet as a document; what it says of lines is said in words, for it has no pointers. */
export function readStyleSheet(text: string, sheet: Sheet): StyleSheetReading {
  const read = readCssTokens(text, sheet)
  if (!read.ok) {
    return { ok: false, faults: read.faults.map((one) => ({ pointer: '', detail: said(one) })) }
  }
  const notes = read.leftOut.map((one) => ({
    kind: 'left-out' as const,
    pointer: '',
    detail: said(one),
    line: one.line,
  }))
  return { ok: true, document: read.document, notes }
}

const said = ({ line, property, detail }: CssNote): string =>
  property === undefined ? `Line ${line}: ${detail}` : `Line ${line}, ${property}: ${detail}`

/** About how many custom properties a style sheet declares; nothing of it is read. */
export const propertiesIn = (text: string): number =>
  text.split(/[;{}]/).filter((piece) => /^\s*--/.test(piece) && piece.includes(':')).length
