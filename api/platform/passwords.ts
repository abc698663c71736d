import { randomBytes } from 'node:crypto'
import { hash, verify } from '@node-rs/argon2'
import { AppError } from '#api/errors.ts'

/** Cost of one evaluation of argon2id. */
export interface PasswordCost {
  readonly memoryKiB: number
  readonly passes: number
}

export interface Passwords {
  /** Answers the PHC string to keep. */
  hash(password: string): Promise<string>
  /** Whether the password belongs to the hash; without a hash it takes as long, and is never right. */
  verify(hashed: string | undefined, password: string): Promise<boolean>
}

/** 83 ms an evaluation on two cores. @see https://www.rfc-editor.org/rfc/rfc9106#section-4 */
export const FULL_COST: PasswordCost = { memoryKiB: 64 * 1024, passes: 3 }

const AT_ONCE = 2
const MOST_WAITING = 32

/** Visually equal passwords are equal bytes, whichever keyboard they came from. */
const bytesOf = (password: string): string => password.normalize('NFKC')

/**
 * Hashes with argon2id, two at a time: each holds its memory and a core, and a flood of sign-ins must not starve
 * reads. Beyond a short queue callers are refused.
 * @throws {AppError} (rejects) `service-unavailable`
 */
export function createPasswords(cost: PasswordCost = FULL_COST): Passwords {
  const options = { memoryCost: cost.memoryKiB, timeCost: cost.passes, parallelism: 1 }
  const inTurn = createTurns()
  let nobody: Promise<string> | undefined
  return {
    hash: (password) => inTurn(() => hash(bytesOf(password), options)),
    verify: (hashed, password) =>
      inTurn(async () => {
        nobody ??= hash(randomBytes(32), options)
        const isRight = await verify(hashed ?? (await nobody), bytesOf(password))
        return isRight && hashed !== undefined
      }),
  }
}

function createTurns() {
  const waiting: (() => void)[] = []
  let running = 0
  return async <T>(work: () => Promise<T>): Promise<T> => {
    if (running < AT_ONCE) running += 1
    else await queue(waiting)
    try {
      return await work()
    } finally {
      const next = waiting.shift()
      if (next === undefined) running -= 1
      else next()
    }
  }
}

function queue(waiting: (() => void)[]): Promise<void> {
  if (waiting.length >= MOST_WAITING) {
    throw new AppError('service-unavailable', {
      detail: 'Too many people are signing in at once',
      retryAfterSeconds: 3,
    })
  }
  return new Promise((resolve) => waiting.push(resolve))
}
