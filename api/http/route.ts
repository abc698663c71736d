import { type IRouter, type Request, type RequestHandler, type Response, Router } from 'express'
import type { Caller } from '#api/caller.ts'
import type { IdempotencyStore } from '#api/platform/idempotency/idempotency-store.ts'
import { type Contract, problemsOf } from '#shared/contracts/route.ts'
import { answerOtherMethod } from './allow.ts'
import { type Answer, checkAnswer, sendAnswer } from './answer.ts'
import {
  authenticate,
  cookieOf,
  type Identify,
  readCredential,
  type SessionCookie,
} from './authenticate.ts'
import { authorize, type FindAccess } from './authorize.ts'
import {
  type Exchange,
  readParams,
  readPrecondition,
  readQuery,
  readValidBody,
} from './exchange.ts'
import { answerOnce } from './idempotency.ts'
import { negotiate } from './negotiate.ts'
import { refuseForeignOrigin } from './origin.ts'
import { refusalOf } from './problem.ts'
import type { RateLimits } from './rate-limit.ts'
import { requestIdOf } from './request-id.ts'

export type { Answer } from './answer.ts'
export type { Exchange } from './exchange.ts'

/** Runs one operation. */
export type Handler<C extends Contract> = (exchange: Exchange<C>) => Promise<Answer<C>> | Answer<C>

/** What every route of the service relies on. */
export interface RouteContext {
  readonly identify: Identify
  readonly findAccess: FindAccess
  readonly cookie: SessionCookie
  readonly publicUrl: URL
  readonly idempotency: IdempotencyStore
  readonly limits: RateLimits
  /** Parse answers by their contract and refuse codes it does not list: always but in production. */
  readonly strictAnswers: boolean
}

interface Route {
  readonly contract: Contract
  readonly handler: Handler<Contract>
}

/** The operations of the service as they are gathered. */
export interface ApiRouter {
  readonly context: RouteContext
  readonly routes: Route[]
}

export const createApiRouter = (context: RouteContext): ApiRouter => ({ context, routes: [] })

/** Adds an operation: who calls it, what goes in and what comes out is all in its contract. */
export function mount<const C extends Contract>(
  router: ApiRouter,
  contract: C,
  handler: Handler<C>,
): void {
  router.routes.push({ contract, handler: handler as unknown as Handler<Contract> })
}

/** A last segment `{name}.{format}` is one parameter, split at its first dot. */
const FILE_SEGMENT = /\/\{(\w+)\}\.\{(\w+)\}$/

const expressPathOf = (path: string): string =>
  path.replace(FILE_SEGMENT, '/:file').replace(/\{(\w+)\}/g, ':$1')

/** Literal segments first, then files, then parameters: the narrowest template gets the request. */
const breadthOf = ({ contract }: Route): string =>
  contract.path
    .replace(FILE_SEGMENT, '/.')
    .split('/')
    .map((segment) => (segment === '.' ? 1 : segment.startsWith('{') ? 2 : 0))
    .join('')

/** Answers the Express router of all gathered operations; other methods on their paths are 405. */
export function createExpressRouter({ routes, context }: ApiRouter): IRouter {
  const router = Router({ caseSensitive: true, strict: true })
  const ordered = [...routes].sort((a, b) => (breadthOf(a) < breadthOf(b) ? -1 : 1))
  for (const route of ordered) {
    const method = route.contract.method.toLowerCase() as 'get'
    const siblings = ordered.filter((other) => shapeOf(other) === shapeOf(route))
    router[method](expressPathOf(route.contract.path), runRoute({ route, siblings }, context))
  }
  for (const shape of new Set(ordered.map(shapeOf))) {
    const siblings = ordered.filter((route) => shapeOf(route) === shape)
    router.all(expressPathOf(siblings[0]?.contract.path ?? ''), refuseMethod(siblings))
  }
  return router
}

/** Templates of one shape are met by the same addresses. */
const shapeOf = ({ contract }: Route): string => expressPathOf(contract.path).replace(/:\w+/g, ':')

const isOfFiles = ({ contract }: Route): boolean => FILE_SEGMENT.test(contract.path)

/** Where one of the siblings takes files, a last segment with a dot is a file's, and no other is. */
function takes(route: Route, siblings: readonly Route[], request: Request): boolean {
  if (!siblings.some(isOfFiles)) return true
  const last = Object.values(request.params as Record<string, string>).at(-1)
  return isOfFiles(route) === last?.includes('.')
}

