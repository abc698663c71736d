/** What was counted of one account at one address, or of one address. */
export interface Attempts {
  readonly hits: number
  /** Since the last one; below 0 where that was counted while this one waited for its lock. */
  readonly elapsedMs: number
}

/** A person mistypes a few times; an address may have many persons behind it. */
export const FREE_ATTEMPTS = { account: 5, address: 40 } as const
const MOST_DELAY_SECONDS = 900

/** After the free ones each attempt has to wait twice as long as the one before. */
export function delaySeconds(hits: number, free: number): number {
  return hits < free ? 0 : Math.min(2 ** (hits - free), MOST_DELAY_SECONDS)
}

/** How long until the next attempt is looked at; 0: now. */
export const waitSeconds = ({ hits, elapsedMs }: Attempts, free: number): number =>
  Math.max(0, Math.ceil(delaySeconds(hits, free) - Math.max(0, elapsedMs) / 1000))
