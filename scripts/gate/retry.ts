import { ApiError } from '#shared/client/client.ts'
import { NoAnswer } from './send.ts'

const ATTEMPTS = 4
const FIRST_DELAY_MS = 500

/** Broken before an answer began: the service did not take the request, or may take it again. */
const PASSING_FAULTS = new Set(['ECONNREFUSED', 'ECONNRESET', 'EPIPE', 'EAI_AGAIN'])
const PASSING_STATUSES = new Set([429, 502, 503, 504])

const isPassing = (failure: unknown): boolean =>
  failure instanceof ApiError
    ? PASSING_STATUSES.has(failure.status)
    : failure instanceof NoAnswer && PASSING_FAULTS.has(failure.code)

/**
 * How long to wait before the next attempt, or undefined where another is of no use.
 * A check only records, so it may be sent again; what the service answered for good is never asked twice.
 * @param attempt attempts made so far, from 1
 * @returns milliseconds: what the service asked for, at least the doubling back-off
 */
export function delayBeforeRetry(
  failure: unknown,
  { attempt, remainingMs }: { readonly attempt: number; readonly remainingMs: number },
): number | undefined {
  if (attempt >= ATTEMPTS || !isPassing(failure)) return undefined
  const backOff = FIRST_DELAY_MS * 2 ** (attempt - 1)
  const asked = failure instanceof ApiError ? (failure.retryAfterSeconds ?? 0) * 1000 : 0
  const delay = Math.max(backOff, asked)
  return delay < remainingMs ? delay : undefined
}

/** Runs `attempt` until it succeeds or another attempt is of no use; then throws its last failure. */
export async function withRetries<T>(
  attempt: () => Promise<T>,
  {
    remainingMs,
    onRetry,
  }: {
    readonly remainingMs: () => number
    readonly onRetry: (failure: unknown, delayMs: number) => void
  },
): Promise<T> {
  for (let made = 1; ; made += 1) {
    try {
      return await attempt()
    } catch (failure) {
      const delay = delayBeforeRetry(failure, { attempt: made, remainingMs: remainingMs() })
      if (delay === undefined) throw failure
      onRetry(failure, delay)
      await new Promise((resolve) => setTimeout(resolve, delay))
    }
  }
}
