import type { IncomingMessage } from 'node:http'
import type { Send } from '#shared/client/client.ts'

/** No answer came, or not a whole one; `code` is Node's, or `TIMEOUT`. */
export class NoAnswer extends Error {
  override readonly name = 'NoAnswer'
  readonly code: string

  constructor(code: string, message: string) {
    super(message)
    this.code = code
  }
}

const MOST_BYTES = 64 * 1024 * 1024

const readBody = async (answer: IncomingMessage): Promise<string> => {
  const chunks: Buffer[] = []
  let bytes = 0
  try {
    for await (const chunk of answer as AsyncIterable<Buffer>) {
      bytes += chunk.length
      if (bytes > MOST_BYTES) break
      chunks.push(chunk)
    }
  } catch {
    throw new NoAnswer('CUT_OFF', 'The answer broke off')
  }
  if (bytes > MOST_BYTES) throw new NoAnswer('TOO_LARGE', 'The answer is larger than 64 MiB')
  return Buffer.concat(chunks).toString('utf8')
}

const headersOf = (answer: IncomingMessage): Record<string, string | undefined> =>
  Object.fromEntries(
    Object.entries(answer.headers).map(([name, value]) => [
      name,
      Array.isArray(value) ? value.join(', ') : value,
    ]),
  )

/** Carries requests by node:http, which starts in a third of the time that `fetch` takes. */
export function createSend(remainingMs: () => number): Send {
  return async ({ method, url, headers, body }) => {
    const isTls = url.startsWith('https:')
    const { request } = isTls ? await import('node:https') : await import('node:http')
    const signal = AbortSignal.timeout(Math.max(1, Math.floor(remainingMs())))
    const length = body === undefined ? {} : { 'content-length': String(Buffer.byteLength(body)) }
    try {
      const answer = await new Promise<IncomingMessage>((resolve, reject) => {
        const sent = request(url, {
          method,
          headers: { ...headers, ...length },
          agent: false,
          signal,
        })
        sent.once('response', resolve)
        sent.once('error', reject)
        sent.end(body)
      })
      return {
        status: answer.statusCode ?? 0,
        headers: headersOf(answer),
        body: await readBody(answer),
      }
    } catch (error) {
      if (signal.aborted) throw new NoAnswer('TIMEOUT', 'No answer in time')
      if (error instanceof NoAnswer) throw error
      const { code = 'UNKNOWN', message } = error as NodeJS.ErrnoException
      throw new NoAnswer(code, message || code)
    }
  }
}
