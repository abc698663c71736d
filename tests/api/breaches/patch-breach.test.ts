import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import type { Agent } from '#tests/support/people.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
let url: string
let people: Map<string, string>
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
  const { body } = await test.people.lead.get(`${system.url}/members`).expect(200)
  people = new Map(body.items.map(({ id, name }: { id: string; name: string }) => [name, id]))
})

const read = async () => (await test.people.engineer.get(url).expect(200)).body
const assign = (agent: Agent, assignee: unknown, etag: string) =>
  agent.patch(url).set('If-Match', etag).send({ assignee })
const audited = async (action: string) => {
  const [rows] = await test.service.platform.database.pool.query(
    'select details, subject from audit_entries where action = ? order by seq',
    [action],
  )
  return (rows as { details: string; subject: string }[]).filter(({ subject }) =>
    url.endsWith(subject),
  )
}

it('says who is on it, in the entry, the list and the history, by whom', async () => {
  const ines = people.get('Ines Marrow')
  const { etag } = await read()
  const { body, headers } = await assign(test.people.lead, ines, etag).expect(200)
  expect(body.assignee).toEqual({ id: ines, name: 'Ines Marrow' })
  expect(headers.etag).toBe(body.etag)
  expect(body.events.at(-1)).toMatchObject({
    kind: 'assigned',
    assignee: { id: ines },
    actor: { name: 'Noor Haddad' },
    ratio: body.ratio,
    required: 4.5,
  })
  expect(body).toEqual(await read())
  expect((await system.breaches())[0]?.assignee?.id).toBe(ines)
  expect(await audited('breach.assigned')).toMatchObject([
    { details: JSON.stringify({ after: ines, before: null }) },
  ])
})

it('leaves a breach to another, and to nobody, each with its event', async () => {
  const { lead } = test.people
  const [ines, tove] = [people.get('Ines Marrow'), people.get('Tove Lind')]
  const first = await assign(lead, ines, (await read()).etag).expect(200)
  const second = await assign(lead, tove, first.body.etag).expect(200)
  const { body } = await assign(lead, null, second.body.etag).expect(200)
  expect(body.assignee).toBeNull()
  expect(body.events.slice(1)).toMatchObject([
    { kind: 'assigned', assignee: { id: ines } },
    { kind: 'assigned', assignee: { id: tove } },
    { kind: 'unassigned', assignee: { id: tove } },
  ])
})

it('leaves neither event nor audit of an assignment that changes nothing', async () => {
  const before = await read()
  const { body } = await assign(test.people.lead, null, before.etag).expect(200)
  expect(body).toEqual(before)
  expect(await audited('breach.assigned')).toEqual([])
})

it('takes the accessibility lead or an admin: others are told so, for themselves as well', async () => {
  const { etag } = await read()
  for (const [agent, name] of [
    [test.people.engineer, 'Tove Lind'],
    [test.people.maintainer, 'Ines Marrow'],
  ] as const) {
    const { body } = await assign(agent, people.get(name), etag).expect(403)
    expect(body).toMatchObject({ roles: ['accessibility-lead', 'admin'] })
    expect(body.detail).toContain('accessibility-lead')
  }
  await assign(test.people.admin, people.get('Tove Lind'), etag).expect(200)
})

it('refuses who is no member, whoever that is, and leaves the entry alone', async () => {
  const before = await read()
  const admin = (await test.people.admin.get('/v1/me').expect(200)).body.user.id
  for (const stranger of ['usr_nobody', admin]) {
    const { body } = await assign(test.people.lead, stranger, before.etag).expect(422)
    expect(body.errors).toMatchObject([{ pointer: '/assignee' }])
  }
  for (const body of [{}, { assignee: 7 }, { assignee: null, status: 'resolved' }]) {
    await test.people.lead.patch(url).set('If-Match', before.etag).send(body).expect(422)
  }
  expect(await read()).toEqual(before)
})

it('refuses an edit that names no version with 428, and a stale one with 412 and what is now', async () => {
  await test.people.lead.patch(url).send({ assignee: null }).expect(428)
  const { etag } = await read()
  await test.people.engineer.post(`${url}/comments`).send({ body: 'Mine?' }).expect(201)
  const { body } = await assign(test.people.lead, people.get('Tove Lind'), etag).expect(412)
  expect(body.current).toEqual(await read())
})

it('lets one of parallel assignments of the same version through', async () => {
  const { etag } = await read()
  const names = ['Ines Marrow', 'Tove Lind', 'Pelle Strand', 'Noor Haddad']
  const answers = await Promise.all(
    names.map((name) => assign(test.people.lead, people.get(name), etag)),
  )
  const statuses = answers.map(({ status }) => status)
  expect(statuses.toSorted()).toEqual([200, 412, 412, 412])
  const winner = names[statuses.indexOf(200)]
  const { assignee, events } = await read()
  expect(assignee.name).toBe(winner)
  expect(events).toHaveLength(2)
})

it('leaves the assignee where the breach is measured anew, resolved and opened again', async () => {
  const tove = people.get('Tove Lind')
  await assign(test.people.lead, tove, (await read()).etag).expect(200)
  for (const value of ['#bbbbbb', '#000000', '#aaaaaa']) await system.editToken('soft', { value })
  expect(await read()).toMatchObject({ status: 'open', assignee: { id: tove } })
})

it('answers 404 for what is not there, and to a stranger', async () => {
  const absent = `${system.url}/breaches/brc_nowhere`
  await test.people.lead.patch(absent).set('If-Match', '*').send({ assignee: null }).expect(404)
  await test.people.stranger.patch(url).set('If-Match', '*').send({ assignee: null }).expect(404)
})
