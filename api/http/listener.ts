import {
  createServer,
  type IncomingMessage,
  type RequestListener,
  type Server,
  type ServerOptions,
  type ServerResponse,
  STATUS_CODES,
} from 'node:http'
import type { Duplex } from 'node:stream'
import { AppError } from '#api/errors.ts'
import type { NewId } from '#api/platform/ids.ts'
import { PROBLEMS, type ProblemCode } from '#shared/contracts/problems.ts'
import { problemOf } from './problem.ts'

/** Half-open requests are closed within 12 s; Node's own defaults leave them 90. */
const TIMEOUTS = {
  headersTimeout: 10_000,
  requestTimeout: 15_000,
  connectionsCheckingInterval: 2_000,
}

export interface Listening {
  readonly app: RequestListener
  readonly newId: NewId
  /** Shorter ones, for tests. */
  readonly timeouts?: Partial<typeof TIMEOUTS>
}

/**
 * Makes the server that listens for the service. What Node refuses before there is a request, it refuses with
 * a problem document too: what is too slow, has too long a head, or is no HTTP.
 * @see https://nodejs.org/docs/latest-v20.x/api/http.html#event-clienterror
 */
export function createListener({ app, newId, timeouts = {} }: Listening): Server {
  const options: ServerOptions = { ...TIMEOUTS, ...timeouts, requireHostHeader: false }
  const server = createServer(options, app)
  const latest = new WeakMap<Duplex, Taken>()
  server.prependListener('request', (request, response) => {
    latest.set(request.socket, { request, response })
  })
  // An expectation that is not known may be left aside. https://www.rfc-editor.org/rfc/rfc9110#section-10.1.1
  server.on('checkExpectation', (request, response) => server.emit('request', request, response))
  server.on('clientError', (error: NodeJS.ErrnoException, socket) => {
    const refuse = (): void => {
      socket.end(rawProblem(codeOf(error), newId('req')), () => socket.destroy())
    }
    const taken = latest.get(socket)
    if (error.code === 'ECONNRESET' || !socket.writable) socket.destroy()
    else if (taken === undefined || isDone(taken)) refuse()
    else if (taken.request.complete) taken.response.once('close', refuse)
    else if (taken.response.headersSent) socket.destroy()
    else refuse()
  })
  return server
}

/** The last request that Node took from a connection; what breaks it comes after, or within its body. */
interface Taken {
  readonly request: IncomingMessage
  readonly response: ServerResponse
}

const isDone = ({ request, response }: Taken): boolean =>
  request.complete && response.writableFinished

function codeOf({ code }: NodeJS.ErrnoException): ProblemCode {
  switch (code) {
    case 'ERR_HTTP_REQUEST_TIMEOUT':
      return 'request-timed-out'
    case 'HPE_HEADER_OVERFLOW':
      return 'request-head-too-large'
    case 'HPE_CHUNK_EXTENSIONS_OVERFLOW':
      return 'request-too-large'
    default:
      return 'request-unreadable'
  }
}

/** A whole answer as it goes over the wire: nothing of Node's or Express's can be asked to write it. */
function rawProblem(code: ProblemCode, requestId: string): string {
  const body = JSON.stringify(problemOf(new AppError(code), requestId))
  const { status } = PROBLEMS[code]
  return [
    `HTTP/1.1 ${status} ${STATUS_CODES[status]}`,
    'Connection: close',
    'Cache-Control: no-store',
    'Content-Type: application/problem+json; charset=utf-8',
    `Content-Length: ${Buffer.byteLength(body)}`,
    'X-Content-Type-Options: nosniff',
    `X-Request-Id: ${requestId}`,
    '',
    body,
  ].join('\r\n')
}
