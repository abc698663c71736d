import { lowestFinding } from '#console/lib/lowest-finding.ts'
import { type Finding, USES, type Use } from '#shared/checks/model.ts'
import type { PairWire } from '#shared/contracts/pairs.contract.ts'
import { pairOutcome, reachOf } from './pair-outcomes.ts'

export const OUTCOME_CHOICES = [
  { value: 'any', text: 'whatever they come to' },
  { value: 'breach', text: 'that breach' },
  { value: 'waived', text: 'that are waived' },
  { value: 'pass', text: 'that pass' },
  { value: 'exempt', text: 'that are exempt' },
] as const

export const ORDER_CHOICES = [
  { value: 'declared', text: 'order of declaration' },
  { value: 'short', text: 'order of ratio, furthest short first' },
  { value: 'background', text: 'order of background' },
] as const

/** What the sentence over the pairs says; it lives in the address. */
export interface PairFilter {
  readonly use: Use | 'any'
  /** A product, all of them, or `none`: pairs that name no product. */
  readonly product: string
  /** Theme key, or all. */
  readonly theme: string
  readonly outcome: (typeof OUTCOME_CHOICES)[number]['value']
  /** A token's whole name on either side or in the backdrop, or nothing. */
  readonly token: string
  readonly order: (typeof ORDER_CHOICES)[number]['value']
}

export const EVERY_PAIR: PairFilter = {
  use: 'any',
  product: 'all',
  theme: 'all',
  outcome: 'any',
  token: '',
  order: 'declared',
}

const known = <Value extends string>(
  values: readonly Value[],
  text: string | null,
  fallback: Value,
): Value => values.find((value) => value === text) ?? fallback

const valuesOf = <Value extends string>(choices: readonly { readonly value: Value }[]) =>
  choices.map(({ value }) => value)

export function readPairFilter(search: URLSearchParams): PairFilter {
  return {
    use: known<PairFilter['use']>(USES, search.get('use'), 'any'),
    product: search.get('product') ?? EVERY_PAIR.product,
    theme: search.get('theme') ?? EVERY_PAIR.theme,
    outcome: known(valuesOf(OUTCOME_CHOICES), search.get('outcome'), EVERY_PAIR.outcome),
    token: search.get('token') ?? EVERY_PAIR.token,
    order: known(valuesOf(ORDER_CHOICES), search.get('order'), EVERY_PAIR.order),
  }
}

/** Only what differs from every pair stands in the address. */
export function writePairFilter(filter: PairFilter): URLSearchParams {
  const search = new URLSearchParams()
  for (const [name, value] of Object.entries(filter)) {
    if (value !== EVERY_PAIR[name as keyof PairFilter]) search.set(name, value)
  }
  return search
}

/** A pair as the table has it. */
export interface PairRowData {
  readonly pair: PairWire
  /** What is measured of it in the themes that the sentence names; none while it is being measured. */
  readonly findings: readonly Finding[] | undefined
  readonly lowest: Finding | undefined
}

/** The pairs that the sentence names, in its order, measured in its theme. */
export function chosenPairs(
  pairs: readonly PairWire[],
  measured: ReadonlyMap<string, readonly Finding[]> | undefined,
  { filter, themeId }: { filter: PairFilter; themeId: (key: string) => string | undefined },
): PairRowData[] {
  const theme = filter.theme === 'all' ? undefined : (themeId(filter.theme) ?? '')
  const rows = pairs
    .filter((pair) => isNamed(pair, filter))
    .map((pair): PairRowData => {
      const all = measured?.get(pair.id) ?? (measured === undefined ? undefined : [])
      const findings = theme === undefined ? all : all?.filter((finding) => finding.theme === theme)
      return { pair, findings, lowest: findings && lowestFinding(findings) }
    })
    .filter(({ findings }) => isMeasuredSo(findings, filter))
  return inOrder(rows, filter.order)
}

function isNamed(pair: PairWire, { use, product, theme, token }: PairFilter): boolean {
  const sides = [pair.foreground, pair.background, ...(backdropOf(pair) ?? [])]
  return (
    (use === 'any' || pair.use === use) &&
    (product === 'all' || (pair.product ?? 'none') === product) &&
    (theme === 'all' || (pair.themes?.includes(theme) ?? true)) &&
    (token === '' || sides.includes(token))
  )
}

function backdropOf({ backdrop }: PairWire): readonly string[] | undefined {
  return Array.isArray(backdrop) ? backdrop : undefined
}

function isMeasuredSo(findings: readonly Finding[] | undefined, { outcome }: PairFilter): boolean {
  if (outcome === 'any') return true
  return findings !== undefined && pairOutcome(findings) === outcome
}

function inOrder(rows: PairRowData[], order: PairFilter['order']): PairRowData[] {
  if (order === 'declared') return rows
  if (order === 'short') return rows.sort((a, b) => shortness(a) - shortness(b))
  return rows.sort((a, b) => compareText(a.pair.background, b.pair.background))
}

const shortness = ({ lowest }: PairRowData) =>
  lowest === undefined ? Number.MAX_VALUE : Math.min(reachOf(lowest), Number.MAX_VALUE / 2)

const compareText = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0)

/** The products that pairs name, in the order of the alphabet. */
export function productsOf(pairs: readonly PairWire[]): string[] {
  return [...new Set(pairs.flatMap(({ product }) => product ?? []))].sort(compareText)
}
