import supertest from 'supertest'
import type { Express } from 'express'
import type { Services } from '#api/services.ts'
import type { Role } from '#shared/contracts/permissions.ts'
import { assertAsDocumented } from './openapi.ts'

/** Whoever sends requests; every answer is held against the document. */
export type Agent = ReturnType<typeof createAgent>

/** Each has a role in the test system, but for the stranger, who belongs to none. */
export const PEOPLE = {
  admin: { name: 'Odd Brekke', role: undefined, isAdmin: true },
  maintainer: { name: 'Ines Marrow', role: 'maintainer', isAdmin: false },
  otherMaintainer: { name: 'Pelle Strand', role: 'maintainer', isAdmin: false },
  engineer: { name: 'Tove Lind', role: 'engineer', isAdmin: false },
  lead: { name: 'Noor Haddad', role: 'accessibility-lead', isAdmin: false },
  stranger: { name: 'Joss Fenner', role: undefined, isAdmin: false },
} as const satisfies Record<string, { name: string; role?: Role; isAdmin: boolean }>

export type PersonName = keyof typeof PEOPLE
export type People = Readonly<Record<PersonName, Agent>>

export const TEST_PASSWORD = 'tar rope and slack water'
export const emailOf = (name: PersonName): string => `${name.toLowerCase()}@quay.test`

const METHODS = ['get', 'head', 'post', 'put', 'patch', 'delete'] as const

/** A client with a cookie jar of its own, and a key where one is given. */
export function createAgent(app: Express, key?: string) {
  const agent = supertest.agent(app)
  if (key !== undefined) agent.set('Authorization', `Bearer ${key}`)
  const send = (method: (typeof METHODS)[number], url: string) =>
    agent[method](url).expect(({ text, status, headers }) =>
      assertAsDocumented({
        method: method.toUpperCase(),
        url,
        status,
        headers: headers as Record<string, string>,
        text: text ?? '',
      }),
    )
  return {
    get: (url: string) => send('get', url),
    head: (url: string) => send('head', url),
    post: (url: string) => send('post', url),
    put: (url: string) => send('put', url),
    patch: (url: string) => send('patch', url),
    delete: (url: string) => send('delete', url),
  }
}

/** Accounts and sessions, as the service itself makes them. */
export async function signInPeople(app: Express, { accounts }: Services): Promise<People> {
  const names = Object.keys(PEOPLE) as PersonName[]
  const agents = await Promise.all(
    names.map(async (name) => {
      const { name: fullName, isAdmin } = PEOPLE[name]
      const account = { email: emailOf(name), name: fullName, password: TEST_PASSWORD, isAdmin }
      await accounts.create(account)
      const agent = createAgent(app)
      await agent
        .post('/v1/sign-in')
        .send({ email: account.email, password: TEST_PASSWORD })
        .expect(200)
      return [name, agent] as const
    }),
  )
  return Object.fromEntries(agents) as Record<PersonName, Agent>
}
