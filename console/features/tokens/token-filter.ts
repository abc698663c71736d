export const MARK_CHOICES = [
  { value: 'any', text: 'any mark' },
  { value: 'breach', text: 'a breach' },
  { value: 'waived', text: 'a waiver' },
  { value: 'exempt', text: 'an exemption' },
  { value: 'none', text: 'no mark' },
] as const

export const ORDER_CHOICES = [
  { value: 'ledger', text: 'ledger order' },
  { value: 'name', text: 'order of name' },
  { value: 'short', text: 'order of ratio, furthest short first' },
] as const

/** What the sentence over the ledger says; it lives in the address. */
export interface TokenFilter {
  /** Part of a name. */
  readonly named: string
  /** First name segment, or all. */
  readonly group: string
  readonly mark: (typeof MARK_CHOICES)[number]['value']
  /** Theme key, or all. */
  readonly theme: string
  readonly order: (typeof ORDER_CHOICES)[number]['value']
}

export const EVERY_TOKEN: TokenFilter = {
  named: '',
  group: 'all',
  mark: 'any',
  theme: 'all',
  order: 'ledger',
}

const known = <Value extends string>(
  choices: readonly { value: Value }[],
  text: string | null,
  fallback: Value,
): Value => choices.find((choice) => choice.value === text)?.value ?? fallback

export function readTokenFilter(search: URLSearchParams): TokenFilter {
  return {
    named: search.get('named') ?? EVERY_TOKEN.named,
    group: search.get('group') ?? EVERY_TOKEN.group,
    mark: known(MARK_CHOICES, search.get('mark'), EVERY_TOKEN.mark),
    theme: search.get('theme') ?? EVERY_TOKEN.theme,
    order: known(ORDER_CHOICES, search.get('order'), EVERY_TOKEN.order),
  }
}

/** Only what differs from the whole ledger stands in the address. */
export function writeTokenFilter(filter: TokenFilter): URLSearchParams {
  const search = new URLSearchParams()
  for (const [name, value] of Object.entries(filter)) {
    if (value !== EVERY_TOKEN[name as keyof TokenFilter]) search.set(name, value)
  }
  return search
}
