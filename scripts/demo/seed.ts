import { existsSync, rmSync, writeFileSync } from 'node:fs'
import { setTimeout as wait } from 'node:timers/promises'
import { parseArgs } from 'node:util'
import { createSend, NoAnswer } from '#scripts/gate/send.ts'
import { ApiError, createClient } from '#shared/client/client.ts'
import { getHealth } from '#shared/contracts/health.contract.ts'
import type { Service } from './people.ts'
import { createDemoKey, seedDemo } from './seed-demo.ts'

const ANSWER_MS = 10_000
const HEALTH_ATTEMPTS = 100
const HEALTH_PAUSE_MS = 150

/** Waits until the service lives; it is not ready before the demo is made. */
const waitForLife = async (service: Service): Promise<void> => {
  const call = createClient(service)
  for (let attempt = 1; ; attempt += 1) {
    try {
      await call(getHealth, {})
      return
    } catch (error) {
      if (!(error instanceof NoAnswer) || attempt === HEALTH_ATTEMPTS) throw error
      await wait(HEALTH_PAUSE_MS)
    }
  }
}

const run = async (): Promise<void> => {
  const { values } = parseArgs({
    options: { url: { type: 'string' }, 'key-file': { type: 'string' } },
  })
  const { url, 'key-file': keyFile } = values
  if (url === undefined) throw new TypeError('Give --url')
  const service = { baseUrl: url.replace(/\/+$/, ''), send: createSend(() => ANSWER_MS) }
  await waitForLife(service)
  const revisions = await seedDemo(service)
  if (keyFile !== undefined && (revisions > 0 || !existsSync(keyFile))) {
    rmSync(keyFile, { force: true })
    writeFileSync(keyFile, `${await createDemoKey(service)}\n`, { mode: 0o600 })
  }
  const said = revisions > 0 ? `made in ${revisions} revisions` : 'there already'
  process.stdout.write(`Larkhaven Ferries is ${said}.\n`)
}

run().catch((error: unknown) => {
  const faults = error instanceof ApiError ? (error.problem?.errors ?? []) : []
  const lines = [
    `The demo could not be made: ${error instanceof Error ? error.message : error}`,
    ...faults.map(({ pointer, parameter, detail }) => `  ${pointer ?? parameter ?? ''}: ${detail}`),
  ]
  process.stderr.write(`${lines.join('\n')}\n`)
  process.exitCode = 1
})
