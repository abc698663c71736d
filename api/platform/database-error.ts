import { DrizzleQueryError } from 'drizzle-orm'
import { AppError } from '#api/errors.ts'

interface DriverError extends Error {
  readonly code?: string
  readonly errno?: number
  readonly sqlState?: string
  readonly sqlMessage?: string
}

const DUPLICATE = 1062
/** Deadlock, lock wait time-out, changed since read: the transaction may be run again from its start. */
const RETRYABLE = new Set([1213, 1205, 1020])
/** Too many connections, shutdown in progress, killed, read-only, access not (yet) granted. */
const AWAY_ERRNOS = new Set([
  1040, 1045, 1049, 1053, 1158, 1159, 1160, 1161, 1203, 1290, 1317, 1927,
])
const AWAY_CODES = new Set([
  'ECONNREFUSED',
  'ECONNRESET',
  'ECONNABORTED',
  'EPIPE',
  'ETIMEDOUT',
  'EHOSTUNREACH',
  'ENETUNREACH',
  'ENOTFOUND',
  'EAI_AGAIN',
  'PROTOCOL_CONNECTION_LOST',
  'PROTOCOL_SEQUENCE_TIMEOUT',
  'PROTOCOL_ENQUEUE_AFTER_FATAL_ERROR',
  'PROTOCOL_ENQUEUE_AFTER_QUIT',
  'POOL_CLOSED',
  'ER_SERVER_SHUTDOWN',
])
const AWAY_MESSAGES =
  /^(Queue limit reached|Pool is closed|Can't add new command when connection is in closed state)/

const RETRY_AFTER_SECONDS = 2

/** A failed statement without its values: they may be anybody's data, and never get into a log. */
export class DatabaseError extends Error {
  override readonly name = 'DatabaseError'
  readonly errno: number | undefined
  /** Name of the unique key or constraint that refused. */
  readonly constraint: string | undefined

  constructor(error: DriverError, statement: string | undefined) {
    super(`${error.code ?? 'error'} (${error.errno ?? '?'}) ${statement ?? ''}`.trim())
    this.errno = error.errno
    this.constraint = constraintOf(error)
  }
}

const constraintOf = (error: DriverError): string | undefined =>
  /(?:for key|CONSTRAINT) ['`]([^'`]+)['`]/.exec(error.sqlMessage ?? '')?.[1]

const isDriverError = (error: unknown): error is DriverError =>
  error instanceof Error &&
  ('errno' in error || 'code' in error || AWAY_MESSAGES.test(error.message))

/** The driver's own error, which Drizzle wraps. */
const driverErrorOf = (error: unknown): DriverError | undefined => {
  const inner = error instanceof DrizzleQueryError ? error.cause : error
  return isDriverError(inner) ? inner : undefined
}

const errnoOf = (error: unknown): number | undefined =>
  error instanceof DatabaseError ? error.errno : driverErrorOf(error)?.errno

/** Whether the database gave the transaction up for reasons that a new attempt may not meet. */
export const isRetryable = (error: unknown): boolean => RETRYABLE.has(errnoOf(error) ?? 0)

/** Whether a unique key refused; with a name, whether that one did. */
export function isDuplicate(error: unknown, uniqueKey?: string): boolean {
  if (errnoOf(error) !== DUPLICATE) return false
  if (uniqueKey === undefined) return true
  const inner = driverErrorOf(error)
  return (
    (error instanceof DatabaseError ? error.constraint : inner && constraintOf(inner)) === uniqueKey
  )
}

const isAway = (error: DriverError): boolean =>
  AWAY_ERRNOS.has(error.errno ?? 0) ||
  AWAY_CODES.has(error.code ?? '') ||
  AWAY_MESSAGES.test(error.message)

/**
 * Answers what may be thrown on: a refusal or a bug as it is, an unreachable or overrun database as
 * `service-unavailable`, any other failed statement without its values.
 */
export function failureOf(error: unknown): unknown {
  const inner = driverErrorOf(error)
  if (inner === undefined) {
    return error instanceof DrizzleQueryError ? new DatabaseError(error, error.query) : error
  }
  const isStatement = error instanceof DrizzleQueryError || 'sqlState' in inner || 'sql' in inner
  if (isAway(inner) || RETRYABLE.has(inner.errno ?? 0)) {
    return new AppError('service-unavailable', {
      retryAfterSeconds: RETRY_AFTER_SECONDS,
      cause: new DatabaseError(inner, undefined),
    })
  }
  if (!isStatement) return error
  return new DatabaseError(inner, error instanceof DrizzleQueryError ? error.query : undefined)
}
