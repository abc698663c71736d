import { dirname, isAbsolute, join } from 'node:path'
import type { GateFlags } from './command-line.ts'

/** Reads a file whole; a reason where it cannot be read. The gate hands in the disk, a test a table. */
export type ReadText = (
  path: string,
) => { readonly ok: true; readonly text: string } | { readonly ok: false; readonly reason: string }

export type Environment = Readonly<Record<string, string | undefined>>

export interface Source {
  repository?: string
  branch?: string
  commit?: string
  pipelineUrl?: string
}

/** Flags, environment and configuration file in one; paths as they open from the working directory. */
export interface Settings {
  url?: string
  system?: string
  against?: string
  tokens: readonly string[]
  pairs?: string
  newOnly: boolean
  format: readonly string[]
  source?: Source
}

export const CONFIGURATION_FILE = 'dyewright.json'

const SOURCE_KEYS = ['repository', 'branch', 'commit', 'pipelineUrl'] as const
const SOURCE_VARIABLES = {
  repository: 'DYEWRIGHT_SOURCE_REPOSITORY',
  branch: 'DYEWRIGHT_SOURCE_BRANCH',
  commit: 'DYEWRIGHT_SOURCE_COMMIT',
  pipelineUrl: 'DYEWRIGHT_SOURCE_PIPELINE_URL',
} as const satisfies Record<(typeof SOURCE_KEYS)[number], string>

const isText = (value: unknown): value is string => typeof value === 'string' && value !== ''
const isTexts = (value: unknown): value is string[] => Array.isArray(value) && value.every(isText)
export const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value)

const KINDS = {
  url: { wanted: 'a text', accepts: isText },
  system: { wanted: 'a text', accepts: isText },
  against: { wanted: 'a text', accepts: isText },
  tokens: {
    wanted: 'a file name or a list of them',
    accepts: (v: unknown) => isText(v) || isTexts(v),
  },
  pairs: { wanted: 'a file name', accepts: isText },
  newOnly: { wanted: 'true or false', accepts: (v: unknown) => typeof v === 'boolean' },
  format: {
    wanted: 'a format or a list of them',
    accepts: (v: unknown) => isText(v) || isTexts(v),
  },
  source: { wanted: 'an object of texts', accepts: isObject },
} as const

const isKey = (key: string): key is keyof typeof KINDS => Object.hasOwn(KINDS, key)

/** Parses JSON text, a byte order mark before it forgiven. */
export function readJson(
  path: string,
  read: ReadText,
): { readonly ok: true; readonly value: unknown } | { readonly ok: false; readonly fault: string } {
  const file = read(path)
  if (!file.ok) return { ok: false, fault: `${path} cannot be read: ${file.reason}` }
  try {
    return { ok: true, value: JSON.parse(file.text.replace(/^\uFEFF/, '')) }
  } catch (error) {
    return { ok: false, fault: `${path} is not JSON: ${(error as Error).message}` }
  }
}

const unknownKey = (path: string, key: string): string =>
  key === 'key'
    ? `${path}: a key does not belong in a file; it is read from DYEWRIGHT_KEY`
    : `${path}: unknown key ${JSON.stringify(key)}; known are ${Object.keys(KINDS).join(', ')}`

const faultsOf = (path: string, given: Record<string, unknown>): string[] => {
  const faults = Object.entries(given).flatMap(([key, value]) => {
    if (!isKey(key)) return [unknownKey(path, key)]
    return KINDS[key].accepts(value) ? [] : [`${path}: ${key} must be ${KINDS[key].wanted}`]
  })
  const source = isObject(given.source) ? Object.entries(given.source) : []
  for (const [key, value] of source) {
    if (!(SOURCE_KEYS as readonly string[]).includes(key)) {
      faults.push(`${path}: unknown key "source.${key}"; known are ${SOURCE_KEYS.join(', ')}`)
    } else if (!isText(value)) faults.push(`${path}: source.${key} must be a text`)
  }
  return faults
}

const readConfiguration = (
  named: string | undefined,
  read: ReadText,
): { given: Record<string, unknown>; folder: string; faults: string[] } => {
  const path = named ?? CONFIGURATION_FILE
  const nothing = { given: {}, folder: '', faults: [] }
  if (named === undefined && !read(path).ok) return nothing
  const json = readJson(path, read)
  if (!json.ok) return { ...nothing, faults: [json.fault] }
  if (!isObject(json.value)) return { ...nothing, faults: [`${path} must hold one JSON object`] }
  return { given: json.value, folder: dirname(path), faults: faultsOf(path, json.value) }
}

const listOf = (value: unknown): string[] => (isText(value) ? [value] : isTexts(value) ? value : [])

const sourceFrom = (given: unknown, env: Environment): Source | undefined => {
  const source: Source = { ...(given as Source | undefined) }
  for (const key of SOURCE_KEYS) {
    const value = env[SOURCE_VARIABLES[key]]
    if (value) source[key] = value
  }
  return Object.keys(source).length > 0 ? source : undefined
}

/**
 * Gathers what the run is to do. A flag beats the file; a file's paths start at its own folder.
 * Every fault is returned, none is thrown.
 */
export function settingsFrom(
  flags: GateFlags,
  env: Environment,
  read: ReadText,
):
  | { readonly ok: true; readonly settings: Settings }
  | { readonly ok: false; readonly faults: readonly string[] } {
  const { given, folder, faults } = readConfiguration(flags.config, read)
  if (faults.length > 0) return { ok: false, faults }
  const placed = (path: string) => (isAbsolute(path) ? path : join(folder, path))
  const placedFormat = (format: string) => {
    const [name, file] = splitFormat(format)
    return file === undefined ? format : `${name}=${placed(file)}`
  }
  const text = (key: 'url' | 'system' | 'against') =>
    flags[key] ?? (given[key] as string | undefined)
  const pairs =
    flags.pairs ?? (given.pairs === undefined ? undefined : placed(given.pairs as string))
  const source = sourceFrom(given.source, env)
  const [url, system, against] = [text('url'), text('system'), text('against')]
  return {
    ok: true,
    settings: {
      ...(url === undefined ? {} : { url }),
      ...(system === undefined ? {} : { system }),
      ...(against === undefined ? {} : { against }),
      tokens: flags.tokens ?? listOf(given.tokens).map(placed),
      ...(pairs === undefined ? {} : { pairs }),
      newOnly: flags.newOnly ?? (given.newOnly as boolean | undefined) ?? false,
      format: flags.format ?? listOf(given.format).map(placedFormat),
      ...(source === undefined ? {} : { source }),
    },
  }
}

/** `NAME=FILE` in its two parts, split at the first sign of equality. */
export function splitFormat(format: string): [name: string, file: string | undefined] {
  const at = format.indexOf('=')
  return at < 0 ? [format, undefined] : [format.slice(0, at), format.slice(at + 1)]
}
