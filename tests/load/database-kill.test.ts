import { setTimeout as pause } from 'node:timers/promises'
import { createConnection, type RowDataPacket } from 'mysql2/promise'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { ApiError, type Call } from '#shared/client/client.ts'
import { createSystem } from '#shared/contracts/systems.contract.ts'
import { createToken, getToken, patchToken } from '#shared/contracts/tokens.contract.ts'
import { createKillableDatabase, type KillableDatabase } from '#tests/support/killable-database.ts'
import { createRaceTrack, type RaceTrack } from '#tests/support/races.ts'

/**
 * Two processes write while their database is killed and started again, round after round.
 * The numbers are common practice, no source.
 */
const ROUNDS = 6
const WRITERS = 8
const WRITES_A_ROUND = 60
const SYSTEM = 'killed'

let killable: KillableDatabase
let track: RaceTrack
beforeAll(async () => {
  killable = await createKillableDatabase()
  track = await createRaceTrack({ DATABASE_RELAXED_FLUSH: '0' }, killable.database)
})
afterAll(async () => {
  await track.close()
  await killable.stop()
})

/** What the clients were told, by token: the lightness acknowledged last, and every one sent since. */
interface Ledger {
  readonly acknowledged: Map<string, number>
  readonly unsure: Map<string, Set<number>>
  writes: number
  /** Readings of a value that is neither. */
  lost: number
  refusals: { status: number; retryAfterSeconds: number | undefined }[]
}

const lightnessOf = (step: number): number => Math.round((0.2 + (step % 600) / 1000) * 1000) / 1000

const greyOf = (lightness: number) => `oklch(${lightness} 0.02 250)`

/** One client: makes a token, then reads and writes it over and over, at the two processes in turn. */
async function write(writer: number, ledger: Ledger, run: Run): Promise<void> {
  const name = `writer-${writer}`
  for (let step = 1; !run.isOver; step += 1) {
    const call = run.track.client(step % 2 === 0 ? 0 : 1, 'sound')
    const lightness = ledger.acknowledged.has(name) ? lightnessOf(step * WRITERS + writer) : 0.5
    try {
      const etag = ledger.acknowledged.has(name) ? await read(call, name, ledger) : undefined
      doubt(ledger, name).add(lightness)
      await send(call, { name, etag, value: greyOf(lightness) })
      ledger.acknowledged.set(name, lightness)
      doubt(ledger, name).clear()
      ledger.writes += 1
    } catch (error) {
      if (!(error instanceof ApiError)) throw error
      const { status, retryAfterSeconds } = error
      if (status === 404) ledger.lost += 1
      ledger.refusals.push({ status, retryAfterSeconds })
      await pause(20)
    }
  }
}

async function read(call: Call, name: string, ledger: Ledger): Promise<string | undefined> {
  const { body, etag } = await call(getToken, { params: { system: SYSTEM, name } })
  if (typeof body.value === 'string' || !('components' in body.value))
    throw new TypeError('no color')
  const stored = Number(body.value.components[0])
  const allowed = [ledger.acknowledged.get(name), ...doubt(ledger, name)]
  if (!allowed.includes(stored)) ledger.lost += 1
  return etag
}

function send(call: Call, token: { name: string; etag: string | undefined; value: string }) {
  const { name, etag, value } = token
  return etag === undefined
    ? call(createToken, {
        params: { system: SYSTEM },
        idempotencyKey: `${name}-made`,
        body: { name, value },
      })
    : call(patchToken, { params: { system: SYSTEM, name }, ifMatch: etag, body: { value } })
}

function doubt({ unsure }: Ledger, name: string): Set<number> {
  const known = unsure.get(name) ?? new Set()
  unsure.set(name, known)
  return known
}

interface Run {
  readonly track: RaceTrack
  readonly killable: KillableDatabase
  isOver: boolean
}

/** Kills the database round after round, each time after a number of acknowledged writes. */
async function killUnderLoad(rounds: number, run: Run): Promise<Ledger> {
  const ledger: Ledger = {
    acknowledged: new Map(),
    unsure: new Map(),
    writes: 0,
    lost: 0,
    refusals: [],
  }
  await run.track.client(0, 'sound')(createSystem, { body: { key: SYSTEM, name: 'Killed' } })
  const writers = Promise.all(
    Array.from({ length: WRITERS }, (_, writer) => write(writer, ledger, run)),
  )
  for (let round = 0; round <= rounds; round += 1) {
    const until = ledger.writes + WRITES_A_ROUND
    while (ledger.writes < until && ledger.lost === 0) await pause(2)
    if (round < rounds) await run.killable.kill()
  }
  run.isOver = true
  await writers
  return ledger
}

async function rowsOf(sql: string): Promise<RowDataPacket[]> {
  const connection = await createConnection(killable.database.adminUrl)
  const [rows] = await connection.query<RowDataPacket[]>(sql)
  await connection.end()
  return rows
}

describe('a database that is killed while two processes write', () => {
  test('leaves every acknowledged write, and answers 503 with Retry-After meanwhile', async ({
    annotate,
  }) => {
    const pids = track.pids()
    const { lost, writes, refusals } = await killUnderLoad(ROUNDS, {
      track,
      killable,
      isOver: false,
    })
    await annotate(`${writes} acknowledged, ${refusals.length} refused`)
    expect(lost).toBe(0)
    // 412: its own write came through unanswered, between its reading and its next write.
    expect(refusals.filter(({ status }) => status !== 503 && status !== 412)).toEqual([])
    const away = refusals.filter(({ status }) => status === 503)
    expect(away.length).toBeGreaterThan(0)
    expect(away.filter(({ retryAfterSeconds }) => retryAfterSeconds === undefined)).toEqual([])
    expect(track.pids()).toEqual(pids)
  })

  test('leaves a revision and an audit entry for each write, without a gap', async () => {
    const [system] = await rowsOf(
      `select s.id, h.revision, (select count(*) from revisions r where r.system_id = s.id) as revisions,
              (select count(*) from audit_entries a where a.chain_id = s.id) as entries,
              (select last_seq from audit_chains c where c.chain_id = s.id) as last_seq
         from systems s join system_heads h on h.system_id = s.id where s.\`key\` = '${SYSTEM}'`,
    )
    expect(Number(system?.revisions)).toBe(Number(system?.revision) + 1)
    expect(Number(system?.entries)).toBe(Number(system?.last_seq))
    const versions = await rowsOf(
      `select count(*) as overlapping from token_versions a join token_versions b
           on a.token_id = b.token_id and a.from_revision < b.from_revision
          and a.to_revision > b.from_revision`,
    )
    expect(Number(versions[0]?.overlapping)).toBe(0)
  })

  test('has lost acknowledged writes where the server does not flush at commit', async () => {
    const unsafe = await createKillableDatabase({ flush: false })
    const lossy = await createRaceTrack({ DATABASE_RELAXED_FLUSH: '1' }, unsafe.database)
    try {
      const { lost } = await killUnderLoad(ROUNDS, {
        track: lossy,
        killable: unsafe,
        isOver: false,
      })
      expect(lost).toBeGreaterThan(0)
    } finally {
      await lossy.close()
      await unsafe.stop()
    }
  })
})
