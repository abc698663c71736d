import type { Express } from 'express'
import { compose, type Composition, type Service } from '#api/compose.ts'
import { readConfig } from '#api/config.ts'
import { createTestDatabase, type TestDatabase } from './database.ts'
import { type Agent, createAgent, emailOf, PEOPLE, type People, signInPeople } from './people.ts'

export const TEST_SYSTEM = 'larkhaven'

/** A composed service on a database of its own, with people signed in. */
export interface TestApp {
  readonly app: Express
  readonly service: Service
  readonly services: Service['services']
  readonly database: TestDatabase
  readonly people: People
  /** Nobody: no cookie, no key. */
  readonly anonymous: Agent
  withKey(key: string): Agent
  /** Makes a further empty system with the same members. */
  createSystem(key: string): Promise<void>
  close(): Promise<void>
}

export interface TestAppOptions {
  readonly platform?: Composition['platform']
  readonly files?: Composition['files']
  readonly env?: Readonly<Record<string, string>>
}

/** What a service under test is configured with: cheap passwords, no log. */
export function testConfig(databaseUrl: string, env: Readonly<Record<string, string>> = {}) {
  const read = readConfig({
    NODE_ENV: 'test',
    DATABASE_URL: databaseUrl,
    DATABASE_RELAXED_FLUSH: '1',
    PASSWORD_MEMORY_KIB: '1024',
    PASSWORD_PASSES: '1',
    LOG_LEVEL: 'silent',
    ...env,
  })
  if (!read.ok) throw new Error(read.refusals.join('\n'))
  return read.config
}

/** In `beforeAll`; `close()` in `afterAll`. The system `larkhaven` is there, empty, with its members. */
export async function createTestApp(options: TestAppOptions = {}): Promise<TestApp> {
  const database = await createTestDatabase()
  const config = testConfig(database.serveUrl, options.env)
  const service = compose({ config, files: options.files, platform: options.platform })
  const { app, services } = service
  const people = await signInPeople(app, services)
  const createSystem = (key: string) => makeSystem(people.admin, key)
  await createSystem(TEST_SYSTEM)
  return {
    app,
    service,
    services,
    database,
    people,
    anonymous: createAgent(app),
    withKey: (key) => createAgent(app, key),
    createSystem,
    close: async () => {
      await service.close()
      await database.drop()
    },
  }
}

async function makeSystem(admin: Agent, key: string): Promise<void> {
  await admin.post('/v1/systems').send({ key, name: key }).expect(201)
  const { headers } = await admin.get(`/v1/systems/${key}/members`).expect(200)
  const items = Object.entries(PEOPLE).flatMap(([name, { role }]) =>
    role === undefined ? [] : [{ email: emailOf(name as keyof typeof PEOPLE), role }],
  )
  await admin
    .put(`/v1/systems/${key}/members`)
    .set('If-Match', String(headers.etag))
    .send({ items })
    .expect(200)
}
