import { readFile } from 'node:fs/promises'
import type { Server } from 'node:http'
import { setTimeout as sleep } from 'node:timers/promises'
import { fileURLToPath } from 'node:url'
import type { Files } from './app.ts'
import { compose, type Service } from './compose.ts'
import { type Config, readConfig } from './config.ts'
import { AppError } from './errors.ts'
import { createListener } from './http/listener.ts'
import { failureOf } from './platform/database-error.ts'
import { readDatabaseSettings, unsafeSettings } from './platform/database-settings.ts'

const BOOT_PATIENCE_MS = 60_000
const DRAIN_MS = 10_000

const read = readConfig(process.env)
if (read.ok) await serve(read.config)
else refuse(read.refusals)

async function serve(config: Config): Promise<void> {
  const [files, expectedMigrations] = await Promise.all([readFiles(), countBuiltMigrations()])
  const service = compose({ config, files, expectedMigrations })
  const refusals = await bootRefusals(service, config)
  if (refusals.length > 0) {
    refuse(refusals)
    await service.close()
    return
  }
  const server = createListener({ app: service.app, newId: service.platform.newId })
  server.on('error', (error: NodeJS.ErrnoException) => {
    refuse([`cannot listen on ${config.host}:${config.port}: ${error.code}`])
    void service.close()
  })
  server.listen(config.port, config.host, () => {
    service.platform.logger.info({ url: config.publicUrl.href }, 'listening')
  })
  for (const signal of ['SIGTERM', 'SIGINT'] as const) {
    process.once(signal, () => void stop(server, service, config.shutdownGraceMs))
  }
}

/** Hoisted: the service starts above, before a constant here would be set. */
function at(path: string): string {
  return fileURLToPath(new URL(`../${path}`, import.meta.url))
}

/** How many migrations were built with the service. */
async function countBuiltMigrations(): Promise<number> {
  const journal = await readFile(at('drizzle/migrations/meta/_journal.json'), 'utf8')
  return (JSON.parse(journal) as { entries: unknown[] }).entries.length
}

/** Everything that the built service hands out as it is; what was not built is left out. */
async function readFiles(): Promise<Files> {
  const text = (path: string) => readFile(at(path), 'utf8').catch(() => undefined)
  const [document, page, gate] = await Promise.all([
    text('openapi/openapi.json'),
    text('console/index.html'),
    text('gate/dyewright.mjs'),
  ])
  return {
    document,
    gate,
    console: page === undefined ? undefined : { folder: at('console'), page },
  }
}

/** Waits for the database; then every reason not to serve on it. */
async function bootRefusals(
  { platform, services }: Service,
  config: { readonly relaxedFlush: boolean; readonly mode: string },
): Promise<string[]> {
  const deadlineMs = Date.now() + BOOT_PATIENCE_MS
  for (;;) {
    try {
      const settings = await readDatabaseSettings(platform.database.pool)
      const demo = config.mode === 'production' ? await services.accounts.demoRefusals() : []
      return [...unsafeSettings(settings, config.relaxedFlush), ...demo]
    } catch (error) {
      const failure = failureOf(error)
      const isAway = failure instanceof AppError && failure.code === 'service-unavailable'
      if (!isAway || Date.now() > deadlineMs) {
        return [`the database cannot be read: ${failure instanceof Error ? failure.message : ''}`]
      }
      await sleep(250)
    }
  }
}

function refuse(refusals: readonly string[]): void {
  for (const reason of refusals) process.stderr.write(`refused to start: ${reason}\n`)
  process.exitCode = 1
}

/** Not ready first, then no new connection, then the open requests, then the database. */
async function stop(server: Server, service: Service, graceMs: number): Promise<void> {
  const { logger } = service.platform
  service.services.health.stop()
  logger.info('stopping')
  await sleep(graceMs)
  const closed = new Promise((resolve) => server.close(resolve))
  server.closeIdleConnections()
  await Promise.race([closed, sleep(DRAIN_MS, undefined, { ref: false })])
  server.closeAllConnections()
  await service.close()
  logger.info('stopped')
}
