import express, { type Express } from 'express'
import type { Config } from './config.ts'
import { type ConsoleFiles, serveConsole } from './http/console-files.ts'
import { serveDocument } from './http/document.ts'
import { handleErrors, refuseUnknownPath } from './http/error-handler.ts'
import { serveGate } from './http/gate-file.ts'
import { setHeaders } from './http/headers.ts'
import { checkHost } from './http/origin.ts'
import { serveProblemPages } from './http/problem-pages.ts'
import { identifyRequests } from './http/request-id.ts'
import { logRequests } from './http/request-log.ts'
import { type ApiRouter, createExpressRouter } from './http/route.ts'
import { failureOf } from './platform/database-error.ts'
import type { Platform } from './services.ts'

/** What is served besides the API; what is absent is 404. */
export interface Files {
  /** The OpenAPI document, JSON text. */
  readonly document?: string
  readonly console?: ConsoleFiles
  /** The CI client, one file of JavaScript. */
  readonly gate?: string
}

export interface AppParts {
  readonly config: Config
  readonly router: ApiRouter
  readonly platform: Platform
  readonly files: Files
}

/** The Express app: what every request meets, in order. */
export function createApp({ config, router, platform, files }: AppParts): Express {
  const app = express()
  app.disable('x-powered-by')
  app.disable('etag')
  app.set('case sensitive routing', true)
  app.set('strict routing', true)
  app.set('trust proxy', config.trustedProxies)
  app.use(identifyRequests(platform.newId))
  app.use(logRequests(platform.logger))
  app.use(setHeaders(config.publicUrl))
  app.use(checkHost(config.publicUrl))
  app.use(createExpressRouter(router))
  if (files.document !== undefined) app.use(serveDocument(files.document, config.publicUrl))
  app.use(serveProblemPages())
  if (files.gate !== undefined) app.use(serveGate(files.gate))
  if (files.console !== undefined) app.use(serveConsole(files.console))
  app.use(refuseUnknownPath)
  app.use(handleErrors({ logger: platform.logger, translate: failureOf }))
  return app
}
