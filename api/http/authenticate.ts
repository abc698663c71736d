import type { Request } from 'express'
import type { Caller, KeyCaller, UserCaller } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import { isApiKeyShaped } from '#api/platform/secrets.ts'

/** Who stands behind a credential; nothing where it is not, or no longer, good. */
export interface Identify {
  bySession(token: string): Promise<UserCaller | undefined>
  byKey(key: string): Promise<KeyCaller | undefined>
}

/** How the session's cookie is called here, and whether it may travel over plain http. */
export interface SessionCookie {
  readonly name: string
  readonly secure: boolean
}

/** `__Host-` binds the cookie to one host and to https; browsers refuse that prefix on plain http. */
export const sessionCookieFor = (publicUrl: URL): SessionCookie =>
  publicUrl.protocol === 'https:'
    ? { name: '__Host-dyewright', secure: true }
    : { name: 'dyewright', secure: false }

/** Answers the value of a cookie of the request. @see https://www.rfc-editor.org/rfc/rfc6265#section-5.4 */
export function cookieOf(request: Request, name: string): string | undefined {
  for (const part of (request.headers.cookie ?? '').split(';')) {
    const split = part.indexOf('=')
    if (split > 0 && part.slice(0, split).trim() === name) return part.slice(split + 1).trim()
  }
  return undefined
}

/** What a request says who it is with, not yet looked up. */
export type Credential =
  | { readonly kind: 'key'; readonly key: string }
  | { readonly kind: 'session'; readonly token: string }

/**
 * Answers the credential of a request; what cannot be one is told without a query. A key beats a cookie, and a bad
 * key is refused even beside a good session: a pipeline must never get by on rights it did not mean to use.
 * @throws {AppError} `key-refused`, `sign-in-required`
 */
export function readCredential(request: Request, cookie: SessionCookie): Credential {
  const field = request.headers.authorization
  if (field !== undefined) {
    const key = /^Bearer +(\S+) *$/i.exec(field)?.[1]
    if (key !== undefined && isApiKeyShaped(key)) return { kind: 'key', key }
    throw keyRefused()
  }
  const token = cookieOf(request, cookie.name)
  if (token !== undefined) return { kind: 'session', token }
  throw new AppError('sign-in-required')
}

/**
 * Answers who is calling.
 * @throws {AppError} `key-refused`, `sign-in-required`
 */
export async function authenticate(credential: Credential, identify: Identify): Promise<Caller> {
  if (credential.kind === 'key') {
    const caller = await identify.byKey(credential.key)
    if (caller !== undefined) return caller
    throw keyRefused()
  }
  const caller = await identify.bySession(credential.token)
  if (caller !== undefined) return caller
  throw new AppError('sign-in-required')
}

const keyRefused = (): AppError =>
  new AppError('key-refused', { detail: 'The key is mistyped, expired or revoked' })
