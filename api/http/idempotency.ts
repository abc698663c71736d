import type { Caller } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { IdempotencyStore, KeptAnswer } from '#api/platform/idempotency/idempotency-store.ts'
import { sha256Hex } from '#api/sha256.ts'
import { addressOf, type Contract, takesIdempotencyKey } from '#shared/contracts/route.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'
import { type LooseAnswer, statusOf } from './answer.ts'
import type { Exchange } from './exchange.ts'

const MOST_LETTERS = 255
/** A structured-field string; printable ASCII, two escapes. @see https://www.rfc-editor.org/rfc/rfc9651#section-3.3.3 */
const QUOTED = /^"((?:[\x20\x21\x23-\x5b\x5d-\x7e]|\\["\\])+)"$/
/** What many clients send instead: a UUID or the like without its quotes. */
const BARE = /^[\w.~:+/=-]+$/

/**
 * Answers the key that an `Idempotency-Key` field holds, with or without quotes.
 * @throws {AppError} `parameter-invalid`
 */
export function readIdempotencyKey(field: string | undefined): string | undefined {
  if (field === undefined) return undefined
  const text = field.trim()
  const quoted = QUOTED.exec(text)?.[1]?.replace(/\\(["\\])/g, '$1')
  const key = quoted ?? (BARE.test(text) ? text : undefined)
  if (key !== undefined && key.length <= MOST_LETTERS) return key
  throw new AppError('parameter-invalid', {
    faults: [
      {
        parameter: 'Idempotency-Key',
        detail: `Expected one quoted string of 1 to ${MOST_LETTERS} letters, best a UUID`,
      },
    ],
  })
}

/**
 * Answers what the handler answers; where the request bears an `Idempotency-Key`, what it answered the first
 * time. Only successes are kept, for 24 hours; a refusal leaves the key free.
 * @throws {AppError} `parameter-invalid`, `idempotency-key-reused`, `idempotency-key-running`
 */
export async function answerOnce(
  store: IdempotencyStore,
  { contract, exchange }: { readonly contract: Contract; readonly exchange: Exchange<Contract> },
  run: () => Promise<LooseAnswer | undefined>,
): Promise<LooseAnswer | undefined> {
  const { caller, request, params, query, body, media } = exchange
  if (!takesIdempotencyKey(contract) || caller === undefined) return run()
  const key = readIdempotencyKey(request.get('Idempotency-Key'))
  if (key === undefined) return run()
  const requestSha256 = sha256Hex(canonicalJson({ query, body, media }))
  const once = await store.once(
    // One address, however its characters came encoded.
    keyHashOf(caller, { contract, path: addressOf(contract, params ?? {}), key }),
    async () => {
      const value = await run()
      return { value, record: { requestSha256, ...keptOf(contract, value) } }
    },
  )
  if (once.state === 'done') return once.value
  if (once.state === 'running') {
    throw new AppError('idempotency-key-running', { retryAfterSeconds: 1 })
  }
  if (once.record.requestSha256 === requestSha256) return answerOf(contract, once.record)
  throw new AppError('idempotency-key-reused', {
    faults: [
      { parameter: 'Idempotency-Key', detail: 'It came with another body, query or Accept before' },
    ],
  })
}

interface Keyed {
  readonly contract: Contract
  readonly path: string
  readonly key: string
}

const keyHashOf = (caller: Caller, { contract: { method }, path, key }: Keyed): string => {
  const callerId = caller.kind === 'user' ? caller.userId : caller.keyId
  return sha256Hex(JSON.stringify([caller.kind, callerId, method, path, key]))
}

/** Names that carry a member of the answer rather than a header of its own. */
const [LOCATION, ETAG, MEDIA] = ['Location', 'ETag', 'Content-Type']

/** What is shown once is not kept: neither the contract's secrets nor any cookie. */
function keptOf(contract: Contract, answer: LooseAnswer | undefined): KeptAnswer {
  const { secrets = [] } = contract
  const { body, text, media, etag, location, headers = {} } = answer ?? {}
  const own = Object.entries(headers).filter(
    (entry): entry is [string, string] => typeof entry[1] === 'string',
  )
  return {
    status: statusOf(contract, answer),
    headers: {
      ...Object.fromEntries(own.filter(([name]) => name.toLowerCase() !== 'set-cookie')),
      ...(location === undefined ? {} : { [LOCATION]: location }),
      ...(etag === undefined ? {} : { [ETAG]: etag }),
      ...(media === undefined ? {} : { [MEDIA]: media }),
    },
    body: text ?? (body === undefined ? '' : JSON.stringify(withoutSecrets(body, secrets))),
  }
}

const withoutSecrets = (body: unknown, secrets: readonly string[]): unknown =>
  typeof body === 'object' && body !== null && secrets.length > 0
    ? Object.fromEntries(Object.entries(body).filter(([name]) => !secrets.includes(name)))
    : body

function answerOf(
  { success }: Contract,
  { status, headers, body }: KeptAnswer,
): LooseAnswer | undefined {
  const { [LOCATION]: location, [ETAG]: etag, [MEDIA]: media, ...others } = headers
  const content =
    'media' in success ? { text: body } : body === '' ? {} : { body: JSON.parse(body) }
  return {
    ...content,
    ...(status === 202 && success.status !== 202 ? { status } : {}),
    ...(media === undefined ? {} : { media }),
    headers: others,
    ...(location === undefined ? {} : { location }),
    ...(etag === undefined ? {} : { etag }),
  }
}
