import { afterAll, beforeAll, expect, it } from 'vitest'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
beforeAll(async () => {
  test = await createTestApp()
})
afterAll(() => test.close())

it('answers which pair of its group met a closed breach, by its name of now, until it opens again', async () => {
  const system = await createSampleSystem(test)
  await system.addToken('outer', '#c0c0c0')
  await system.addToken('inner', '#bbbbbb')
  const ring = { background: 'paper', use: 'non-text' }
  const outer = await system.addPair({ foreground: 'outer', ...ring })
  const inner = await system.addPair({ foreground: 'inner', ...ring })
  await system.editPair(outer, { anyOf: 'ring' })
  await system.editPair(inner, { anyOf: 'ring' })
  await system.editToken('inner', { value: '#333333' })
  const closed = await system.breaches('?status=resolved&sort=first-seen')
  expect(closed).toMatchObject([
    {
      foreground: 'outer',
      closingReason: 'fixed',
      metBy: { foreground: 'inner', background: 'paper' },
    },
    { foreground: 'inner', closingReason: 'fixed' },
  ])
  expect(closed[1]).not.toHaveProperty('metBy')
  await system.editToken('inner', { name: 'core' })
  const [renamed] = await system.breaches('?status=resolved&token=outer')
  expect(renamed?.metBy).toEqual({ foreground: 'core', background: 'paper' })
  await system.editToken('core', { value: '#cccccc' })
  const [open] = await system.breaches('?token=outer')
  expect(open).toMatchObject({ status: 'open' })
  expect(open).not.toHaveProperty('metBy')
})
