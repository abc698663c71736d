import express, { type IRouter, Router } from 'express'
import { onlyReads } from './allow.ts'

export interface ConsoleFiles {
  /** Folder of the built console. */
  readonly folder: string
  /** Its page, HTML text. */
  readonly page: string
}

const YEAR_MS = 365 * 24 * 60 * 60 * 1000
/** Never the page: `/v1` is the API's alone. */
const SERVICE_PATHS = /^\/(v1|cli|docs|problems|healthz|readyz|metrics|assets)(\/|$)/

/** Serves the built console; every address that asks for a page and is nobody else's gets its page. */
export function serveConsole({ folder, page }: ConsoleFiles): IRouter {
  const router = Router({ caseSensitive: true, strict: true })
  router.all('/assets/{*any}', onlyReads)
  router.use(
    '/assets',
    express.static(`${folder}/assets`, { immutable: true, maxAge: YEAR_MS, index: false }),
  )
  router.use(express.static(folder, { index: false, maxAge: 0 }))
  router.use((request, response, next) => {
    if (SERVICE_PATHS.test(request.path)) return next()
    onlyReads(request, response, () => {
      if (!request.accepts('text/html')) return next()
      response.set('Cache-Control', 'no-cache').type('html').send(page)
    })
  })
  return router
}
