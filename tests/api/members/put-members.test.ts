import { afterAll, beforeAll, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { emailOf } from '#tests/support/people.ts'
import { createSampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const PATH = '/v1/systems/larkhaven/members'
const read = async () => (await test.people.admin.get(PATH).expect(200)).body
const put = (etag: string | undefined, items: object[]) => {
  const request = test.people.admin.put(PATH)
  if (etag !== undefined) request.set('If-Match', etag)
  return request.send({ items })
}
const wanted = async () =>
  (await read()).items.map(({ email, role }: { email: string; role: string }) => ({ email, role }))

it('takes effect at once, for who comes and for who goes', async () => {
  const before = await wanted()
  const stranger = { email: emailOf('stranger'), role: 'engineer' }
  const { body } = await put((await read()).etag, [...before, stranger]).expect(200)
  expect(body.items).toHaveLength(before.length + 1)
  await test.people.stranger.get(PATH).expect(200)
  await put(body.etag, before).expect(200)
  await test.people.stranger.get(PATH).expect(404)
})

it('leaves who stays a member since the day they came, also in another role', async () => {
  const { pool } = test.service.platform.database
  await pool.query('update memberships set created_at = created_at - interval 100 day')
  const before = await read()
  const items = (await wanted()).map(({ email }: { email: string }) => ({
    email,
    role: email === emailOf('engineer') ? 'maintainer' : 'engineer',
  }))
  const stranger = { email: emailOf('stranger'), role: 'engineer' }
  const { body } = await put(before.etag, [...items, stranger]).expect(200)
  const since = ({ items: all }: { items: { email: string; since: string }[] }) =>
    new Map(all.map((member) => [member.email, member.since]))
  const [was, is] = [since(before), since(body)]
  for (const [email, at] of was) expect(is.get(email)).toBe(at)
  expect(Date.parse(is.get(stranger.email) ?? '')).toBeGreaterThan(
    Math.max(...[...was.values()].map(Date.parse)),
  )
  const restored = before.items.map(({ email, role }: Record<string, string>) => ({ email, role }))
  await put(body.etag, restored).expect(200)
})

it('leaves the history of who goes: an assignment and comments keep their name', async () => {
  const { admin, lead, otherMaintainer } = test.people
  const system = await createSampleSystem(test)
  await system.addToken('soft', '#aaaaaa')
  await system.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
  const [breach] = await system.breaches()
  const url = `${system.url}/breaches/${breach?.id}`
  const { body: members } = await admin.get(`${system.url}/members`).expect(200)
  const isLeaving = ({ email }: { email: string }) => email === emailOf('otherMaintainer')
  const { id } = members.items.find(isLeaving)
  const assign = () => lead.patch(url).set('If-Match', '*').send({ assignee: id })
  await assign().expect(200)
  await otherMaintainer.post(`${url}/comments`).send({ body: 'On it' }).expect(201)
  const before = (await lead.get(url).expect(200)).body
  const stay = members.items.flatMap(({ email, role }: { email: string; role: string }) =>
    isLeaving({ email }) ? [] : [{ email, role }],
  )
  await admin
    .put(`${system.url}/members`)
    .set('If-Match', members.etag)
    .send({ items: stay })
    .expect(200)
  await otherMaintainer.get(url).expect(404)
  expect((await lead.get(url).expect(200)).body).toEqual(before)
  expect(before).toMatchObject({ assignee: { name: 'Pelle Strand' } })
  await lead.patch(url).set('If-Match', '*').send({ assignee: null }).expect(200)
  await assign().expect(422)
})

it('refuses an edit that names no version with 428, and a stale one with 412 and what is now', async () => {
  const { body: missing } = await put(undefined, []).expect(428)
  expect(missing.errors).toEqual([{ parameter: 'If-Match', detail: 'Missing' }])
  const now = await read()
  for (const stale of ['"stale"', `W/${now.etag}`, '']) {
    const { body } = await put(stale, []).expect(412)
    expect(body.current).toEqual(now)
  }
  await put(`"other", ${now.etag}`, await wanted()).expect(200)
  await put('*', await wanted()).expect(200)
})

it('lets one of two edits of the same version through', async () => {
  const { etag } = await read()
  const items = await wanted()
  const statuses = (
    await Promise.all([put(etag, items.slice(1)), put(etag, items.slice(0, -1))])
  ).map(({ status }) => status)
  expect(statuses.sort()).toEqual([200, 412])
  await put((await read()).etag, items).expect(200)
})

it('refuses people that are not there and people twice, each with its pointer', async () => {
  const engineer = { email: emailOf('engineer'), role: 'engineer' }
  const { body } = await put((await read()).etag, [
    engineer,
    { email: 'nobody@quay.test', role: 'engineer' },
    { email: engineer.email.toUpperCase(), role: 'maintainer' },
    { email: 'neither@quay.test', role: 'owner' },
  ]).expect(422)
  expect(body.errors).toEqual([
    {
      pointer: '/items/3/role',
      detail: 'Expected "engineer" or "maintainer" or "accessibility-lead"',
    },
  ])
  const { body: known } = await put((await read()).etag, [
    engineer,
    { email: 'nobody@quay.test', role: 'engineer' },
    { email: engineer.email.toUpperCase(), role: 'maintainer' },
  ]).expect(422)
  expect(known.errors.map(({ pointer }: { pointer: string }) => pointer)).toEqual([
    '/items/1/email',
    '/items/2/email',
  ])
})

it('leaves an audit entry for what moved, and none for an edit without effect', async () => {
  const count = async () => {
    const [rows] = await test.service.platform.database.pool.query<never[]>(
      `select details from audit_entries where action = 'members.replaced'
        and chain_id = (select id from systems where \`key\` = 'larkhaven') order by seq`,
    )
    return (rows as { details: string }[]).map(({ details }) => JSON.parse(details))
  }
  const before = (await count()).length
  const items = await wanted()
  await put((await read()).etag, items).expect(200)
  expect(await count()).toHaveLength(before)
  const lead = { email: emailOf('lead'), role: 'engineer' }
  await put((await read()).etag, [
    ...items.filter(({ email }: { email: string }) => email !== lead.email),
    lead,
  ]).expect(200)
  expect((await count()).at(-1).moves).toMatchObject([
    { before: 'accessibility-lead', after: 'engineer' },
  ])
})
