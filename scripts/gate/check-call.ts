import { createClient } from '#shared/client/client.ts'
import type { CheckWire, createCheck } from '#shared/contracts/checks.contract.ts'
import { isObject } from './settings.ts'
import type { Plan } from './plan.ts'
import { createSend } from './send.ts'
import { withRetries } from './retry.ts'

/**
 * The contract's method and path without its schemas: the client needs no more, and Zod would double the
 * gate's start time. The assertion compiles only while these members agree with the contract's own.
 */
export const createCheckCall = {
  operationId: 'createCheck',
  method: 'POST',
  path: '/v1/systems/{system}/checks',
  success: { status: 200 },
} as typeof createCheck

/** The service answered with success, and with something that is no check. */
export class NotACheck extends Error {
  override readonly name = 'NotACheck'
}

/** Whether an answer carries a verdict that a build may be let through on. */
export function isCheck(answer: unknown): answer is CheckWire {
  return (
    isObject(answer) &&
    (answer.verdict === 'pass' || answer.verdict === 'fail') &&
    Array.isArray(answer.findings) &&
    isObject(answer.counts) &&
    isObject(answer.engine) &&
    isObject(answer.against)
  )
}

/**
 * Sends the plan's one check, again where that is safe, within the plan's time.
 * @throws {ApiError} {NoAnswer} {NotACheck} (rejects) where there is no verdict
 */
export async function requestCheck(
  plan: Plan,
  onRetry: (failure: unknown, delayMs: number) => void,
): Promise<CheckWire> {
  const endsAt = performance.now() + plan.timeoutMs
  const remainingMs = () => endsAt - performance.now()
  const call = createClient({
    baseUrl: plan.baseUrl,
    send: createSend(remainingMs),
    headers: {
      'user-agent': 'dyewright-gate',
      ...(plan.key === undefined ? {} : { authorization: `Bearer ${plan.key}` }),
    },
  })
  const query = { nearest: 'true' } as const
  const input = { params: { system: plan.system }, query, body: plan.body }
  const answer: unknown = await withRetries(
    async () => {
      try {
        return (await call(createCheckCall, input)).body
      } catch (error) {
        if (error instanceof SyntaxError) throw new NotACheck('The answer is not JSON')
        throw error
      }
    },
    { remainingMs, onRetry },
  )
  if (!isCheck(answer)) throw new NotACheck('The answer is no check')
  return answer
}
