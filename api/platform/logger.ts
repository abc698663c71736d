import { destination, pino } from 'pino'

/** The process's log: one JSON object a line. */
export type Logger = pino.Logger

export interface LoggerOptions {
  readonly level: string
  /** Where lines go; standard output unless a test listens. */
  readonly write?: (line: string) => void
}

/** Whatever an object under these names holds never gets into a line, however deep it came in. */
const SECRET_MEMBERS = ['password', 'authorization', 'cookie', 'key', 'token', 'secret']
const REDACTED = SECRET_MEMBERS.flatMap((name) => [name, `*.${name}`, `*.*.${name}`])

/** What is told of an error: no statement parameters, no request. Its message is the thrower's care. */
const describeError = (error: unknown): Record<string, unknown> => {
  if (!(error instanceof Error)) return { type: typeof error }
  const cause = error.cause instanceof Error ? describeError(error.cause) : undefined
  return {
    type: error.name,
    message: error.message,
    stack: error.stack,
    ...(cause === undefined ? {} : { cause }),
  }
}

export function createLogger({ level, write }: LoggerOptions): Logger {
  const options = {
    level,
    base: null,
    timestamp: pino.stdTimeFunctions.isoTime,
    formatters: { level: (label: string) => ({ level: label }) },
    serializers: { err: describeError },
    redact: { paths: REDACTED, censor: '(not logged)' },
  }
  return write === undefined
    ? pino(options, destination({ fd: 1, sync: true }))
    : pino(options, { write })
}
