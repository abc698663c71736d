import { isObject, type ReadText, readJson } from './settings.ts'

/** A file that became part of the request's body. */
export interface CandidateFile {
  readonly path: string
  readonly document: unknown
}

/** What the request carries of the build, and which file each part of it came from. */
export interface Candidate {
  readonly tokens?: Readonly<Record<string, unknown>>
  readonly pairs?: readonly unknown[]
  readonly tokenFiles: readonly CandidateFile[]
  readonly pairsFile?: CandidateFile
  /** What the reader should know and no fault. */
  readonly notes: readonly string[]
}

type Node = Readonly<Record<string, unknown>>
type Overridden = (path: readonly string[]) => void

const isGroup = (value: unknown): value is Node =>
  isObject(value) && !Object.hasOwn(value, '$value') && !Object.hasOwn(value, '$ref')

const mergeGroups = (
  under: Node,
  over: Node,
  path: readonly string[],
  overridden: Overridden,
): Node => {
  const merged = new Map(Object.entries(under))
  for (const [name, value] of Object.entries(over)) {
    const at = [...path, name]
    const before = merged.get(name)
    if (!name.startsWith('$') && isGroup(before) && isGroup(value)) {
      merged.set(name, mergeGroups(before, value, at, overridden))
      continue
    }
    if (before !== undefined && JSON.stringify(before) !== JSON.stringify(value)) overridden(at)
    merged.set(name, value)
  }
  // fromEntries defines members one by one, so that even one called __proto__ stays a plain member.
  return Object.fromEntries(merged)
}

const mergeFiles = (files: readonly CandidateFile[]): { tokens: Node; notes: string[] } => {
  const notes: string[] = []
  let tokens: Node = {}
  for (const { path, document } of files) {
    tokens = mergeGroups(tokens, document as Node, [], (at) => {
      notes.push(`${at.join('.')} is set in two files; ${path} wins`)
    })
  }
  return { tokens, notes }
}

/** Reads the candidate's files; every fault is returned, none is thrown. */
export function candidateFrom(
  { tokens, pairs }: { readonly tokens: readonly string[]; readonly pairs?: string },
  read: ReadText,
):
  | { readonly ok: true; readonly candidate: Candidate }
  | { readonly ok: false; readonly faults: readonly string[] } {
  const faults: string[] = []
  const load = (path: string, wanted: string, accepts: (value: unknown) => boolean) => {
    const json = readJson(path, read)
    if (!json.ok) faults.push(json.fault)
    else if (!accepts(json.value)) faults.push(`${path} must hold ${wanted}`)
    return { path, document: json.ok ? json.value : undefined }
  }
  const tokenFiles = tokens.map((path) => load(path, 'one JSON object, a token document', isObject))
  const pairsFile =
    pairs === undefined ? undefined : load(pairs, 'a JSON array of pairs', Array.isArray)
  if (faults.length > 0) return { ok: false, faults }
  const { tokens: merged, notes } = mergeFiles(tokenFiles)
  return {
    ok: true,
    candidate: {
      ...(tokenFiles.length > 0 ? { tokens: merged } : {}),
      ...(pairsFile ? { pairs: pairsFile.document as unknown[], pairsFile } : {}),
      tokenFiles,
      notes,
    },
  }
}

const segmentsOf = (pointer: string): string[] =>
  pointer
    .split('/')
    .slice(1)
    .map((segment) => segment.replaceAll('~1', '/').replaceAll('~0', '~'))

const depthHeld = (document: unknown, segments: readonly string[]): number => {
  let here = document
  for (const [depth, segment] of segments.entries()) {
    if (typeof here !== 'object' || here === null || !Object.hasOwn(here, segment)) return depth
    here = (here as Record<string, unknown>)[segment]
  }
  return segments.length
}

/**
 * Says in which file a pointer into the request lies, and where there.
 * Of several token files it is the last that holds the longest part of the path.
 * @see https://www.rfc-editor.org/rfc/rfc6901
 */
export function placeOf(pointer: string, { tokenFiles, pairsFile }: Candidate): string {
  const [member, ...rest] = segmentsOf(pointer)
  const inFile = pointer.slice(`/${member ?? ''}`.length)
  const placed = (file: CandidateFile) => `${file.path}${inFile === '' ? '' : `#${inFile}`}`
  if (member === 'pairs' && pairsFile) return placed(pairsFile)
  if (member !== 'tokens' || tokenFiles.length === 0) return pointer
  const holders = tokenFiles.map((file) => ({ file, depth: depthHeld(file.document, rest) }))
  const deepest = holders.reduce((best, one) => (one.depth >= best.depth ? one : best))
  return placed(deepest.file)
}
