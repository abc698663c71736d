import { performance } from 'node:perf_hooks'
import type { IncrementResponse, Store } from 'express-rate-limit'
import type { RateCounter } from './rate-counter.ts'

/** So many requests in so long, for each bucket. */
export interface Budget {
  readonly limit: number
  readonly windowMs: number
  /** How many are taken from the counter at once; 1 counts every request exactly as it comes. */
  readonly lease: number
}

type Waiting = (counted: IncrementResponse | PromiseLike<never>) => void

/** What this process knows of one bucket. */
interface Holding {
  /** Requests that are paid for and not yet come. */
  left: number
  /** Hits of the window up to the last that was handed on. */
  hits: number
  /** The counter has no more to give before the window ends. */
  isSpent: boolean
  /** By the process's monotonic clock; never later than the database's. */
  endsAtMs: number
  isAsking: boolean
  readonly waiting: Waiting[]
}

const HELD_AT_LEAST = 10_000

/**
 * Keeps the budgets of a rate limit. Requests that come while the counter is being asked are counted together by
 * its next statement, and what is spent is refused without one. A lease is paid for before it is used, so that
 * over all processes no window ever gets more than its limit; what a process does not use of a lease is lost.
 * @returns a store for express-rate-limit; its keys are the counter's buckets
 */
export function createBudgetStore(counter: RateCounter, budget: Budget): Store {
  const holdings = new Map<string, Holding>()
  let sweepsAt = HELD_AT_LEAST

  const holdingOf = (bucket: string): Holding => {
    const held = holdings.get(bucket)
    if (held !== undefined) return held
    if (holdings.size >= sweepsAt) {
      sweep(holdings)
      sweepsAt = Math.max(HELD_AT_LEAST, holdings.size * 2)
    }
    const fresh = { left: 0, hits: 0, isSpent: false, endsAtMs: 0, isAsking: false, waiting: [] }
    holdings.set(bucket, fresh)
    return fresh
  }

  return {
    localKeys: false,
    increment: async (bucket) => {
      const holding = holdingOf(bucket)
      const paid = takePaid(holding, budget.limit)
      if (paid !== undefined) return paid
      const counted = new Promise<IncrementResponse>((resolve) => holding.waiting.push(resolve))
      if (!holding.isAsking) void ask({ counter, budget, bucket, holding })
      return counted
    },
    decrement: () => undefined,
    resetKey: (bucket) => void holdings.delete(bucket),
  }
}

function takePaid(holding: Holding, limit: number): IncrementResponse | undefined {
  const leftMs = holding.endsAtMs - performance.now()
  if (leftMs <= 0) return undefined
  const resetTime = new Date(Date.now() + leftMs)
  if (holding.left > 0) {
    holding.left -= 1
    holding.hits += 1
    return { totalHits: holding.hits, resetTime }
  }
  return holding.isSpent ? { totalHits: limit + 1, resetTime } : undefined
}

/** Whoever came while the counter was asked takes what is left of its answer. */
function servePaid(holding: Holding, limit: number): void {
  while (holding.waiting.length > 0) {
    const paid = takePaid(holding, limit)
    if (paid === undefined) return
    holding.waiting.shift()?.(paid)
  }
}

interface Asking {
  readonly counter: RateCounter
  readonly budget: Budget
  readonly bucket: string
  readonly holding: Holding
}

/** Asks the counter until nobody waits. */
async function ask({ counter, budget, bucket, holding }: Asking): Promise<void> {
  holding.isAsking = true
  for (;;) {
    servePaid(holding, budget.limit)
    const served = holding.waiting.splice(0)
    if (served.length === 0) break
    const wanted = Math.max(served.length, budget.lease)
    const askedMs = performance.now()
    try {
      const { hits, remainingMs } = await counter.add(bucket, wanted, budget.windowMs)
      const before = hits - wanted
      const granted = Math.min(wanted, Math.max(0, budget.limit - before))
      holding.left = Math.max(0, granted - served.length)
      holding.hits = before + served.length
      holding.isSpent = hits >= budget.limit
      holding.endsAtMs = askedMs + remainingMs
      const resetTime = new Date(Date.now() + remainingMs)
      for (const [at, answer] of served.entries()) {
        answer({ totalHits: before + at + 1, resetTime })
      }
    } catch (error) {
      for (const answer of served) answer(Promise.reject(error))
    }
  }
  holding.isAsking = false
}

function sweep(holdings: Map<string, Holding>): void {
  const nowMs = performance.now()
  for (const [bucket, { endsAtMs, isAsking }] of holdings) {
    if (endsAtMs <= nowMs && !isAsking) holdings.delete(bucket)
  }
}
