import type * as z from 'zod'
import type { Fault } from './problems.ts'

type Issue = z.core.$ZodIssue
type Path = readonly PropertyKey[]

/** Where a value stood in the request: the body has pointers, the rest of a request has names. */
export type Place = 'body' | 'parameter'

/**
 * Answers every fault of a refused value, each at its own place; a member that is not known gets one of its own.
 * @param input what was refused: tells an absent member from one of the wrong type
 * @see https://www.rfc-editor.org/rfc/rfc6901
 */
export function faultsOf(error: z.ZodError, input: unknown, place: Place = 'body'): Fault[] {
  const spots = leadingIssues(error.issues).flatMap((issue) => spotsOf(issue, input, []))
  return spots.map(({ path, detail }) =>
    place === 'body'
      ? { pointer: pointerOf(path), detail }
      : { parameter: String(path[0]), detail: detail === UNKNOWN ? 'Unknown parameter' : detail },
  )
}

/** Answers the RFC 6901 pointer of a path. */
export const pointerOf = (path: Path): string =>
  path.map((step) => `/${String(step).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('')

/** Of a value of the wrong type its length or form says nothing more. */
function leadingIssues(issues: readonly Issue[]): Issue[] {
  const mistyped = new Set(
    issues.filter(({ code }) => code === 'invalid_type').map(({ path }) => pointerOf(path)),
  )
  return issues.filter(
    ({ code, path }) => code === 'invalid_type' || !mistyped.has(pointerOf(path)),
  )
}

const UNKNOWN = 'Unknown member'

interface Spot {
  readonly path: Path
  readonly detail: string
}

/** @param base path that the issue's own path starts from */
function spotsOf(issue: Issue, input: unknown, base: Path): Spot[] {
  const path = [...base, ...issue.path]
  switch (issue.code) {
    case 'unrecognized_keys':
      return issue.keys.map((key) => ({ path: [...path, key], detail: UNKNOWN }))
    case 'invalid_union':
      return issue.errors.length === 0
        ? [{ path, detail: issue.message }]
        : unionSpots(issue.errors, input, path)
    case 'invalid_key':
      return issue.issues.map((inner) => ({ path, detail: detailOf(inner, String(path.at(-1))) }))
    case 'invalid_element':
      return leadingIssues(issue.issues).flatMap((inner) => spotsOf(inner, input, path))
    default:
      return [{ path, detail: detailOf(issue, valueAt(input, path)) }]
  }
}

/**
 * Of a union, the branch that was most likely meant speaks: one that takes this type of value at all, then the
 * one that knows the most of its members, then the one with the fewest faults. Where no branch takes it, all say
 * what they take.
 */
function unionSpots(branches: readonly Issue[][], input: unknown, path: Path): Spot[] {
  const fitting = branches.filter((issues) => !issues.some(refusesWhole))
  const best = fitting
    .map((issues) => leadingIssues(issues).flatMap((issue) => spotsOf(issue, input, path)))
    .sort((a, b) => unknownIn(a) - unknownIn(b) || a.length - b.length)[0]
  if (best !== undefined) return best
  const value = valueAt(input, path)
  if (value === undefined) return [{ path, detail: 'Missing' }]
  const wanted = branches.flatMap((issues) => issues.filter(refusesWhole).map(wantedBy))
  return [{ path, detail: `Expected ${[...new Set(wanted)].join(' or ')}` }]
}

const unknownIn = (spots: readonly Spot[]): number =>
  spots.filter(({ detail }) => detail === UNKNOWN).length

/** Says that the value as a whole is of the wrong kind. */
const refusesWhole = (issue: Issue): boolean =>
  issue.path.length === 0 && (issue.code === 'invalid_type' || issue.code === 'invalid_value')

const wantedBy = (issue: Issue): string => {
  if (issue.code === 'invalid_type') return articled(issue.expected)
  if (issue.code === 'invalid_value')
    return issue.values.map((value) => JSON.stringify(value)).join(' or ')
  return issue.message
}

const TYPE_WORDS: Readonly<Record<string, string>> = {
  object: 'an object',
  record: 'an object',
  array: 'a list',
  int: 'a whole number',
  null: 'null',
  nan: 'a number',
  boolean: 'true or false',
  string: 'text',
}
const articled = (type: string): string => TYPE_WORDS[type] ?? `a ${type}`

const detailOf = (issue: Issue, value: unknown): string => {
  if (value === undefined && (issue.code === 'invalid_type' || issue.code === 'invalid_value')) {
    return 'Missing'
  }
  if (issue.code === 'invalid_type') return `Expected ${articled(issue.expected)}`
  if (issue.code === 'invalid_value') {
    return `Expected ${issue.values.map((one) => JSON.stringify(one)).join(' or ')}`
  }
  if (issue.code === 'too_small' || issue.code === 'too_big') return boundOf(issue)
  if (issue.message === 'Invalid URL')
    return 'Expected an absolute URL, such as https://ci.example/1'
  return issue.message
}

const UNITS: Readonly<Record<string, string>> = { string: 'character', array: 'item' }

/** Where the contract has no words of its own for a bound, the bound. */
function boundOf(issue: z.core.$ZodIssueTooSmall | z.core.$ZodIssueTooBig): string {
  if (!/^Too (?:small|big):/.test(issue.message)) return issue.message
  const isLeast = issue.code === 'too_small'
  const bound = isLeast ? issue.minimum : issue.maximum
  const [within, beyond] = isLeast ? ['at least', 'more than'] : ['at most', 'less than']
  const relation = issue.exact ? 'exactly' : issue.inclusive === false ? beyond : within
  const unit = UNITS[issue.origin]
  const counted = unit === undefined ? '' : ` ${unit}${Number(bound) === 1 ? '' : 's'}`
  return `Expected ${relation} ${bound}${counted}`
}

/** A value that was taken for a list of one stands for its element too. */
function valueAt(input: unknown, path: Path): unknown {
  let value = input
  for (const step of path) {
    if (typeof value !== 'object' || value === null) return value
    if (!Object.hasOwn(value, step)) return undefined
    value = (value as Record<PropertyKey, unknown>)[step]
  }
  return value
}