const methodsOf = ({ contract: { method } }: Route): readonly string[] =>
  method === 'GET' ? ['GET', 'HEAD'] : [method]

const refuseMethod =
  (siblings: readonly Route[]): RequestHandler =>
  (request, response, next) => {
    const methods = siblings.filter((route) => takes(route, siblings, request)).flatMap(methodsOf)
    if (methods.includes(request.method)) return next()
    answerOtherMethod(request, response, methods)
  }

interface Placed {
  readonly route: Route
  readonly siblings: readonly Route[]
}

const runRoute =
  ({ route, siblings }: Placed, context: RouteContext): RequestHandler =>
  async (request, response, next) => {
    if (!takes(route, siblings, request)) return next()
    const { contract, handler } = route
    const params = pathParamsOf(contract, request)
    try {
      const exchange = await readExchange(contract, context, { request, response, params })
      const answer = await answerOnce(context.idempotency, { contract, exchange }, async () => {
        const given = await handler(exchange)
        if (context.strictAnswers) checkAnswer(contract, given)
        return given
      })
      sendAnswer(request, response, contract, answer)
    } catch (error) {
      next(context.strictAnswers ? listedOnly(contract, error) : error)
    }
  }

function pathParamsOf(contract: Contract, request: Request): Record<string, string> {
  const given = request.params as Record<string, string>
  const names = FILE_SEGMENT.exec(contract.path)
  if (names === null) return given
  const { file = '', ...others } = given
  const dot = file.indexOf('.')
  return {
    ...others,
    [String(names[1])]: file.slice(0, dot),
    [String(names[2])]: file.slice(dot + 1),
  }
}

interface Arrived {
  readonly request: Request
  readonly response: Response
  readonly params: Readonly<Record<string, string>>
}

/** Who, then whether, then what: nobody unknown gets a body read, and nobody over a budget a query. */
async function readExchange(
  contract: Contract,
  context: RouteContext,
  { request, response, params: given }: Arrived,
): Promise<Exchange<Contract>> {
  guardOrigin(contract, context, request)
  const { access } = contract
  const caller = await readCaller(contract, context, { request, response })
  const params = readParams(contract, given)
  const system =
    caller === undefined || access === 'anyone'
      ? undefined
      : await authorize(caller, access, given.system, context.findAccess)
  if (system !== undefined) {
    await context.limits.of('system', system.id, { contract, request, response })
  }
  const media = negotiate(contract, request)
  const query = readQuery(contract, request)
  const precondition = readPrecondition(contract, request)
  const body = await readValidBody(contract, request, response)
  const requestId = requestIdOf(response)
  return {
    ...({ params, query, body } as Pick<Exchange<Contract>, 'params' | 'query' | 'body'>),
    ...precondition,
    media,
    caller,
    system,
    requestId,
    request,
    response,
  } as Exchange<Contract>
}

/** What is told apart without a query comes before the address pays, and the address before anybody is looked up. */
async function readCaller(
  contract: Contract,
  context: RouteContext,
  { request, response }: Omit<Arrived, 'params'>,
): Promise<Caller | undefined> {
  const isOpen = contract.access === 'anyone'
  const credential = isOpen ? undefined : readCredential(request, context.cookie)
  await context.limits.ofAddress({ contract, request, response })
  if (credential === undefined) return undefined
  const caller = await authenticate(credential, context.identify)
  response.locals.caller = caller
  if (caller.kind === 'key') {
    await context.limits.of('key', caller.keyId, { contract, request, response })
  }
  return caller
}

/** What a browser sends with a cookie of ours, and any sign-in, must come from our own pages. */
function guardOrigin(contract: Contract, context: RouteContext, request: Request): void {
  if (contract.method === 'GET' || request.headers.authorization !== undefined) return
  const hasCookie = cookieOf(request, context.cookie.name) !== undefined
  if (hasCookie || contract.access === 'anyone') refuseForeignOrigin(request, context.publicUrl)
}

/** @returns the error; a refusal that the contract does not list becomes a bug of ours */
function listedOnly(contract: Contract, error: unknown): unknown {
  const { code } = refusalOf(error)
  return problemsOf(contract).includes(code)
    ? error
    : new Error(`${contract.operationId} does not list ${code}`, { cause: error })
}
