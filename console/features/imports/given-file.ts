import { MOST_FILE_BYTES } from '#shared/contracts/imports.contract.ts'

/** What a person chose, dropped or pasted. */
export interface GivenFile {
  /** None where it was pasted. */
  readonly name?: string
  readonly text: string
  readonly bytes: number
}

export type GivenContent =
  | { readonly ok: true; readonly content: Record<string, unknown> | string }
  | { readonly ok: false; readonly detail: string }

/** Reads the bytes of a file as text, or says why they are none. */
export async function readGivenFile(
  file: File,
): Promise<{ ok: true; given: GivenFile } | { ok: false; detail: string }> {
  if (file.size > MOST_FILE_BYTES) return { ok: false, detail: tooLarge(file.name, file.size) }
  try {
    const text = new TextDecoder('utf-8', { fatal: true }).decode(await file.arrayBuffer())
    return { ok: true, given: { name: file.name, text, bytes: file.size } }
  } catch (error) {
    return {
      ok: false,
      detail:
        error instanceof TypeError
          ? `${file.name} is not text in UTF-8.`
          : `${file.name} cannot be read any more. Choose it again.`,
    }
  }
}

export function pastedFile(text: string): GivenFile | undefined {
  return text.trim() === '' ? undefined : { text, bytes: new TextEncoder().encode(text).length }
}

/** A style sheet is its text; what begins as JSON, or is called so, is its document. */
export function contentOf({ name = '', text, bytes }: GivenFile): GivenContent {
  if (bytes > MOST_FILE_BYTES) return { ok: false, detail: tooLarge('What is pasted', bytes) }
  const isSheet = /\.css$/i.test(name) || (name === '' && !/^\s*[[{"]/.test(text))
  if (isSheet) return { ok: true, content: text }
  try {
    const content: unknown = JSON.parse(text)
    return typeof content === 'object' && content !== null && !Array.isArray(content)
      ? { ok: true, content: content as Record<string, unknown> }
      : { ok: false, detail: 'A token file is one JSON object, in braces.' }
  } catch (error) {
    // The browser's own words tell the place: a whole parser for one sentence would be too much.
    const place = error instanceof SyntaxError ? ` The browser says: ${error.message}.` : ''
    return { ok: false, detail: `This is not JSON.${place}` }
  }
}

const tooLarge = (what: string, bytes: number): string =>
  `${what} has ${sizeInWords(bytes)}; at most ${sizeInWords(MOST_FILE_BYTES)} are read.`

/** `12 KiB`, `1.4 MiB`; rounded up, so that what is over a limit never reads as the limit. */
export function sizeInWords(bytes: number): string {
  if (bytes < 1024) return `${bytes} bytes`
  if (bytes < 2 ** 20) return `${Math.ceil(bytes / 1024)} KiB`
  return `${Math.ceil((bytes / 2 ** 20) * 10) / 10} MiB`
}

/** Whether a content may bring themes that it does not say ground and ink of. */
export function mayBringThemes(content: Record<string, unknown> | string): boolean {
  if (typeof content === 'string') return true
  const { $extensions: extensions } = content
  const isOwn =
    typeof extensions === 'object' && extensions !== null && 'dev.dyewright' in extensions
  return 'resolutionOrder' in content && !isOwn
}
