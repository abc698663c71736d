import type { BREACH_SORTS, BREACH_STATUSES } from '#shared/contracts/breach-filter.ts'
import { USES } from '#shared/checks/model.ts'

type Status = (typeof BREACH_STATUSES)[number]
type Sort = (typeof BREACH_SORTS)[number]

export const STATUS_CHOICES = [
  { value: 'current', text: 'open or waived' },
  { value: 'open', text: 'open' },
  { value: 'waived', text: 'waived' },
  { value: 'resolved', text: 'resolved' },
  { value: 'all', text: 'of any status' },
] as const

export const USE_CHOICES = [
  { value: 'any', text: 'any use' },
  ...USES.map((use) => ({ value: use, text: use.replaceAll('-', ' ') })),
] as const

export const ORIGIN_CHOICES = [
  { value: 'any', text: 'on the head or in CI' },
  { value: 'head', text: 'on the head' },
  { value: 'ci', text: 'in CI' },
] as const

export const AGE_CHOICES = [
  { value: 'any', text: 'at any time' },
  { value: 'week', text: 'in the last seven days' },
  { value: 'month', text: 'in the last 30 days' },
  { value: 'older', text: 'more than 30 days ago' },
] as const

export const SORT_CHOICES = [
  { value: 'first-seen', text: 'oldest first' },
  { value: '-first-seen', text: 'newest first' },
  { value: 'shortfall', text: 'furthest short first' },
  { value: 'ratio', text: 'least ratio first' },
  { value: 'lowest-ratio', text: 'least ratio ever first' },
  { value: '-resolved', text: 'resolved last first' },
  { value: 'number', text: 'by number' },
] as const satisfies readonly { value: Sort; text: string }[]

/** What the sentence over the log says; it lives in the address. */
export interface BreachFilter {
  readonly status: (typeof STATUS_CHOICES)[number]['value']
  /** Theme key, or all. */
  readonly theme: string
  readonly use: (typeof USE_CHOICES)[number]['value']
  /** Part of a token's name. */
  readonly token: string
  /** `anybody`, `me`, `none`, or a person's id. */
  readonly person: string
  readonly origin: (typeof ORIGIN_CHOICES)[number]['value']
  readonly age: (typeof AGE_CHOICES)[number]['value']
  readonly sort: Sort
}

export const EVERY_BREACH: BreachFilter = {
  status: 'current',
  theme: 'all',
  use: 'any',
  token: '',
  person: 'anybody',
  origin: 'any',
  age: 'any',
  sort: 'first-seen',
}

const known = <Value extends string>(
  choices: readonly { value: Value }[],
  text: string | null,
  fallback: Value,
): Value => choices.find((choice) => choice.value === text)?.value ?? fallback

export function readBreachFilter(search: URLSearchParams): BreachFilter {
  return {
    status: known(STATUS_CHOICES, search.get('status'), EVERY_BREACH.status),
    theme: search.get('theme') ?? EVERY_BREACH.theme,
    use: known(USE_CHOICES, search.get('use'), EVERY_BREACH.use),
    token: search.get('token') ?? EVERY_BREACH.token,
    person: search.get('with') ?? EVERY_BREACH.person,
    origin: known(ORIGIN_CHOICES, search.get('seen'), EVERY_BREACH.origin),
    age: known(AGE_CHOICES, search.get('since'), EVERY_BREACH.age),
    sort: known(SORT_CHOICES, search.get('order'), EVERY_BREACH.sort),
  }
}

const NAMES: { readonly [member in keyof BreachFilter]: string } = {
  status: 'status',
  theme: 'theme',
  use: 'use',
  token: 'token',
  person: 'with',
  origin: 'seen',
  age: 'since',
  sort: 'order',
}

/** Only what differs from the plain log stands in the address. */
export function writeBreachFilter(filter: BreachFilter): URLSearchParams {
  const search = new URLSearchParams()
  for (const member of Object.keys(NAMES) as (keyof BreachFilter)[]) {
    if (filter[member] !== EVERY_BREACH[member]) search.set(NAMES[member], filter[member])
  }
  return search
}

const STATUSES: { readonly [choice in BreachFilter['status']]: Status[] } = {
  current: ['open', 'waived'],
  open: ['open'],
  waived: ['waived'],
  resolved: ['resolved'],
  all: ['open', 'waived', 'resolved'],
}

const DAY_MS = 86_400_000

/** The moment so many days before. */
const daysBefore = (now: Date, days: number) =>
  new Date(now.getTime() - days * DAY_MS).toISOString()

function queryOfAge(age: BreachFilter['age'], now: Date) {
  if (age === 'week') return { since: daysBefore(now, 7) }
  if (age === 'month') return { since: daysBefore(now, 30) }
  return age === 'older' ? { before: daysBefore(now, 30) } : {}
}

/** The filter as the service takes it. */
export function queryOfFilter(filter: BreachFilter, now = new Date()) {
  const { theme, use, token, person, origin } = filter
  return {
    status: STATUSES[filter.status],
    ...(theme === 'all' ? {} : { theme }),
    ...(use === 'any' ? {} : { use }),
    ...(token.trim() === '' ? {} : { q: token.trim() }),
    ...(person === 'anybody' ? {} : { assignee: person }),
    ...(origin === 'any' ? {} : { origin }),
    ...queryOfAge(filter.age, now),
    sort: filter.sort,
  }
}
