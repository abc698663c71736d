import type { Request } from 'express'
import type { Caller, KeyCaller, UserCaller } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'

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

/**
 * Answers who is calling. A key beats a cookie, and a bad key is refused even beside a good session: a pipeline
 * must never get by on rights it did not mean to use.
 * @throws {AppError} `key-refused`, `sign-in-required`
 */
export async function authenticate(
  request: Request,
  identify: Identify,
  cookie: SessionCookie,
): Promise<Caller> {
  const field = request.headers.authorization
  if (field !== undefined) {
    const key = /^Bearer +(\S+) *$/i.exec(field)?.[1]
    const caller = key === undefined ? undefined : await identify.byKey(key)
    if (caller !== undefined) return caller
    throw new AppError('key-refused', { detail: 'The key is mistyped, expired or revoked' })
  }
  const token = cookieOf(request, cookie.name)
  const caller = token === undefined ? undefined : await identify.bySession(token)
  if (caller !== undefined) return caller
  throw new AppError('sign-in-required')
}
