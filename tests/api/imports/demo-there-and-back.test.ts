import { afterAll, beforeAll, expect, it } from 'vitest'
import { createPeople } from '#scripts/demo/people.ts'
import type { Call } from '#shared/client/client.ts'
import { createImport, getResolverFile, importBody } from '#shared/contracts/imports.contract.ts'
import { getThemeFile } from '#shared/contracts/themes.contract.ts'
import { type DemoService, startDemoService } from '#tests/support/demo-service.ts'

let demo: DemoService
let maintainer: Call
beforeAll(async () => {
  demo = await startDemoService()
  maintainer = await createPeople(demo)('maintainer')
}, 120_000)
afterAll(() => demo.close())

const params = { system: 'larkhaven' }

it('leaves the demo as it is that takes its own file back', async () => {
  const { body: text } = await maintainer(getResolverFile, { params })
  const file = importBody.parse(JSON.parse(text))
  for (const mode of ['merge', 'replace'] as const) {
    const answer = await maintainer(createImport, { params, query: { mode }, body: file })
    expect(answer.body).toMatchObject({ written: false, changes: [], notes: [] })
  }
})

it.each(['light', 'dark', 'kiosk'])(
  'answers every token of %s at rest as it ships',
  async (theme) => {
    const { body: text } = await maintainer(getThemeFile, {
      params: { ...params, theme, format: 'json' },
    })
    const file = importBody.parse(JSON.parse(text))
    const query = { dryRun: 'true' } as const
    const { body } = await maintainer(createImport, { params, query, body: file })
    if (!('counts' in body)) throw new TypeError('An import of the demo is not long')
    const { added, removed, edited, unchanged } = body.counts.tokens
    expect({ added, removed }).toEqual({ added: 0, removed: 0 })
    expect(edited + unchanged).toBeGreaterThan(100)
  },
)
