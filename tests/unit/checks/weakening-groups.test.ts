import { describe, expect, it } from 'vitest'
import { applyEdits, type SystemEdits } from '#shared/checks/edits.ts'
import { pair, system, token } from './model-builder.ts'
import { judge, withPair, without } from './weakened.ts'

// Which edits weaken is the product's own rule; no published source.

describe('groups of which one is enough', () => {
  const RING = system({
    tokens: [
      token('outer', '#949494'),
      token('inner', '#000000', { values: { dark: { rest: { kind: 'alias', token: 'ink' } } } }),
    ],
    pairs: [
      pair('outer', 'ground', { use: 'text', anyOf: 'ring' }),
      pair('inner', 'ground', { use: 'text' }),
    ],
  })
  const joined = ['any-of-joined anyOf']

  it('answers a pair that joins a group in which another breaches', () => {
    const { found, said, gone } = judge(RING, withPair(RING, 'inner on ground', { anyOf: 'ring' }))
    expect(said).toEqual(joined)
    expect(found[0]).toMatchObject({
      item: { id: 'inner on ground' },
      detail: 'inner on ground can stand in for outer on ground now',
    })
    expect(gone).toBeGreaterThan(0)
  })

  it('answers a new pair that joins it', () => {
    const again = pair('inner', 'ground', { id: 'again', anyOf: 'ring', product: 'kiosk' })
    const { said, gone } = judge(RING, { pairs: { put: [again] } })
    expect(said).toEqual(joined)
    expect(gone).toBeGreaterThan(0)
  })

  it('answers a breaching pair that joins one that passes, and one that changes its group', () => {
    const model = applyEdits(RING, {
      pairs: {
        put: [
          { ...RING.pairs[0]!, anyOf: 'bar' },
          { ...RING.pairs[1]!, anyOf: 'ring' },
        ],
      },
    })
    const { found, gone } = judge(model, withPair(model, 'outer on ground', { anyOf: 'ring' }))
    expect(found).toMatchObject([{ item: { id: 'outer on ground' }, member: 'anyOf' }])
    expect(gone).toBeGreaterThan(0)
  })

  it('answers a member that is measured in more places, and so stands in there', () => {
    const inner = { ...RING.pairs[1]!, anyOf: 'ring', themes: ['dark'] }
    const model = applyEdits(RING, { pairs: { put: [inner] } })
    const { found, gone } = judge(model, { pairs: { put: [without(inner, 'themes')] } })
    expect(found).toMatchObject([{ code: 'any-of-joined', item: { id: 'inner on ground' } }])
    expect(found[0]).not.toHaveProperty('member')
    expect(gone).toBeGreaterThan(0)
  })

  it('answers a member whose token lists more states, and so stands in there', () => {
    const states = { states: ['hover'] as const }
    const model = system({
      tokens: [
        token('outer', '#949494', states),
        token('inner', '#000000', { values: { dark: { rest: { kind: 'alias', token: 'ink' } } } }),
      ],
      pairs: [
        pair('outer', 'ground', { anyOf: 'ring' }),
        pair('inner', 'ground', { anyOf: 'ring' }),
      ],
    })
    const inner = model.tokens.find(({ id }) => id === 'inner')!
    const { found, gone } = judge(model, { tokens: { put: [{ ...inner, ...states }] } })
    expect(found).toMatchObject([{ code: 'any-of-joined', item: { id: 'inner on ground' } }])
    expect(gone).toBeGreaterThan(0)
  })

  it('answers a member of which something is required from now on, and so meets it', () => {
    const pairs = [
      pair('outer', 'ground', { use: 'non-text', anyOf: 'ring' }),
      pair('inner', 'ground', { use: 'focus-change', anyOf: 'ring' }),
    ]
    const model = { ...RING, pairs }
    const { said, gone } = judge(model, { settings: { ...model.settings, level: 'AAA' } })
    expect(said).toEqual(['any-of-joined'])
    expect(gone).toBeGreaterThan(0)
  })

  it('leaves a first member, one that leaves, a new name of the whole group, and a new colour', () => {
    const inner = { ...RING.pairs[1]!, anyOf: 'ring' }
    const model = applyEdits(RING, { pairs: { put: [inner] } })
    const edits: SystemEdits[] = [
      { pairs: { put: [without(inner, 'anyOf')] } },
      { pairs: { put: model.pairs.map((one) => ({ ...one, anyOf: 'bands' })) } },
      { tokens: { put: [token('outer', '#000000')] } },
    ]
    for (const edit of edits) expect(judge(model, edit).said).toEqual([])
    const alone = pair('inner', 'ink', { anyOf: 'bar' })
    expect(judge(RING, { pairs: { put: [alone] } }).said).toEqual([])
  })
})
