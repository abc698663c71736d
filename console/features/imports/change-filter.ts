import type { ImportChangeWire } from '#shared/contracts/import-outcome.ts'

export const SHOW_CHOICES = [
  { value: 'all', text: 'every change' },
  { value: 'token', text: 'tokens' },
  { value: 'pair', text: 'pairs' },
  { value: 'theme', text: 'themes' },
  { value: 'distinct-set', text: 'distinct sets' },
  { value: 'rules', text: 'rules' },
  { value: 'settings', text: 'settings' },
  { value: 'other', text: 'what is no colour' },
] as const

export const DID_CHOICES = [
  { value: 'all', text: 'added, changed or removed' },
  { value: 'added', text: 'added' },
  { value: 'edited', text: 'changed' },
  { value: 'removed', text: 'removed' },
] as const

/** Which of the changes are listed; the address says it. */
export interface ChangeFilter {
  readonly show: (typeof SHOW_CHOICES)[number]['value']
  readonly did: (typeof DID_CHOICES)[number]['value']
}

export function readChangeFilter(search: URLSearchParams): ChangeFilter {
  const show = SHOW_CHOICES.find(({ value }) => value === search.get('show'))
  const did = DID_CHOICES.find(({ value }) => value === search.get('did'))
  return { show: show?.value ?? 'all', did: did?.value ?? 'all' }
}

export const chosenChanges = (
  changes: readonly ImportChangeWire[],
  { show, did }: ChangeFilter,
): ImportChangeWire[] =>
  changes.filter(
    ({ item, operation }) =>
      (show === 'all' || item === show) && (did === 'all' || operation === did),
  )
