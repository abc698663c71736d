import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import type { Files } from '#api/app.ts'
import { compose } from '#api/compose.ts'
import { readConfig } from '#api/config.ts'
import demo from '#scripts/demo/demo-accounts.json' with { type: 'json' }
import type { Service } from '#scripts/demo/people.ts'
import { seedDemo } from '#scripts/demo/seed-demo.ts'
import { createSend } from '#scripts/gate/send.ts'
import { createTestDatabase } from './database.ts'

/** The service with the demo in it, listening on a free port. */
export interface DemoService extends Service {
  /** Revisions that seeding made. */
  readonly revisions: number
  close(): Promise<void>
}

/**
 * Composes the service on a database of its own, makes the demo's accounts, and seeds it over HTTP.
 * With `files` it serves them too, such as the built console.
 */
export async function startDemoService(files?: Files): Promise<DemoService> {
  const database = await createTestDatabase()
  const read = readConfig({
    NODE_ENV: 'test',
    DATABASE_URL: database.serveUrl,
    DATABASE_RELAXED_FLUSH: '1',
    PASSWORD_MEMORY_KIB: '8',
    PASSWORD_PASSES: '1',
    LOG_LEVEL: 'error',
  })
  if (!read.ok) throw new Error(read.refusals.join('\n'))
  const { app, services, close } = compose({ config: read.config, files })
  const server = createServer(app)
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  const baseUrl = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
  for (const { email, name, role } of demo.accounts) {
    await services.accounts.create({
      email,
      name,
      password: demo.password,
      isAdmin: role === 'admin',
    })
  }
  const service = { baseUrl, send: createSend(() => 20_000) }
  const revisions = await seedDemo(service)
  return {
    ...service,
    revisions,
    close: async () => {
      server.closeAllConnections()
      await new Promise((resolve) => server.close(resolve))
      await close()
      await database.drop()
    },
  }
}
