import type { RowDataPacket } from 'mysql2/promise'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { WRITE_GUARDS } from '#api/features/revisions/write-guards.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
/** Runs once, just before the next write takes its lock. */
let beforeLock: (() => Promise<void>) | undefined
beforeAll(async () => {
  const writeGuards: typeof WRITE_GUARDS = {
    ...WRITE_GUARDS,
    async lock(heads, systemId) {
      const meanwhile = beforeLock
      beforeLock = undefined
      await meanwhile?.()
      return WRITE_GUARDS.lock(heads, systemId)
    },
  }
  test = await createTestApp({ platform: { writeGuards } })
})
beforeEach(async () => {
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

const read = async () => (await system.maintainer.get(system.url).expect(200)).body
const patch = async (body: object, agent = system.maintainer) =>
  agent
    .patch(system.url)
    .set('If-Match', (await read()).etag)
    .send(body)

/** The newest first. */
async function auditEntries() {
  const [rows] = await test.service.platform.database.pool.query<RowDataPacket[]>(
    'select action, details from audit_entries where chain_id = ? order by seq desc',
    [(await read()).id],
  )
  return rows.map(({ action, details }) => ({ action, details: JSON.parse(details) }))
}

describe('patchSystem', () => {
  it('answers the breaches that a higher level opens, as one revision', async () => {
    await system.addToken('note', '#666666')
    await system.addPair({ foreground: 'note', background: 'paper', use: 'text' })
    const before = await read()
    // #666666 on white is 5.74: enough for AA, short of 7 for AAA (WCAG 2.2, 1.4.6).
    const { body } = await patch({ level: 'AAA', message: 'Read in glare' })
    expect(body).toMatchObject({
      level: 'AAA',
      counts: { openBreaches: 1 },
      head: { revision: before.head.revision + 1, verdict: 'fail' },
      effect: { opened: [{ foreground: 'note', required: 7 }] },
    })
    const lowered = await patch({ level: 'AA' }, test.people.lead)
    expect(lowered.body.effect.resolved).toMatchObject([{ foreground: 'note' }])
    expect(await system.breaches('?status=resolved')).toMatchObject([
      { closingReason: 'requirement-changed' },
    ])
  })

  it('answers a floor for disabled, and takes it away again', async () => {
    expect((await patch({ disabledFloor: 2 })).body.disabledFloor).toBe(2)
    const { body } = await patch({ disabledFloor: null }, test.people.admin)
    expect(body.disabledFloor).toBeNull()
  })

  it('leaves the revision where only name and write mode change', async () => {
    const before = await read()
    const { body } = await patch({ name: 'Ferries', writeMode: 'review' })
    expect(body).toMatchObject({
      name: 'Ferries',
      writeMode: 'review',
      head: before.head,
      effect: { revision: before.head.revision },
    })
  })

  it('refuses settings under review, and a maintainer who would end it; the lead may', async () => {
    await patch({ writeMode: 'review' })
    const refused = await patch({ level: 'AAA', name: 'Half' })
    expect([refused.status, refused.body.type]).toEqual([409, '/problems/review-required'])
    expect((await read()).name).not.toBe('Half')
    expect((await patch({ writeMode: 'direct' })).status).toBe(403)
    expect((await patch({ writeMode: 'direct' }, test.people.lead)).body.writeMode).toBe('direct')
  })

  it('refuses to end a review that began while the edit waited for its turn', async () => {
    beforeLock = async () => {
      await patch({ writeMode: 'review' }, test.people.lead)
    }
    const answer = await system.maintainer
      .patch(system.url)
      .set('If-Match', '*')
      .send({ writeMode: 'direct' })
    expect([answer.status, answer.body.type]).toEqual([403, '/problems/role-missing'])
    expect((await read()).writeMode).toBe('review')
  })

  it('leaves the revision where only protected branches change, and says so in the audit log', async () => {
    const before = await read()
    expect(before.protectedBranches).toEqual([])
    const main = { repository: 'quay/timetable', branch: 'main' }
    const release = { repository: 'quay/*', branch: 'release-*' }
    const { body } = await patch({
      protectedBranches: [main, { ...main, branch: 'refs/heads/main' }, release],
    })
    expect(body).toMatchObject({ protectedBranches: [main, release], head: before.head })
    expect((await read()).protectedBranches).toEqual([main, release])
    const [entry] = await auditEntries()
    expect(entry).toMatchObject({
      action: 'system.edited',
      details: { protectedBranches: [main, release] },
    })
  })

  it('leaves it to the lead to take a protected branch away', async () => {
    const main = { repository: 'quay/timetable', branch: 'main' }
    const wide = { repository: 'quay/timetable', branch: '*' }
    await patch({ protectedBranches: [main] })
    expect((await patch({ protectedBranches: [wide, main] })).status).toBe(200)
    const refused = await patch({ protectedBranches: [wide], name: 'Half' })
    expect([refused.status, refused.body.type]).toEqual([403, '/problems/role-missing'])
    expect(refused.body.detail).toContain('main of quay/timetable')
    expect(await read()).toMatchObject({ protectedBranches: [wide, main] })
    expect((await read()).name).not.toBe('Half')
    const byLead = await patch({ protectedBranches: [] }, test.people.lead)
    expect(byLead.body.protectedBranches).toEqual([])
  })

  it('refuses patterns that name nothing', async () => {
    const { status, body } = await patch({
      protectedBranches: [
        { repository: ' ', branch: 'main' },
        { repository: 'a', branch: 'b\u0000' },
        { repository: 'a' },
      ],
    })
    expect([status, body.errors.map(({ pointer }: { pointer: string }) => pointer)]).toEqual([
      422,
      [
        '/protectedBranches/0/repository',
        '/protectedBranches/1/branch',
        '/protectedBranches/2/branch',
      ],
    ])
  })

  it('leaves names and protected branches open under review', async () => {
    await patch({ writeMode: 'review' })
    const protectedBranches = [{ repository: 'quay/timetable', branch: 'main' }]
    expect((await patch({ name: 'Ferries', protectedBranches })).status).toBe(200)
  })

  it('refuses the lead what is not level, write mode and protected branches', async () => {
    expect((await patch({ level: 'AAA' }, test.people.lead)).status).toBe(200)
    for (const body of [{ name: 'X' }, { p3Gates: true }, { disabledFloor: 2 }]) {
      expect((await patch(body, test.people.lead)).status).toBe(403)
    }
  })

  it.each([{ name: 'Ferries' }, { writeMode: 'review' }, { level: 'AAA' }])(
    'answers one of two edits at once that were meant for the same system: %j',
    async (body) => {
      const { etag } = await read()
      const rename = { name: 'Larkhaven' }
      const answers = await Promise.all(
        [body, rename, rename].map((edit) =>
          system.maintainer.patch(system.url).set('If-Match', etag).send(edit),
        ),
      )
      expect(answers.map(({ status }) => status).toSorted()).toEqual([200, 412, 412])
    },
  )

  it('refuses an edit without, and with a stale If-Match', async () => {
    await system.maintainer.patch(system.url).send({ name: 'X' }).expect(428)
    const { etag } = await read()
    await system.addToken('further', '#fff')
    const stale = await system.maintainer
      .patch(system.url)
      .set('If-Match', etag)
      .send({ name: 'X' })
      .expect(412)
    expect(stale.body.current).toEqual(await read())
  })
})
