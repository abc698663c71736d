import { setTimeout as pause } from 'node:timers/promises'
import { createConnection, type RowDataPacket } from 'mysql2/promise'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { ApiError } from '#shared/client/client.ts'
import { createKey } from '#shared/contracts/keys.contract.ts'
import { createSystem } from '#shared/contracts/systems.contract.ts'
import { createToken } from '#shared/contracts/tokens.contract.ts'
import type { Variant } from '#tests/support/race-server.ts'
import { createRaceTrack, type RaceTrack } from '#tests/support/races.ts'

/**
 * Every request is sent ten times at once to two processes under one Idempotency-Key, and again until it is
 * answered. draft-ietf-httpapi-idempotency-key-header; the numbers are common practice, no source.
 */
let track: RaceTrack
beforeAll(async () => {
  track = await createRaceTrack()
})
afterAll(() => track.close())

const KEYS = 20
const REPETITIONS = 10
/** Which answers only say: again. */
const AGAIN = ['idempotency-key-running', 'service-unavailable']
const PATIENCE_MS = 20_000

interface Sent {
  readonly variant: Variant
  readonly system: string
  readonly at: number
}

/** Half make API keys, of which any number may bear one name; half make tokens, of which one may. */
const post = (process: 0 | 1, { variant, system, at }: Sent) => {
  const call = track.client(process, variant)
  const [params, idempotencyKey] = [{ system }, `key-${at}`]
  const body = { name: `effect-${at}` }
  return at % 2 === 0
    ? call(createKey, { params, idempotencyKey, body: { ...body, scopes: ['themes:read'] } })
    : call(createToken, { params, idempotencyKey, body: { ...body, value: '#204a5c' } })
}

interface Tally {
  waited: number
  broken: number
}

/** Sends one repetition until it is answered; what comes back is the answer, or the refusal's code. */
async function settle(sent: Sent, repetition: number, tally: Tally): Promise<string> {
  const deadlineMs = Date.now() + PATIENCE_MS
  for (let attempt = repetition; Date.now() < deadlineMs; attempt += 1) {
    try {
      const { status, body } = await post(attempt % 2 === 0 ? 0 : 1, sent)
      return JSON.stringify([status, { ...body, key: undefined }])
    } catch (error) {
      if (!(error instanceof ApiError)) tally.broken += 1
      else if (!AGAIN.includes(error.code ?? '')) return `refused: ${error.code}`
      else tally.waited += 1
      await pause(10)
    }
  }
  return 'never answered'
}

async function race(variant: Variant, system: string, during?: () => Promise<void>) {
  await track.client(0, 'sound')(createSystem, { body: { key: system, name: system } })
  const tally: Tally = { waited: 0, broken: 0 }
  const all = Promise.all(
    Array.from({ length: KEYS }, (_, at) =>
      Promise.all(
        Array.from({ length: REPETITIONS }, (_, turn) =>
          settle({ variant, system, at }, turn, tally),
        ),
      ),
    ),
  )
  await during?.()
  const answers = await all
  return {
    ...tally,
    effects: await countEffects(system),
    different: answers.filter((of) => new Set(of).size > 1).length,
    refused: answers.flat().filter((answer) => !answer.startsWith('[')).length,
  }
}

async function countEffects(system: string): Promise<number> {
  const connection = await createConnection(track.database.adminUrl)
  const [[row]] = await connection.query<(RowDataPacket & { n: number })[]>(
    `select (select count(*) from api_keys k where k.system_id = s.id)
          + (select count(*) from tokens t where t.system_id = s.id) as n
       from systems s where s.\`key\` = ?`,
    [system],
  )
  await connection.end()
  return Number(row?.n)
}

/** Kills each process once, while requests are under way. */
const killBoth = async (): Promise<void> => {
  await Promise.all([track.kill(0), track.kill(1)])
}

describe('one request, sent many times to two processes', () => {
  it('answers 20 keys × 10 with one effect each, all alike', async ({ annotate }) => {
    const { waited, broken, ...came } = await race('sound', 'sound')
    await annotate(`${waited} met the first still running`)
    expect(came).toEqual({ effects: KEYS, different: 0, refused: 0 })
    expect(waited).toBeGreaterThan(0)
    expect(broken).toBe(0)
  })

  it('answers so also while each process is killed', async ({ annotate }) => {
    const { waited, broken, ...came } = await race('sound', 'sound-killed', killBoth)
    await annotate(`${broken} broke off, ${waited} waited`)
    expect(came).toEqual({ effects: KEYS, different: 0, refused: 0 })
    expect(broken).toBeGreaterThan(0)
  })

  it('answers differently in the mutant no-key-lock', async () => {
    const { different, refused } = await race('no-key-lock', 'no-key-lock')
    expect(different).toBeGreaterThan(0)
    expect(refused).toBeGreaterThan(0)
  })

  it('has too many effects in the mutant record-apart where a process is killed', async () => {
    const { effects, refused } = await race('record-apart', 'record-apart', killBoth)
    expect(effects + refused).toBeGreaterThan(KEYS)
  })
})
