import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { checkSystem } from '#shared/checks/check-system.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import { ApiError, type Call } from '#shared/client/client.ts'
import { createPair } from '#shared/contracts/pairs.contract.ts'
import { getRevision } from '#shared/contracts/revisions.contract.ts'
import { modelFromWire } from '#shared/contracts/system-model.ts'
import { createSystem, getSystem } from '#shared/contracts/systems.contract.ts'
import { putTheme } from '#shared/contracts/themes.contract.ts'
import { createToken, getToken, patchToken } from '#shared/contracts/tokens.contract.ts'
import type { Variant } from '#tests/support/race-server.ts'
import { createRaceTrack, type RaceTrack } from '#tests/support/races.ts'

/**
 * Two editors at two processes: one moves a foreground, the other its background. Each move alone is legal,
 * both together breach. Whichever comes second must be judged on what the first left. Common
 * practice, no source.
 */
let track: RaceTrack
beforeAll(async () => {
  track = await createRaceTrack()
})
afterAll(() => track.close())

/** Required 4.5 (WCAG 2.2, 1.4.3). Rest: 7.9; foreground moved: 4.7; background moved: 4.9; both: 2.9. */
const COLORS = {
  foreground: { rest: 'oklch(0.4 0 0)', moved: 'oklch(0.52 0 0)' },
  background: { rest: 'oklch(0.95 0 0)', moved: 'oklch(0.8 0 0)' },
} as const
type Side = keyof typeof COLORS

async function prepare(system: string): Promise<Record<Side, string>> {
  const call = track.client(0, 'sound')
  const params = { system }
  await call(createSystem, { body: { key: system, name: system } })
  const values = {
    paper: '#fff',
    print: '#000',
    foreground: COLORS.foreground.rest,
    background: COLORS.background.rest,
  }
  for (const [name, value] of Object.entries(values)) {
    await call(createToken, { params, body: { name, value } })
  }
  await call(putTheme, {
    params: { ...params, theme: 'light' },
    body: { name: 'Light', ground: 'paper', ink: 'print' },
    ifNoneMatch: '*',
  })
  await call(createPair, {
    params,
    body: { foreground: 'foreground', background: 'background', use: 'text' },
  })
  const etagOf = async (name: Side) =>
    (await call(getToken, { params: { ...params, name } })).body.etag
  return { foreground: await etagOf('foreground'), background: await etagOf('background') }
}

interface Editor {
  readonly call: Call
  readonly system: string
  readonly side: Side
}

async function move({ call, system, side }: Editor, to: 'rest' | 'moved', ifMatch: string) {
  const { body } = await call(patchToken, {
    params: { system, name: side },
    body: { value: COLORS[side][to] },
    ifMatch,
  })
  return { etag: body.etag, revision: body.effect.revision }
}

/** Whether a revision's stored verdict is that of a full check of the revision, made afresh here. */
async function isTrue(system: string, number: number): Promise<boolean> {
  const { body } = await track.client(1, 'sound')(getRevision, { params: { system, number } })
  const { states, prefixes, settings, tokens, pairs, themes } = body
  const checked = checkSystem(
    modelFromWire({ system: settings, tokens, pairs, themes, rules: { states, prefixes } }),
  )
  return checked.ok && verdictOf(checked.evaluation).verdict === body.verdict
}

/** Races both moves, then checks the revisions and moves back; stops at the first wrong verdict if asked to. */
async function race(variant: Variant, { races, until }: { races: number; until: 'end' | 'wrong' }) {
  const system = `skew-${variant}`
  const tags = await prepare(system)
  const editors: Editor[] = [
    { call: track.client(0, variant), system, side: 'foreground' },
    { call: track.client(1, variant), system, side: 'background' },
  ]
  let wrong = 0
  let run = 0
  let overlapping = 0
  while (run < races && (until === 'end' || wrong === 0)) {
    run += 1
    const overlapsBefore = track.overlaps()
    for (const to of ['moved', 'rest'] as const) {
      const moves = await Promise.allSettled(
        editors.map(async (editor) => {
          const moved = await move(editor, to, tags[editor.side])
          tags[editor.side] = moved.etag
        }),
      )
      for (const { reason } of moves.filter((one) => one.status === 'rejected')) {
        // Mutants may also fail outright; the service as it is never does.
        if (variant === 'sound' || !(reason instanceof ApiError)) throw reason
      }
      if (to === 'moved') {
        // The second of the two found, under the lock, that the first had moved the head.
        if (track.overlaps() > overlapsBefore) overlapping += 1
        const { body } = await editors[0]!.call(getSystem, { params: { system } })
        if (!(await isTrue(system, body.head.revision))) wrong += 1
      }
    }
  }
  return { run, wrong, overlapping }
}

describe('the two sides of a pair, moved from two processes', () => {
  it('calls no breach a pass: 200 races, at least 30 % of them overlapping', async ({
    annotate,
  }) => {
    const { run, wrong, overlapping } = await race('sound', { races: 200, until: 'end' })
    await annotate(`${run} races, ${overlapping} overlapped, ${wrong} wrong verdicts`)
    expect({ run, wrong }).toEqual({ run: 200, wrong: 0 })
    expect(overlapping).toBeGreaterThanOrEqual(0.3 * run)
  })

  it.each(['no-version-compare', 'no-lock', 'stale-snapshot'] as const)(
    'calls a breach a pass in the mutant %s',
    async (variant) => {
      const { wrong } = await race(variant, { races: 60, until: 'wrong' })
      expect(wrong).toBeGreaterThan(0)
    },
  )
})
