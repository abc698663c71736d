import type { CreateCheckBody } from '#shared/contracts/checks.contract.ts'
import { type Candidate, candidateFrom } from './candidate.ts'
import { readCommandLine } from './command-line.ts'
import { type Environment, type ReadText, settingsFrom, splitFormat } from './settings.ts'

export const FORMATS = ['text', 'json', 'sarif'] as const
export type Format = (typeof FORMATS)[number]

/** One output: a file, or the standard output. */
export interface Output {
  readonly format: Format
  readonly file?: string
}

/** Everything a run needs, decided before anything is sent. */
export interface Plan {
  readonly baseUrl: string
  readonly system: string
  readonly key?: string
  readonly body: CreateCheckBody
  readonly candidate: Candidate
  readonly outputs: readonly Output[]
  readonly timeoutMs: number
  readonly notes: readonly string[]
}

export type Planned =
  | { readonly kind: 'plan'; readonly plan: Plan }
  | { readonly kind: 'help'; readonly text: string }
  | { readonly kind: 'refused'; readonly faults: readonly string[] }

const DEFAULT_TIMEOUT_SECONDS = 60
const LOOPBACK = /^(localhost|127(\.\d+){3}|\[::1\])$/

const readUrl = (given: string | undefined, faults: string[]): URL | undefined => {
  if (given === undefined) {
    faults.push('Where is the service? Give --url, or url in dyewright.json')
    return undefined
  }
  const url = URL.canParse(given) ? new URL(given) : undefined
  if (!url || !/^https?:$/.test(url.protocol) || url.username || url.search || url.hash) {
    faults.push(`${JSON.stringify(given)} is no address of a service: http(s)://host[:port][/path]`)
    return undefined
  }
  return url
}

const readOutputs = (formats: readonly string[], faults: string[]): Output[] => {
  const outputs = (formats.length > 0 ? formats : ['text']).map((format) => {
    const [name, file] = splitFormat(format)
    const known = FORMATS.find((one) => one === name)
    if (!known)
      faults.push(`There is no format ${JSON.stringify(name)}; there is ${FORMATS.join(', ')}`)
    if (file === '') faults.push(`${format} names no file`)
    return { format: known ?? 'text', ...(file === undefined ? {} : { file }) }
  })
  const places = outputs.map(({ file }) => file ?? '')
  if (new Set(places).size < places.length) {
    faults.push('Two formats would go to one place; give each but one a file: json=check.json')
  }
  return outputs
}

const readKey = (env: Environment, faults: string[]): string | undefined => {
  const key = env.DYEWRIGHT_KEY?.trim()
  if (key && !/^[\x21-\x7e]+$/.test(key)) {
    faults.push('DYEWRIGHT_KEY holds characters that no key has')
  }
  return key || undefined
}

/**
 * Decides what to send and where the answer goes, from arguments, environment and files.
 * @returns a plan, the help text, or every reason why there is no plan
 */
export function planFrom(argv: readonly string[], env: Environment, read: ReadText): Planned {
  const line = readCommandLine(argv)
  if (line.kind === 'help') return line
  if (line.kind === 'refused') return { kind: 'refused', faults: line.text.trimEnd().split('\n') }
  const gathered = settingsFrom(line.flags, env, read)
  if (!gathered.ok) return { kind: 'refused', faults: gathered.faults }
  const { settings } = gathered
  const faults: string[] = []
  const url = readUrl(settings.url, faults)
  if (settings.system === undefined) {
    faults.push('Which design system? Give --system, or system in dyewright.json')
  }
  const outputs = readOutputs(settings.format, faults)
  const key = readKey(env, faults)
  const loaded = candidateFrom(settings, read)
  if (!loaded.ok) faults.push(...loaded.faults)
  if (!loaded.ok || url === undefined || settings.system === undefined || faults.length > 0) {
    return { kind: 'refused', faults }
  }
  const { candidate } = loaded
  const isExposed = url.protocol === 'http:' && key !== undefined && !LOOPBACK.test(url.hostname)
  const { against, newOnly, source } = settings
  return {
    kind: 'plan',
    plan: {
      baseUrl: url.href.replace(/\/+$/, ''),
      system: settings.system,
      ...(key === undefined ? {} : { key }),
      body: {
        ...(against === undefined ? {} : { against }),
        ...(candidate.tokens === undefined ? {} : { tokens: candidate.tokens }),
        // The service judges each pair; the gate only knows that it is a list.
        ...(candidate.pairs === undefined
          ? {}
          : { pairs: candidate.pairs as NonNullable<CreateCheckBody['pairs']> }),
        ...(newOnly ? { newOnly } : {}),
        ...(source === undefined ? {} : { source }),
      },
      candidate,
      outputs,
      timeoutMs: (line.flags.timeout ?? DEFAULT_TIMEOUT_SECONDS) * 1000,
      notes: [
        ...candidate.notes,
        ...(isExposed ? ['The key travels over plain http; use https'] : []),
      ],
    },
  }
}
