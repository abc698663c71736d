export const BRANCH_CHOICES = [
  { value: 'any', text: 'any branch' },
  { value: 'protected', text: 'protected branches' },
  { value: 'other', text: 'other branches' },
] as const

export const SIGHTING_ORDERS = [
  { value: '-first-seen', text: 'newest first' },
  { value: 'first-seen', text: 'oldest first' },
  { value: '-last-seen', text: 'seen last first' },
] as const

/** What the sentence over the sightings says; it lives in the address. */
export interface SightingFilter {
  readonly branches: (typeof BRANCH_CHOICES)[number]['value']
  /** Theme key, or all. */
  readonly theme: string
  /** Whole name of a token. */
  readonly token: string
  readonly order: (typeof SIGHTING_ORDERS)[number]['value']
}

export const EVERY_SIGHTING: SightingFilter = {
  branches: 'any',
  theme: 'all',
  token: '',
  order: '-first-seen',
}

const known = <Value extends string>(
  choices: readonly { value: Value }[],
  text: string | null,
  fallback: Value,
): Value => choices.find((choice) => choice.value === text)?.value ?? fallback

export function readSightingFilter(search: URLSearchParams): SightingFilter {
  return {
    branches: known(BRANCH_CHOICES, search.get('branches'), EVERY_SIGHTING.branches),
    theme: search.get('theme') ?? EVERY_SIGHTING.theme,
    token: search.get('token') ?? EVERY_SIGHTING.token,
    order: known(SIGHTING_ORDERS, search.get('order'), EVERY_SIGHTING.order),
  }
}

/** Only what differs from the whole list stands in the address. */
export function writeSightingFilter(filter: SightingFilter): URLSearchParams {
  const search = new URLSearchParams()
  for (const [name, value] of Object.entries(filter)) {
    if (value !== EVERY_SIGHTING[name as keyof SightingFilter]) search.set(name, value)
  }
  return search
}

/** The filter as the service takes it. */
export function queryOfSightings({ branches, theme, token, order }: SightingFilter) {
  return {
    ...(branches === 'any'
      ? {}
      : { protected: branches === 'protected' ? ('true' as const) : ('false' as const) }),
    ...(theme === 'all' ? {} : { theme }),
    ...(token === '' ? {} : { token }),
    sort: order,
  }
}
