import { IMPORT_MODES, type ImportWire } from '#shared/contracts/import-outcome.ts'

/** How a file is read; the address says it. */
export interface ImportOptions {
  readonly mode: ImportWire['mode']
  readonly legacyHex: boolean
  readonly hyphensAsDots: boolean
  /** Page background and text of themes whose file does not tell them; empty where nothing is said. */
  readonly ground: string
  readonly ink: string
}

export function readImportOptions(search: URLSearchParams): ImportOptions {
  const mode = IMPORT_MODES.find((each) => each === search.get('mode')) ?? 'merge'
  return {
    mode,
    legacyHex: search.get('legacyHex') === 'true',
    hyphensAsDots: search.get('hyphensAsDots') === 'true',
    ground: search.get('ground') ?? '',
    ink: search.get('ink') ?? '',
  }
}

/** The options as the API's own query, without what it takes anyway. */
export function queryOf({ mode, legacyHex, hyphensAsDots, ground, ink }: ImportOptions) {
  return {
    ...(mode === 'merge' ? {} : { mode }),
    ...(legacyHex ? { legacyHex: 'true' as const } : {}),
    ...(hyphensAsDots ? { hyphensAsDots: 'true' as const } : {}),
    ...(ground.trim() === '' ? {} : { ground: ground.trim() }),
    ...(ink.trim() === '' ? {} : { ink: ink.trim() }),
  }
}

/** Two readings with the same key come to the same. */
export const optionsKey = (options: ImportOptions): string => JSON.stringify(queryOf(options))
