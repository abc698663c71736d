import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
let url: string
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

beforeEach(async () => {
  system = await createSampleSystem(test)
  await system.addToken('soft', '#aaaaaa')
  await system.addPair({ foreground: 'soft', background: 'paper', use: 'text' })
  const [breach] = await system.breaches()
  url = `${system.url}/breaches/${breach?.id}`
})

const read = async () => (await test.people.engineer.get(url).expect(200)).body
const say = (body: unknown, who: 'engineer' | 'maintainer' | 'lead' | 'admin' = 'engineer') =>
  test.people[who].post(`${url}/comments`).send({ body })

it('answers the comment with who and when, and keeps it in the history', async () => {
  const before = await read()
  const { body, headers } = await say('  The new lamp ships in 3.3.0.\n ').expect(201)
  expect(body).toMatchObject({
    kind: 'commented',
    body: 'The new lamp ships in 3.3.0.',
    actor: { name: 'Tove Lind' },
    ratio: before.ratio,
  })
  expect(headers.location).toBe(url)
  const after = await read()
  expect(after.events).toEqual([...before.events, body])
  expect({ ...after, events: [], etag: '' }).toEqual({ ...before, events: [], etag: '' })
  expect(after.etag).not.toBe(before.etag)
})

it('takes a comment of every member and of an admin, in the order of their making', async () => {
  for (const who of ['engineer', 'maintainer', 'lead', 'admin'] as const) {
    await say(`From ${who}`, who).expect(201)
  }
  const { events } = await read()
  expect(events.slice(1).map(({ body }: { body: string }) => body)).toEqual([
    'From engineer',
    'From maintainer',
    'From lead',
    'From admin',
  ])
})

it('leaves what looks like markup as it is', async () => {
  const text = '<img src=x onerror=alert(1)> **bold** [a](javascript:b) \n=1+1 \u202e 🎨 “quoted”'
  const { body } = await say(text).expect(201)
  expect(body.body).toBe(text)
  expect((await read()).events.at(-1).body).toBe(text)
})

it('takes 1 to 4000 characters', async () => {
  await say('x'.repeat(4000)).expect(201)
  for (const body of ['', ' \n\t', 'x'.repeat(4001), 7, null]) {
    const refused = await say(body).expect(422)
    expect(refused.body.errors).toMatchObject([{ pointer: '/body' }])
  }
  expect((await read()).events).toHaveLength(2)
})

it('takes a comment once where it is sent again with its Idempotency-Key', async () => {
  const send = () =>
    test.people.lead
      .post(`${url}/comments`)
      .set('Idempotency-Key', '"a comment"')
      .send({ body: 'Once' })
      .expect(201)
  const [first, second] = [await send(), await send()]
  expect(second.body).toEqual(first.body)
  expect((await read()).events).toHaveLength(2)
})

it('keeps every one of parallel comments', async () => {
  await Promise.all(Array.from({ length: 8 }, (_, at) => say(`Number ${at}`).expect(201)))
  const bodies = (await read()).events.flatMap(({ body }: { body?: string }) => body ?? [])
  expect(bodies.toSorted()).toEqual(Array.from({ length: 8 }, (_, at) => `Number ${at}`))
})

it('logs who commented in the audit, without the text', async () => {
  const { body } = await say('A word about a supplier').expect(201)
  const [rows] = await test.service.platform.database.pool.query(
    "select details, actor_id from audit_entries where action = 'breach.commented' and subject = ?",
    [url.split('/').at(-1)],
  )
  expect(rows).toMatchObject([
    { details: JSON.stringify({ event: body.id }), actor_id: body.actor.id },
  ])
})

it('takes a comment on a resolved breach, and leaves its status to checks', async () => {
  await system.editToken('soft', { value: '#000000' })
  await say('Thank you').expect(201)
  expect(await read()).toMatchObject({ status: 'resolved', closingReason: 'fixed' })
})

it('refuses what is not there, a key, and a stranger', async () => {
  const absent = `${system.url}/breaches/brc_nowhere/comments`
  await test.people.lead.post(absent).send({ body: 'x' }).expect(404)
  await test.people.stranger.post(`${url}/comments`).send({ body: 'x' }).expect(404)
  const made = await system.maintainer
    .post(`${system.url}/keys`)
    .send({ name: 'pipeline', scopes: ['checks:write', 'tokens:write', 'themes:read'] })
    .expect(201)
  const { body } = await test
    .withKey(made.body.key)
    .post(`${url}/comments`)
    .send({ body: 'x' })
    .expect(403)
  expect(body.detail).toBe('No key may do this: sign in')
})
