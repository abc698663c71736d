import { type IRouter, Router } from 'express'
import { sha256Hex } from '#api/sha256.ts'
import { onlyReads } from './allow.ts'
import { isUnmodified } from './conditional.ts'

/** Serves the CI client to pipelines. */
export function serveGate(source: string): IRouter {
  const router = Router({ caseSensitive: true, strict: true })
  const etag = `"${sha256Hex(source).slice(0, 32)}"`
  router.all('/cli/dyewright.mjs', onlyReads)
  router.get('/cli/dyewright.mjs', (request, response) => {
    response.set({ ETag: etag, 'Cache-Control': 'no-cache' })
    if (isUnmodified(request.headers['if-none-match'], etag)) response.status(304).end()
    else response.type('text/javascript').send(source)
  })
  return router
}
