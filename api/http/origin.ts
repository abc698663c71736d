import type { Request, RequestHandler } from 'express'
import { AppError } from '#api/errors.ts'

const LOOPBACK = /^(localhost|127(?:\.\d{1,3}){3}|\[::1\])$/

export const isLoopback = (hostname: string): boolean => LOOPBACK.test(hostname)

/** Name and port of a `Host` field; nothing where it is no such thing. */
function readHost(field: string | undefined): URL | undefined {
  if (field === undefined || !/^[\w.\-[\]:]+$/.test(field)) return undefined
  return URL.canParse(`http://${field}`) ? new URL(`http://${field}`) : undefined
}

/**
 * Refuses a `Host` that is neither a loopback name nor that of the public address: a page whose name was
 * re-pointed at this service would otherwise be its own origin.
 */
export const checkHost =
  (publicUrl: URL): RequestHandler =>
  (request, _response, next) => {
    const host = readHost(request.headers.host)
    const isKnown =
      host !== undefined && (isLoopback(host.hostname) || host.hostname === publicUrl.hostname)
    next(isKnown ? undefined : new AppError('host-unknown'))
  }

/**
 * Refuses what another site made a browser send. Cookies ignore ports, so SameSite alone does not: the browser's
 * own word counts, `Sec-Fetch-Site`, or `Origin` where that is absent. With neither it is no browser.
 * @throws {AppError} `origin-foreign`
 * @see https://www.w3.org/TR/fetch-metadata/#sec-fetch-site-header
 */
export function refuseForeignOrigin(request: Request, publicUrl: URL): void {
  const site = request.headers['sec-fetch-site']
  if (site !== undefined) {
    if (site === 'same-origin') return
    throw new AppError('origin-foreign')
  }
  const { origin } = request.headers
  if (origin === undefined || isOwnOrigin(origin, request, publicUrl)) return
  throw new AppError('origin-foreign')
}

function isOwnOrigin(origin: string, request: Request, publicUrl: URL): boolean {
  if (origin === publicUrl.origin) return true
  const host = readHost(request.headers.host)
  return host !== undefined && isLoopback(host.hostname) && origin === host.origin
}

/** A password over plain http is anybody's, except on the machine itself. */
export function refusePlainHttp(request: Request, publicUrl: URL): void {
  const host = readHost(request.headers.host)
  if (publicUrl.protocol === 'https:' || (host !== undefined && isLoopback(host.hostname))) return
  throw new AppError('origin-foreign', { detail: 'Signing in takes https' })
}
