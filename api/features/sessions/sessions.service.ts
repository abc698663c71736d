import { sha256Hex } from '#api/sha256.ts'
import type { Caller, UserCaller } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { NewId } from '#api/platform/ids.ts'
import type { Passwords } from '#api/platform/passwords.ts'
import { newSessionToken } from '#api/platform/secrets.ts'
import type { Repositories, Transact } from '#api/repositories.ts'
import { normalizeEmail } from '#shared/contracts/email-address.ts'
import type { Role } from '#shared/contracts/permissions.ts'
import type { MeWire } from '#shared/contracts/sessions.contract.ts'
import { FREE_ATTEMPTS, waitSeconds } from './sign-in.rules.ts'

export interface SessionsDependencies {
  readonly transact: Transact<'accounts' | 'attempts' | 'audit' | 'sessions'>
  readonly reads: Pick<Repositories, 'accounts' | 'members' | 'sessions'>
  readonly newId: NewId
  readonly passwords: Passwords
}

export interface SignIn {
  readonly email: string
  readonly password: string
  /** Where the request came from. */
  readonly address: string
}

interface Person {
  readonly id: string
  readonly email: string
  readonly name: string
  readonly isAdmin: boolean
}

export type SessionsService = ReturnType<typeof createSessionsService>

export function createSessionsService({ transact, reads, newId, passwords }: SessionsDependencies) {
  const describe = async ({ id, email, name, isAdmin }: Person): Promise<MeWire> => ({
    user: { id, email, name, admin: isAdmin },
    roles: Object.fromEntries(
      (await reads.members.rolesOf(id)).map(({ key, role }): [string, Role] => [key, role]),
    ),
  })

  return {
    /** Whose the cookie is. */
    identify: async (token: string): Promise<UserCaller | undefined> => {
      const row = await reads.sessions.findLive(sha256Hex(token))
      if (row === undefined) return undefined
      const { isStale, ...person } = row
      if (isStale) await reads.sessions.touch(person.sessionId)
      return { kind: 'user', ...person }
    },

    /** @returns the cookie's value, kept nowhere, and who has signed in */
    signIn: async (attempt: SignIn): Promise<{ token: string; me: MeWire }> => {
      const email = normalizeEmail(attempt.email)
      const buckets = bucketsOf(email, attempt.address)
      await transact(({ attempts }) => countAttempt(attempts, buckets))
      const account = await reads.accounts.findByEmail(email)
      const isRight = await passwords.verify(account?.passwordHash, attempt.password)
      if (account === undefined || !isRight) throw new AppError('credentials-wrong')
      const token = newSessionToken()
      const id = newId('ses')
      await transact(async ({ attempts, sessions, audit }) => {
        await attempts.forget(buckets.account)
        await attempts.takeBack(buckets.address)
        await sessions.insert({ id, userId: account.id, tokenHash: sha256Hex(token) })
        const actor = { kind: 'user', id: account.id } as const
        await audit.append({ chain: 'instance', actor, action: 'session.started', subject: id })
      })
      return { token, me: await describe(account) }
    },

    signOut: async (caller: Caller): Promise<void> => {
      const { sessionId, userId } = personOf(caller)
      await transact(async ({ sessions, audit }) => {
        await sessions.end(sessionId)
        const actor = { kind: 'user', id: userId } as const
        await audit.append({
          chain: 'instance',
          actor,
          action: 'session.ended',
          subject: sessionId,
        })
      })
    },

    me: (caller: Caller): Promise<MeWire> => {
      const person = personOf(caller)
      return describe({ ...person, id: person.userId })
    },
  }
}

function personOf(caller: Caller): UserCaller {
  if (caller.kind === 'user') return caller
  throw new AppError('scope-missing', { detail: 'A key is no person: sign in' })
}

interface Buckets {
  readonly account: string
  readonly address: string
}

/** An account counts apart for each address, so that a stranger elsewhere cannot lock its owner out. */
const bucketsOf = (email: string, address: string): Buckets => ({
  account: `sign-in:${sha256Hex(`${email}\n${address}`)}`,
  address: `sign-in:${sha256Hex(address)}`,
})

/** Counted before the password is looked at: a thousand attempts at once are a thousand. */
async function countAttempt(attempts: Repositories['attempts'], buckets: Buckets): Promise<void> {
  const waits = [
    waitSeconds(await attempts.lock(buckets.account), FREE_ATTEMPTS.account),
    waitSeconds(await attempts.lock(buckets.address), FREE_ATTEMPTS.address),
  ]
  const retryAfterSeconds = Math.max(...waits)
  if (retryAfterSeconds > 0) {
    throw new AppError('requests-too-many', {
      detail: `Too many attempts: the next one is looked at in ${retryAfterSeconds} s`,
      retryAfterSeconds,
    })
  }
  await attempts.count(buckets.account)
  await attempts.count(buckets.address)
}
