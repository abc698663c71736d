import { ApiError } from '#shared/client/client.ts'
import { NotACheck } from './check-call.ts'
import { EXIT, type ExitCode } from './exit-codes.ts'
import type { Plan } from './plan.ts'
import { placeOf } from './candidate.ts'
import { NoAnswer } from './send.ts'
import { plain } from './terminal-text.ts'

/** Why there is no verdict, in lines to print, and what the build is told. */
export interface Refusal {
  readonly exitCode: ExitCode
  readonly lines: readonly string[]
}

const exitCodeOf = (status: number): ExitCode => {
  if (status === 401 || status === 403) return EXIT.refused
  if (status === 429 || status < 400 || status > 499) return EXIT.noVerdict
  return EXIT.usage
}

const placedFaults = ({ problem }: ApiError, plan: Plan): string[] => {
  // What the wire calls errors may be anything: only what is a list of texts is printed.
  const errors: unknown = problem?.errors
  if (!Array.isArray(errors)) return []
  return errors.map(
    (fault: { pointer?: unknown; parameter?: unknown; detail?: unknown } | null) => {
      const { pointer, parameter, detail } = fault ?? {}
      const place = typeof pointer === 'string' ? placeOf(pointer, plan.candidate) : parameter
      return `  ${place === undefined || place === '' ? '' : `${place}: `}${detail}`
    },
  )
}

const hintOf = (status: number, plan: Plan): string[] => {
  if (status === 401 && plan.key === undefined) return ['DYEWRIGHT_KEY is not set.']
  if (status === 403) return ['The gate needs a key with the scope checks:write.']
  if (status === 404)
    return [`Is ${plan.system} a system of ${plan.baseUrl}, and the key one of its keys?`]
  return []
}

const answered = (error: ApiError, plan: Plan): string[] => {
  const { status, problem } = error
  const title = problem?.title ?? `The service answered ${status}`
  const detail = problem?.detail
  return [
    `${title} (${status}${error.code ? `, ${error.code}` : ''}).`,
    ...(detail && detail !== title ? [detail] : []),
    ...placedFaults(error, plan),
    ...hintOf(status, plan),
    ...(problem?.requestId ? [`Request ${problem.requestId}`] : []),
  ]
}

/** One line on what went wrong, for a retry's note. */
export function reasonOf(failure: unknown): string {
  if (failure instanceof ApiError) return `the service answered ${failure.status}`
  return failure instanceof NoAnswer ? plain(failure.message) : 'no answer'
}

/** Turns whatever ended the call into lines and an exit code; an unforeseen error gives no verdict. */
export function refusalOf(failure: unknown, plan: Plan): Refusal {
  if (failure instanceof ApiError) {
    const exitCode = exitCodeOf(failure.status)
    const ends = exitCode === EXIT.noVerdict ? ['No verdict, so the build does not pass.'] : []
    return { exitCode, lines: [...answered(failure, plan), ...ends].map(plain) }
  }
  const reason =
    failure instanceof NoAnswer || failure instanceof NotACheck
      ? failure.message
      : `The gate itself failed: ${failure instanceof Error ? failure.message : failure}`
  return {
    exitCode: EXIT.noVerdict,
    lines: [
      `${plan.baseUrl} gave no verdict, so the build does not pass.`,
      `${reason}${failure instanceof NoAnswer && failure.code === 'TIMEOUT' ? ` (${plan.timeoutMs / 1000} s).` : '.'}`,
    ].map(plain),
  }
}
