import { type Call, createClient, type Send } from '#shared/client/client.ts'
import { signIn } from '#shared/contracts/sessions.contract.ts'
import demo from './demo-accounts.json' with { type: 'json' }

/** Who acts in the demo: the part of their e-mail address before the sign. */
export type Account = 'admin' | 'maintainer' | 'engineer' | 'a11y' | 'pelle' | 'sanna'

export interface Service {
  /** Origin of the service. */
  readonly baseUrl: string
  readonly send: Send
}

/** Remembers the session's cookie as a browser does. */
const keepingCookie = (send: Send): Send => {
  let cookie: string | undefined
  return async (request) => {
    const headers = { ...request.headers, ...(cookie === undefined ? {} : { cookie }) }
    const answer = await send({ ...request, headers })
    cookie = answer.headers['set-cookie']?.split(';')[0] ?? cookie
    return answer
  }
}

const signedIn = async (account: Account, { baseUrl, send }: Service): Promise<Call> => {
  const call = createClient({ baseUrl, send: keepingCookie(send) })
  const email = `${account}@larkhaven.example`
  await call(signIn, { body: { email, password: demo.password } })
  return call
}

/** Gives each person's client; a person signs in when first needed. */
export function createPeople(service: Service): (account: Account) => Promise<Call> {
  const calls = new Map<Account, Promise<Call>>()
  return (account) => {
    const call = calls.get(account) ?? signedIn(account, service)
    calls.set(account, call)
    return call
  }
}

/** Everyone who is a member, with their role. */
export const members = demo.accounts.flatMap(({ email, role }) =>
  role === 'maintainer' || role === 'engineer' || role === 'accessibility-lead'
    ? [{ email, role } as const]
    : [],
)
