import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { ApiError, type Call } from '#shared/client/client.ts'
import { createSystem } from '#shared/contracts/systems.contract.ts'
import { createToken, getToken, patchToken } from '#shared/contracts/tokens.contract.ts'
import type { Variant } from '#tests/support/race-server.ts'
import { createRaceTrack, type RaceTrack } from '#tests/support/races.ts'

/**
 * Several clients at two processes count up in one token, each from what it has just read. A lost update shows
 * as a count that is lower than the edits that were acknowledged. Common practice, no source.
 */
let track: RaceTrack
beforeAll(async () => {
  track = await createRaceTrack()
})
afterAll(() => track.close())

const NAME = 'counter'
const CLIENTS = 4

async function prepare(system: string): Promise<void> {
  const call = track.client(0, 'sound')
  await call(createSystem, { body: { key: system, name: system } })
  const body = { name: NAME, value: '#fff', description: '0' }
  await call(createToken, { params: { system }, body })
}

interface Tally {
  acknowledged: number
  refused: number
  failed: number
}

/** One client counts up until so many of its edits are acknowledged, or given up as failed. */
async function countUp(call: Call, system: string, edits: number, tally: Tally): Promise<void> {
  const params = { system, name: NAME }
  let done = 0
  while (done < edits) {
    const { body } = await call(getToken, { params })
    const description = String(Number(body.description) + 1)
    try {
      await call(patchToken, { params, body: { description }, ifMatch: body.etag })
      tally.acknowledged += 1
      done += 1
    } catch (error) {
      if (!(error instanceof ApiError)) throw error
      if (error.status === 412) {
        tally.refused += 1
      } else {
        tally.failed += 1
        done += 1
      }
    }
  }
}

async function race(variant: Variant, edits: number) {
  const system = `lost-${variant}`
  await prepare(system)
  const tally: Tally = { acknowledged: 0, refused: 0, failed: 0 }
  const clients = Array.from({ length: CLIENTS }, (_, at) =>
    track.client(at % 2 === 0 ? 0 : 1, variant),
  )
  await Promise.all(clients.map((call) => countUp(call, system, edits, tally)))
  const params = { system, name: NAME }
  const { body } = await track.client(0, 'sound')(getToken, { params })
  return { ...tally, counted: Number(body.description) }
}

describe('one token, edited from two processes', () => {
  it('leaves no edit out: 4 clients × 100', async ({ annotate }) => {
    const { acknowledged, refused, failed, counted } = await race('sound', 100)
    await annotate(
      `${acknowledged} edits, ${refused} refused with 412, ${acknowledged - counted} lost`,
    )
    expect({ acknowledged, failed, counted }).toEqual({
      acknowledged: 400,
      failed: 0,
      counted: 400,
    })
    expect(refused).toBeGreaterThan(0)
  })

  it('refuses an edit that does not say what it is meant for', async () => {
    await prepare('lost-unconditional')
    const edit = track.client(1, 'sound')(patchToken, {
      params: { system: 'lost-unconditional', name: NAME },
      body: { description: '1' },
      // As a client of another make would: the type asks for it, the wire can leave it out.
      ifMatch: undefined as unknown as string,
    })
    await expect(edit).rejects.toMatchObject({ status: 428 })
  })

  it.each(['no-version-compare', 'no-lock', 'stale-snapshot'] as const)(
    'loses edits in the mutant %s',
    async (variant) => {
      const { acknowledged, counted } = await race(variant, 25)
      expect(counted).toBeLessThan(acknowledged)
    },
  )
})
