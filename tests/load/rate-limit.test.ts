import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createKey } from '#shared/contracts/keys.contract.ts'
import { createSystem } from '#shared/contracts/systems.contract.ts'
import type { Variant } from '#tests/support/race-server.ts'
import { createRaceTrack, type RaceTrack } from '#tests/support/races.ts'

/**
 * More requests than one key may send, over two processes at once. Exactly the budget is answered. The fields are
 * those of draft-ietf-httpapi-ratelimit-headers; the numbers are common practice, no source.
 */
const CALLS = 120
const READS = 400
const SENT_EACH = 150
const READS_SENT_EACH = 300
const AT_ONCE = 10

let track: RaceTrack
beforeAll(async () => {
  track = await createRaceTrack({
    RATE_WINDOW_SECONDS: '3600',
    RATE_CALLS_PER_KEY: String(CALLS),
    RATE_READS_PER_KEY: String(READS),
  })
  await track.client(0, 'sound')(createSystem, { body: { key: 'quay', name: 'Quay' } })
})
afterAll(() => track.close())

async function newKey(): Promise<string> {
  const { body } = await track.client(0, 'sound')(createKey, {
    params: { system: 'quay' },
    body: { name: 'pipeline', scopes: ['themes:read'] },
  })
  if (body.key === undefined) throw new TypeError('A new key is shown once')
  return body.key
}

interface Sending {
  readonly variant: Variant
  readonly path: string
  readonly each: number
}

/** Answers how many of the requests came to which status, over both processes. */
async function send({ variant, path, each }: Sending): Promise<Record<number, number>> {
  const key = await newKey()
  const statuses: Record<number, number> = {}
  const sendAll = async (process: 0 | 1): Promise<void> => {
    for (let sent = 0; sent < each / (AT_ONCE / 2); sent += 1) {
      const url = `${track.origin(process, variant)}${path}`
      const answer = await fetch(url, { headers: { authorization: `Bearer ${key}` } })
      await answer.arrayBuffer()
      statuses[answer.status] = (statuses[answer.status] ?? 0) + 1
    }
  }
  await Promise.all(Array.from({ length: AT_ONCE }, (_, at) => sendAll(at % 2 === 0 ? 0 : 1)))
  return statuses
}

const read = (variant: Variant): Sending => ({ variant, path: '/v1/systems/quay', each: SENT_EACH })

describe('one budget over two processes', () => {
  it('answers exactly as many calls as a key may make', async () => {
    expect(await send(read('sound'))).toEqual({ 200: CALLS, 429: 2 * SENT_EACH - CALLS })
  })

  it('answers never more theme reads than that, and leaves at most a lease of each process', async () => {
    const path = '/v1/systems/quay/themes'
    const { 200: answered = 0, ...others } = await send({
      variant: 'sound',
      path,
      each: READS_SENT_EACH,
    })
    expect(answered).toBeLessThanOrEqual(READS)
    expect(answered).toBeGreaterThanOrEqual(READS - 2 * (READS / 20))
    expect(others).toEqual({ 429: 2 * READS_SENT_EACH - answered })
  })

  it('answers twice as many in the mutant own-memory', async () => {
    const { 200: answered } = await send(read('own-memory'))
    expect(answered).toBe(2 * CALLS)
  })

  it('answers too many in the mutant two-statements', async () => {
    const { 200: answered } = await send(read('two-statements'))
    expect(answered).toBeGreaterThan(CALLS)
  })
})
