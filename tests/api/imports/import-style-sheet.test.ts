import { afterAll, beforeAll, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

const SHEET = `:root {
  --paper: #fff;
  --ink: #111;
  --action-fill: oklch(0.5 0.12 250);
  --action-label: var(--paper);
  --gap: 4px;
}
[data-theme="dark"] { --paper: #0b1020; --ink: #eef2ff }`

it('answers custom properties as tokens, themes as themes, and lists what is left out', async () => {
  await test.createSystem('sheet')
  const url = '/v1/systems/sheet'
  const { maintainer } = test.people
  const { body } = await maintainer
    .post(`${url}/imports?hyphensAsDots=true&ground=paper&ink=ink`)
    .attach('file', Buffer.from(SHEET), { filename: 'brand.css', contentType: 'text/css' })
    .expect(200)
  expect(body.counts).toMatchObject({ tokens: { added: 4 }, themes: { added: 2 } })
  expect(body.notes).toMatchObject([{ kind: 'left-out', line: 6 }])
  expect(body.notes[0].detail).toContain('--gap')
  const { body: label } = await maintainer.get(`${url}/tokens/action.label`).expect(200)
  expect(label.value).toBe('{paper}')
  expect(label.resolved.dark.rest.hex).toBe('#0b1020')
})

it('answers the same sheet sent as a text of JSON', async () => {
  const system = await createSampleSystem(test)
  const { body } = await system.maintainer
    .post(`${system.url}/imports?dryRun=true`)
    .set('Content-Type', 'application/json')
    .send(JSON.stringify(':root { --action-fill: #123 }'))
    .expect(200)
  expect(body.changes).toMatchObject([{ operation: 'added', name: 'action-fill' }])
})

it('answers a reference to a token of the system, and lists one to nothing', async () => {
  const system = await createSampleSystem(test)
  const { body } = await system.maintainer
    .post(`${system.url}/imports`)
    .attach('file', Buffer.from(':root { --note: var(--ink);\n --odd: var(--nowhere) }'), 'a.css')
    .expect(200)
  expect(body.counts.tokens.added).toBe(1)
  expect(body.notes).toMatchObject([{ kind: 'left-out', line: 2 }])
})

it('refuses every fault of a sheet with its line, and takes none of the rest', async () => {
  const system = await createSampleSystem(test)
  const sheet = ':root { --mark: #f00 }\n[data-theme="dark"] { --a: #fff;\n --b: #fff }'
  const { body } = await system.maintainer
    .post(`${system.url}/imports`)
    .attach('file', Buffer.from(sheet), 'a.css')
    .expect(422)
  const details = body.errors.map(({ detail }: { detail: string }) => detail)
  expect(details).toEqual([
    expect.stringMatching(/^Line 2, --a: /),
    expect.stringMatching(/^Line 3, --b: /),
  ])
  await system.maintainer.get(`${system.url}/tokens/mark`).expect(404)
})

it.each([
  ['a sheet that is broken', ':root { --a: #fff'],
  [
    '20,001 properties',
    `:root {${Array.from({ length: 20_001 }, (_, at) => `--a${at}:#fff`).join(';')}}`,
  ],
])('refuses %s', async (_, sheet) => {
  const system = await createSampleSystem(test)
  await system.maintainer
    .post(`${system.url}/imports`)
    .attach('file', Buffer.from(sheet), 'a.css')
    .expect(422)
})
