import { type IRouter, Router } from 'express'
import swagger from 'swagger-ui-express'
import { sha256Hex } from '#api/sha256.ts'
import { onlyReads } from './allow.ts'
import { isUnmodified } from './conditional.ts'
import { setReferenceHeaders } from './headers.ts'
import { REFERENCE_LOOK } from './reference-look.ts'

const DOCUMENT_PATH = '/v1/openapi.json'

/** Serves the OpenAPI document and a page to try it on. */
export function serveDocument(document: string, publicUrl: URL): IRouter {
  const router = Router({ caseSensitive: true, strict: true })
  const etag = `"${sha256Hex(document).slice(0, 32)}"`
  router.all([DOCUMENT_PATH, '/docs', '/docs/{*any}'], onlyReads)
  router.get(DOCUMENT_PATH, (request, response) => {
    response.set({ ETag: etag, 'Cache-Control': 'no-cache' })
    if (isUnmodified(request.headers['if-none-match'], etag)) response.status(304).end()
    else response.type('application/json').send(document)
  })
  router.get('/docs', (_request, response) => response.redirect(308, '/docs/'))
  router.use(
    '/docs/',
    setReferenceHeaders(publicUrl),
    swagger.serve,
    // Set up once: two pages in one process would share their options.
    swagger.setup(undefined, {
      customSiteTitle: 'Dyewright API',
      customCss: REFERENCE_LOOK,
      swaggerOptions: { url: DOCUMENT_PATH },
    }),
  )
  return router
}
