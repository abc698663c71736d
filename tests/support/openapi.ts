import { Ajv2020 } from 'ajv/dist/2020.js'
import addFormats from 'ajv-formats'
import { createDocument } from '#openapi/document.ts'

/** One answer of the service as it came over the wire. */
export interface WireAnswer {
  readonly method: string
  /** Path and query. */
  readonly url: string
  readonly status: number
  /** Names in lower case. */
  readonly headers: Readonly<Record<string, string | undefined>>
  readonly text: string
}

const document = JSON.parse(JSON.stringify(createDocument())) as {
  readonly paths: Record<string, Record<string, Operation>>
  readonly components: { readonly responses: Record<string, Described> }
}

interface Described {
  readonly $ref?: string
  readonly content?: Record<string, unknown>
  readonly headers?: Record<string, unknown>
}
interface Operation {
  readonly operationId: string
  readonly responses: Record<string, Described>
}

const DOCUMENT_ID = 'urn:dyewright:openapi'
const ajv = new Ajv2020({ strict: false, allErrors: true })
addFormats.default(ajv)
ajv.addSchema({ ...document, $id: DOCUMENT_ID })

const escapeStep = (step: string): string =>
  encodeURIComponent(step.replaceAll('~', '~0').replaceAll('/', '~1'))
const pointer = (...steps: readonly string[]): string => `#/${steps.map(escapeStep).join('/')}`

const JSON_MEDIA: readonly string[] = ['application/json', 'application/sarif+json']
const PROBLEM_MEDIA = 'application/problem+json'

/** Narrow templates first: a literal beats a file name, a file name beats a parameter. */
const templates = Object.keys(document.paths)
  .map((path) => ({
    path,
    pattern: new RegExp(
      `^${path
        .replace('{theme}.{format}', '{theme}\u0000{format}')
        .replaceAll('.', '\\.')
        .replace('{theme}\u0000{format}', '[^/.]+\\.[^/]+')
        .replace(/\{\w+\}/g, '[^/]+')}$`,
    ),
    parameters: path.split('{').length - 1 - (path.endsWith('.{format}') ? 1.5 : 0),
  }))
  .sort((a, b) => a.parameters - b.parameters)

const schemaErrors = (reference: string, value: unknown): string | undefined => {
  const validate = ajv.getSchema(DOCUMENT_ID + reference)
  if (validate === undefined) throw new TypeError(`The document has no ${reference}`)
  return validate(value) ? undefined : ajv.errorsText(validate.errors, { separator: '\n  ' })
}

const templateOf = (path: string, method: string) =>
  templates.find(
    ({ pattern, path: template }) =>
      pattern.test(path) && document.paths[template]?.[method] !== undefined,
  )?.path

/**
 * Answers everything in which an answer is not what the document says; nothing where it is.
 * Pages and files besides the API are not in the document: of them only problems are judged.
 */
export function contradictions(answer: WireAnswer): string[] {
  const path = answer.url.split('?', 1)[0] ?? ''
  const method = answer.method === 'HEAD' ? 'get' : answer.method.toLowerCase()
  const media = (answer.headers['content-type'] ?? '').split(';', 1)[0] ?? ''
  const template = templateOf(path, method)
  const about = `${answer.method} ${answer.url} → ${answer.status}`
  const found: string[] = []
  if (answer.headers['x-request-id'] === undefined) found.push('has no X-Request-Id')
  if (answer.status >= 400) found.push(...problemContradictions(answer, media))
  if (template !== undefined)
    found.push(...operationContradictions(answer, template, method, media))
  return found.map((what) => `${about}: ${what}`)
}

function problemContradictions({ text, status, method }: WireAnswer, media: string): string[] {
  if (media !== PROBLEM_MEDIA) return [`is no problem document but ${media}`]
  if (method === 'HEAD') return []
  const problem = JSON.parse(text) as { status?: unknown; type?: unknown }
  const errors = schemaErrors(pointer('components', 'schemas', 'Problem'), problem)
  return [
    ...(errors === undefined ? [] : [errors]),
    ...(problem.status === status ? [] : [`its problem says ${problem.status}`]),
  ]
}

function operationContradictions(
  { status, text, headers, method: sent }: WireAnswer,
  template: string,
  method: string,
  media: string,
): string[] {
  const operation = document.paths[template]?.[method] as Operation
  const described = operation.responses[status]
  if (described === undefined) return [`the document does not list ${status}`]
  const component = described.$ref?.split('/').at(-1)
  const response =
    component === undefined ? described : (document.components.responses[component] as Described)
  const content = response.content ?? {}
  const found: string[] = []
  if (status >= 400) {
    const code = (JSON.parse(text || '{}') as { type?: string }).type?.split('/').at(-1)
    const examples = (content[PROBLEM_MEDIA] as { examples?: Record<string, unknown> }).examples
    if (sent !== 'HEAD' && examples?.[code ?? ''] === undefined) found.push(`does not list ${code}`)
    return found
  }
  if ('ETag' in (response.headers ?? {}) && !/^"[^"]+"$/.test(headers.etag ?? '')) {
    found.push(`has no strong ETag: ${headers.etag}`)
  }
  if ('Location' in (response.headers ?? {}) && !headers.location?.startsWith('/v1/')) {
    found.push(`has no Location: ${headers.location}`)
  }
  if (Object.keys(content).length === 0) return text === '' ? found : [...found, 'has a body']
  if (content[media] === undefined) return [...found, `the document does not list ${media}`]
  if (!JSON_MEDIA.includes(media) || sent === 'HEAD') return found
  const errors = schemaErrors(
    pointer('paths', template, method, 'responses', String(status), 'content', media, 'schema'),
    JSON.parse(text),
  )
  return errors === undefined ? found : [...found, errors]
}

/** @throws {Error} naming everything in which an answer is not what the document says */
export function assertAsDocumented(answer: WireAnswer): void {
  const found = contradictions(answer)
  if (found.length > 0) throw new Error(found.join('\n'))
}
