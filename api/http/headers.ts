import type { RequestHandler } from 'express'
import helmet from 'helmet'

type Directives = Readonly<Record<string, string[]>>

const STRICT: Directives = {
  'default-src': ["'self'"],
  'script-src': ["'self'"],
  'style-src': ["'self'"],
  'img-src': ["'self'"],
  'font-src': ["'self'"],
  'connect-src': ["'self'"],
  'object-src': ["'none'"],
  'base-uri': ["'none'"],
  'form-action': ["'self'"],
  'frame-ancestors': ["'none'"],
}

/** The API's own reference page brings a style element and images in data addresses. */
const REFERENCE: Directives = {
  ...STRICT,
  'style-src': ["'self'", "'unsafe-inline'"],
  'img-src': ["'self'", 'data:'],
}

const protect = (directives: Directives, isHttps: boolean): RequestHandler =>
  helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      // Without TLS this directive would turn every address of the page into one that nobody answers.
      directives: { ...directives, ...(isHttps ? { 'upgrade-insecure-requests': [] } : {}) },
    },
    strictTransportSecurity: isHttps ? { maxAge: 31_536_000, includeSubDomains: false } : false,
    referrerPolicy: { policy: 'same-origin' },
    xFrameOptions: { action: 'deny' },
  })

/** Sets the headers that every answer carries; no page may run inline script or be framed. */
export const setHeaders = (publicUrl: URL): RequestHandler =>
  protect(STRICT, publicUrl.protocol === 'https:')

/** The same for the reference page. */
export const setReferenceHeaders = (publicUrl: URL): RequestHandler =>
  protect(REFERENCE, publicUrl.protocol === 'https:')
