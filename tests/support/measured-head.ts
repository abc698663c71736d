import type { Call } from '#shared/client/client.ts'
import { BREACH_STATUSES } from '#shared/contracts/breach-filter.ts'
import { type BreachWire, listBreaches } from '#shared/contracts/breaches.contract.ts'
import { createCheck } from '#shared/contracts/checks.contract.ts'
import type { FindingWire } from '#shared/contracts/findings.ts'
import { type LedgerTokenWire, listTokens } from '#shared/contracts/tokens.contract.ts'

const params = { system: 'larkhaven' }

/** What the API says of the head: the same that the console shows, as JSON. */
export interface MeasuredHead {
  readonly tokens: ReadonlyMap<string, LedgerTokenWire>
  readonly findings: readonly FindingWire[]
  /** Of any status. */
  readonly breaches: readonly BreachWire[]
}

export async function measureHead(call: Call): Promise<MeasuredHead> {
  const [tokens, findings, breaches] = await Promise.all([
    call(listTokens, { params, query: { view: 'full', limit: 500 } }),
    measureWith(call),
    call(listBreaches, { params, query: { status: [...BREACH_STATUSES], limit: 200 } }),
  ])
  const items = tokens.body.items as LedgerTokenWire[]
  return {
    tokens: new Map(items.map((token) => [token.name, token])),
    findings,
    breaches: breaches.body.items,
  }
}

/** Every finding of the head, with these tokens laid over it. */
export async function measureWith(
  call: Call,
  tokens?: Record<string, unknown>,
): Promise<readonly FindingWire[]> {
  const { body } = await call(createCheck, {
    params,
    query: { findings: 'all' },
    body: tokens === undefined ? {} : { tokens },
  })
  return body.findings
}
