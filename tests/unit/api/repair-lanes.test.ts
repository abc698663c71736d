import { afterAll, describe, expect, it } from 'vitest'
import { createRepairLanes } from '#api/repair-lanes.ts'
import { pair, system, theme, token } from '#tests/unit/checks/model-builder.ts'

const lanes = createRepairLanes()
afterAll(() => lanes.close())

const model = system({
  themes: [theme('light')],
  tokens: [token('deck', '#ffffff'), token('soft', '#999999')],
  pairs: [pair('soft', 'deck')],
})
const plan = (budget: number, of = model) =>
  ({ kind: 'plan', model: of, options: { budget } }) as const

describe('a lane', () => {
  it('answers what the search found, and how far it was', async () => {
    const spent: number[] = []
    const { edits, evaluations } = await lanes.prompt.run<'plan'>(plan(2000), (so) =>
      spent.push(so),
    )
    expect(edits.map(({ place }) => place.token)).toEqual(['soft'])
    expect(spent.at(-1)).toBe(evaluations)
  }, 60_000)

  it('answers searches in the order in which they came, one after the other', async () => {
    const ended: number[] = []
    await Promise.all(
      [2000, 100, 500].map((budget) =>
        lanes.prompt.run<'plan'>(plan(budget)).then(() => ended.push(budget)),
      ),
    )
    expect(ended).toEqual([2000, 100, 500])
  }, 60_000)

  it('refuses a system that does not resolve, and searches on', async () => {
    const broken = { ...model, tokens: [token('soft', '{gone}')] }
    await expect(lanes.prompt.run<'plan'>(plan(500, broken))).rejects.toThrow('resolves')
    expect((await lanes.prompt.run<'plan'>(plan(500))).breachesBefore).toBe(1)
  }, 60_000)

  it('answers anew after it was closed', async () => {
    await lanes.prompt.close()
    expect((await lanes.prompt.run<'plan'>(plan(500))).breachesBefore).toBe(1)
  }, 60_000)
})
