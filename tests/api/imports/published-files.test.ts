import { afterAll, beforeAll, expect, it } from 'vitest'
import { readVectors } from '#tests/conformance/read-vectors.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, type SampleSystem } from '#tests/support/sample-system.ts'

interface Case {
  readonly file: string
  readonly about: string
  readonly document: object
}
const valid = readVectors<{ readonly cases: readonly Case[] }>('dtcg-valid')
const invalid = readVectors<{ readonly cases: readonly Case[] }>('dtcg-invalid')

let test: TestApp
let system: SampleSystem
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  await test.createSystem('published')
  await test.createSystem('spanned')
  for (const [name, value] of Object.entries(SPAN)) {
    await system.maintainer.post(`${SPANNED}/tokens`).send({ name, value }).expect(201)
  }
})
afterAll(() => test.close())

/** A file of another making names neither ground nor ink: its themes stand on these. */
const SPAN = { paper: '#ffffff', ink: '#000000' }
const SPANNED = '/v1/systems/spanned'
const EMPTY = '/v1/systems/published'
const dryRun = (url: string, document: object, query = '') =>
  system.maintainer.post(`${url}/imports?dryRun=true${query}`).send(document)

const tokenFiles = valid.cases.filter(({ file }) => !file.endsWith('.resolver.json'))

it.each(tokenFiles)('answers $file: $about', async ({ document }) => {
  const { body } = await dryRun(EMPTY, document).expect(200)
  const { added, edited, removed } = body.counts.tokens
  const other = body.changes.some(({ item }: { item: string }) => item === 'other')
  expect({ edited, removed, isRead: added > 0 || other }).toEqual({
    edited: 0,
    removed: 0,
    isRead: true,
  })
})

it.each(valid.cases.filter(({ file }) => file.endsWith('.resolver.json')))(
  'answers $file on a ground and an ink that are named beside it: $about',
  async ({ document }) => {
    const { body } = await dryRun(SPANNED, document, '&ground=paper&ink=ink').expect(200)
    const { themes, tokens } = body.counts
    expect(themes.added).toBeGreaterThan(1)
    expect(tokens).toMatchObject({ removed: 0 })
    expect(tokens.added).toBeGreaterThan(0)
  },
)

it.each(invalid.cases)('refuses $file with pointer and reason: $about', async ({ document }) => {
  const { body } = await dryRun(EMPTY, document).expect(422)
  expect(body.errors.length).toBeGreaterThan(0)
  for (const { pointer, detail } of body.errors) {
    expect(isIn(document, pointer), pointer).toBe(true)
    expect(detail.length).toBeGreaterThan(10)
  }
})

/** Whether a pointer leads to a value, or to where a member is missing. */
function isIn(document: unknown, pointer: string): boolean {
  let place: unknown = document
  const path = pointer.split('/').slice(1)
  return path.every((segment, at) => {
    const name = segment.replaceAll('~1', '/').replaceAll('~0', '~')
    if (typeof place !== 'object' || place === null) return false
    const isThere = Object.hasOwn(place, name)
    place = (place as Record<string, unknown>)[name]
    return isThere || at === path.length - 1
  })
}
