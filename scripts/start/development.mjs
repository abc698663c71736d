// @ts-check
import { join } from 'node:path'
import { programOptions } from '#scripts/build.mjs'
import { freePort } from '#scripts/start/free-port.mjs'
import { DATA, ROOT } from '#scripts/start/project.mjs'
import { startService } from '#scripts/start/service.mjs'
import { isStopping, onStop } from '#scripts/start/shutdown.mjs'

/** Where the programs go; the console stays in its sources, which Vite serves. */
export const DEVELOPMENT = join(DATA, 'development')
const UP_WITHIN_MS = 30_000

/**
 * Vite serves the console with reload on the service's usual port and passes the rest on; the service is
 * bundled and started again whenever its sources change.
 * @param {{ settings: import('#scripts/start/settings.mjs').Settings, env: NodeJS.ProcessEnv }} options
 */
export async function serveForDevelopment({ settings, env }) {
  const port = await freePort()
  const url = `http://127.0.0.1:${port}`
  const service = await watchService(() =>
    startService({
      script: join(DEVELOPMENT, 'api/server.js'),
      cwd: ROOT,
      url,
      env: {
        ...env,
        HOST: '127.0.0.1',
        PORT: String(port),
        PUBLIC_URL: env.PUBLIC_URL ?? settings.url,
      },
    }),
  )
  await service.untilOk('/healthz', UP_WITHIN_MS)
  const vite = await import('vite')
  process.env.SERVICE_URL = url
  const server = await vite.createServer({
    configFile: join(ROOT, 'vite.config.ts'),
    server: { host: settings.host, port: settings.port },
  })
  await server.listen()
  onStop(() => server.close())
  return service
}

/**
 * @param {() => import('#scripts/start/service.mjs').Service} start
 * @returns {Promise<Pick<import('#scripts/start/service.mjs').Service, 'untilOk'>>} the service of the moment
 */
async function watchService(start) {
  const { context } = await import('esbuild')
  let service = /** @type {import('#scripts/start/service.mjs').Service | undefined} */ (undefined)
  const restart = async () => {
    await service?.stop()
    if (isStopping()) return
    if (service !== undefined) console.log('Service: sources changed, started again.')
    service = start()
  }
  let turn = Promise.resolve()
  /** @type {() => void} */
  let tellBuilt = () => {}
  /** @type {Promise<void>} */
  const built = new Promise((resolve) => {
    tellBuilt = resolve
  })
  const bundle = await context({
    ...programOptions(),
    outdir: DEVELOPMENT,
    plugins: [
      {
        name: 'restart',
        setup: ({ onEnd }) =>
          onEnd(({ errors }) => {
            if (errors.length > 0) return
            turn = turn.then(restart)
            tellBuilt()
          }),
      },
    ],
  })
  onStop(async () => {
    await bundle.dispose()
    await turn
    await service?.stop()
  })
  await bundle.watch()
  await built
  await turn
  return {
    untilOk: async (path, withinMs) => service?.untilOk(path, withinMs),
  }
}
