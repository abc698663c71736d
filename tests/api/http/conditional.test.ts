import { afterAll, beforeAll, expect, it } from 'vitest'
import { readVectors } from '#tests/conformance/read-vectors.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

interface Row {
  readonly method: 'GET' | 'HEAD' | 'PUT' | 'PATCH' | 'DELETE'
  /** Absent: there is no representation yet. */
  readonly currentETag: string | null
  readonly ifMatch?: string
  readonly ifNoneMatch?: string
  readonly expectStatus: number
  readonly note: string
}
const { cases } = readVectors<{ readonly cases: readonly Row[] }>('http-conditional')

/** The row has 412; a PATCH here needs If-Match, and what it lacks is asked for first. Nothing is written either way. */
const isDemandedFirst = ({ method, ifMatch, ifNoneMatch }: Row) =>
  method === 'PATCH' && ifMatch === undefined && ifNoneMatch !== undefined

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
})
afterAll(() => test.close())

const THEME = {
  name: 'Conditional',
  ground: 'paper',
  ink: 'ink',
  rule: { kind: 'keep' },
  gating: true,
  values: { paper: { rest: '#0b1220' }, ink: { rest: '#ffffff' } },
}

/** A theme of its own for each row; where one exists, its tag stands for the `a1` of the row. */
async function send(row: Row, url: string) {
  let tag = ''
  if (row.currentETag !== null) {
    const made = await system.maintainer.put(url).set('If-None-Match', '*').send(THEME).expect(201)
    tag = String(made.headers.etag)
  }
  const named = (field: string) => field.replaceAll('"a1"', tag)
  const method = row.method.toLowerCase() as 'get' | 'head' | 'put' | 'patch' | 'delete'
  const request = system.maintainer[method](url)
  if (row.ifMatch !== undefined) request.set('If-Match', named(row.ifMatch))
  if (row.ifNoneMatch !== undefined) request.set('If-None-Match', named(row.ifNoneMatch))
  if (method === 'put') return request.send({ ...THEME, name: 'Conditional, edited' })
  return method === 'patch' ? request.send({ name: 'Conditional, edited' }) : request
}

// Validators here are strong, so a row whose own tag is weak is sent with a strong one: its outcome is the same.
it.each(cases.map((row, at) => ({ ...row, at })))(
  'answers $method of $currentETag with If-Match $ifMatch, If-None-Match $ifNoneMatch: $expectStatus',
  async ({ at, ...row }) => {
    const url = `${system.url}/themes/conditional-${at}`
    const { status, headers } = await send(row, url)
    if (row.expectStatus < 300) expect(Math.floor(status / 100)).toBe(2)
    else expect(status).toBe(isDemandedFirst(row) ? 428 : row.expectStatus)
    if (status === 304) expect(headers).toHaveProperty('etag')
    const { body } = await system.maintainer.get(url)
    if (status === 412 || status === 428) {
      expect(body.name).toBe(row.currentETag === null ? undefined : 'Conditional')
    }
    await remove(url)
  },
)

it('refuses to create where If-Match names what is not there, If-None-Match: * or not', async () => {
  const url = `${system.url}/themes/conditional-both`
  const both = { 'If-Match': '"zz"', 'If-None-Match': '*' }
  await system.maintainer.put(url).set(both).send(THEME).expect(412)
  await system.maintainer.get(url).expect(404)
})

/** A system holds eight themes at most. */
async function remove(url: string): Promise<void> {
  const { headers, status } = await system.maintainer.get(url)
  if (status === 200) {
    await system.maintainer.delete(url).set('If-Match', String(headers.etag))
  }
}
