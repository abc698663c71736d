import type { BREACH_SORTS, BREACH_STATUSES } from '#shared/contracts/breach-filter.ts'

type Status = (typeof BREACH_STATUSES)[number]
type Sort = (typeof BREACH_SORTS)[number]

export const STATUS_CHOICES = [
  { value: 'current', text: 'open or waived' },
  { value: 'open', text: 'open' },
  { value: 'waived', text: 'waived' },
  { value: 'resolved', text: 'resolved' },
  { value: 'all', text: 'of any status' },
] as const

export const ORIGIN_CHOICES = [
  { value: 'any', text: 'on the head or in CI' },
  { value: 'head', text: 'on the head' },
  { value: 'ci', text: 'in CI' },
] as const

export const SORT_CHOICES = [
  { value: 'first-seen', text: 'oldest first' },
  { value: '-first-seen', text: 'newest first' },
  { value: 'shortfall', text: 'furthest short first' },
  { value: 'number', text: 'by number' },
] as const satisfies readonly { value: Sort; text: string }[]

/** What the sentence over the log says; it lives in the address. */
export interface BreachFilter {
  readonly status: (typeof STATUS_CHOICES)[number]['value']
  /** Theme key, or all. */
  readonly theme: string
  readonly origin: (typeof ORIGIN_CHOICES)[number]['value']
  readonly sort: Sort
}

export const EVERY_BREACH: BreachFilter = {
  status: 'current',
  theme: 'all',
  origin: 'any',
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
    origin: known(ORIGIN_CHOICES, search.get('seen'), EVERY_BREACH.origin),
    sort: known(SORT_CHOICES, search.get('order'), EVERY_BREACH.sort),
  }
}

/** Only what differs from the plain log stands in the address. */
export function writeBreachFilter(filter: BreachFilter): URLSearchParams {
  const search = new URLSearchParams()
  if (filter.status !== EVERY_BREACH.status) search.set('status', filter.status)
  if (filter.theme !== EVERY_BREACH.theme) search.set('theme', filter.theme)
  if (filter.origin !== EVERY_BREACH.origin) search.set('seen', filter.origin)
  if (filter.sort !== EVERY_BREACH.sort) search.set('order', filter.sort)
  return search
}

const STATUSES: { readonly [choice in BreachFilter['status']]: Status[] } = {
  current: ['open', 'waived'],
  open: ['open'],
  waived: ['waived'],
  resolved: ['resolved'],
  all: ['open', 'waived', 'resolved'],
}

/** The filter as the service takes it. */
export function queryOfFilter(filter: BreachFilter) {
  return {
    status: STATUSES[filter.status],
    ...(filter.theme === 'all' ? {} : { theme: filter.theme }),
    ...(filter.origin === 'any' ? {} : { origin: filter.origin }),
    sort: filter.sort,
  }
}
