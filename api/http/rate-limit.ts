import { isIP } from 'node:net'
import type { Request, Response } from 'express'
import { ipKeyGenerator, rateLimit, type RateLimitInfo } from 'express-rate-limit'
import { AppError } from '#api/errors.ts'
import type { Logger } from '#api/platform/logger.ts'
import { createBudgetStore } from '#api/platform/rate-limit/budget-store.ts'
import type { RateCounter } from '#api/platform/rate-limit/rate-counter.ts'
import type { Contract } from '#shared/contracts/route.ts'

/** Whose budget a request is taken from. */
export type Payer = 'address' | 'key' | 'system'

/** Requests in a window, for each of those who pay. */
export interface RateBudgets {
  readonly windowMs: number
  readonly calls: Readonly<Record<Payer, number>>
  /** Of theme lists and theme files. */
  readonly themeReads: Readonly<Record<Payer, number>>
}

export interface RateLimitParts {
  readonly counter: RateCounter
  readonly logger: Logger
  readonly budgets: RateBudgets
}

export interface Paying {
  readonly contract: Contract
  readonly request: Request
  readonly response: Response
}

/** The rate limits of the service. */
export interface RateLimits {
  /**
   * Takes a request from the budget of the address it comes from.
   * @throws {AppError} `rate-limited`, with the seconds after which the window ends
   */
  ofAddress(paying: Paying): Promise<void>
  /** Takes it from the budget of a key, or of a system, by its id. */
  of(payer: 'key' | 'system', id: string, paying: Paying): Promise<void>
}

/** A process takes so many parts of a theme read's budget at once. */
const LEASE_PART = 20
const WHOSE: Readonly<Record<Payer, string>> = {
  address: 'this address',
  key: 'this key',
  system: 'this system',
}

type Limiter = (id: string, paying: Paying) => Promise<void>

/**
 * Budgets per address, key and system, shared by all processes. Calls are counted one by one; theme reads pay from
 * leases, so that they cost no query each, and go on while the counter cannot be reached.
 * @see https://datatracker.ietf.org/doc/draft-ietf-httpapi-ratelimit-headers
 */
export function createRateLimits({ counter, logger, budgets }: RateLimitParts): RateLimits {
  const { windowMs } = budgets
  const calls = limitersOf((payer) => {
    const budget = { limit: budgets.calls[payer], windowMs, lease: 1 }
    return createLimiter({ counter, logger }, { payer, kind: 'calls', budget })
  })
  const themeReads = limitersOf((payer) => {
    const limit = budgets.themeReads[payer]
    const budget = { limit, windowMs, lease: Math.max(1, Math.floor(limit / LEASE_PART)) }
    return createLimiter({ counter, logger }, { payer, kind: 'theme-reads', budget })
  })
  const spend = async (payer: Payer, id: string, paying: Paying): Promise<void> => {
    const { budget } = paying.contract
    if (budget !== 'none') await (budget === 'theme-reads' ? themeReads : calls)[payer](id, paying)
  }
  return {
    ofAddress: (paying) => spend('address', addressOf(paying.request), paying),
    of: spend,
  }
}

const limitersOf = (make: (payer: Payer) => Limiter): Record<Payer, Limiter> => ({
  address: make('address'),
  key: make('key'),
  system: make('system'),
})

/** Only a proxy of ours can name another address; an IPv6 network of one customer, /56, counts as one. */
const addressOf = ({ ip = '' }: Request): string =>
  isIP(ip) === 0 ? 'unknown' : ipKeyGenerator(ip)

interface Limit {
  readonly payer: Payer
  readonly kind: 'calls' | 'theme-reads'
  readonly budget: { readonly limit: number; readonly windowMs: number; readonly lease: number }
}

function createLimiter(
  { counter, logger }: Omit<RateLimitParts, 'budgets'>,
  { payer, kind, budget }: Limit,
): Limiter {
  const bucketOf = new WeakMap<Request, string>()
  const logWarning = (...about: unknown[]): void =>
    logger.warn({ err: about.find((one) => one instanceof Error), payer }, 'rate limit not counted')
  const limiter = rateLimit({
    windowMs: budget.windowMs,
    limit: budget.limit,
    store: createBudgetStore(counter, budget),
    keyGenerator: (request) => bucketOf.get(request) ?? '',
    identifier: payer,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    passOnStoreError: kind === 'theme-reads',
    handler: (request, _response, next) => next(refusalOf(payer, request as Limited)),
    // Its checks of a set-up print to the console, and each is decided here already.
    validate: false,
    logger: { warn: logWarning, error: logWarning },
  })
  return (id, { request, response }) => {
    bucketOf.set(request, `${kind}:${payer}:${id}`)
    return new Promise((resolve, reject) => {
      const next = (error?: unknown) => (error === undefined ? resolve() : reject(error))
      void limiter(request, response, next)
    })
  }
}

type Limited = Request & { readonly rateLimit: RateLimitInfo }

function refusalOf(payer: Payer, { rateLimit: { limit, resetTime } }: Limited): AppError {
  const leftMs = (resetTime?.getTime() ?? 0) - Date.now()
  const retryAfterSeconds = Math.max(1, Math.ceil(leftMs / 1000))
  return new AppError('rate-limited', {
    detail: `The budget of ${WHOSE[payer]}, ${limit} requests, is used up for ${retryAfterSeconds} s`,
    retryAfterSeconds,
  })
}
